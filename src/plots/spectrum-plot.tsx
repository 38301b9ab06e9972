import { useEffect, useLayoutEffect, useMemo, useState } from 'react';
import { ChoiceField } from '../components/index.ts';
import { partOf, useLive, type Live } from '../live/index.ts';
import { Plot } from './plot.tsx';
import { createPlotLink } from './plot-link.ts';
import { SpectrumScene, type SpectrumData, type SpectrumScale } from './spectrum-scene.ts';

export interface SpectrumPlotProps {
  data: Live<SpectrumData>;
  /** Scales, where a page keeps them (in its URL, say); the plot keeps them itself otherwise. */
  scale?: SpectrumScale;
  onScaleChange?: (scale: SpectrumScale) => void;
}

const levels = [
  { value: 'db', label: 'dB' },
  { value: 'linear', label: 'linear' },
] as const;

const frequencies = [
  { value: 'linear', label: 'linear' },
  { value: 'log', label: 'log' },
] as const;

/** Levels against frequency: what was intended, and what quantising added. */
export function SpectrumPlot({ data, scale, onScaleChange }: SpectrumPlotProps) {
  const hasHertz = useLive(
    useMemo(() => partOf(data, ({ sampleRateHz }) => sampleRateHz !== undefined), [data]),
  );
  const [own, setOwn] = useState<SpectrumScale>({ level: 'db', frequency: 'linear' });
  const shown = scale ?? own;
  const change = (part: Partial<SpectrumScale>) => {
    setOwn({ ...shown, ...part });
    onScaleChange?.({ ...shown, ...part });
  };
  return (
    // The axis of hertz comes and goes with the sample rate, and the axes of a plot are made once.
    <SpectrumDrawing key={hasHertz ? 'hertz' : 'bins'} data={data} shown={shown} onChange={change} />
  );
}

interface SpectrumDrawingProps {
  data: Live<SpectrumData>;
  shown: SpectrumScale;
  onChange: (part: Partial<SpectrumScale>) => void;
}

function SpectrumDrawing({ data, shown, onChange }: SpectrumDrawingProps) {
  const [scene] = useState(() => new SpectrumScene(data.now(), shown));
  const [link] = useState(createPlotLink);
  const { level, frequency } = shown;

  useLayoutEffect(() => {
    scene.show({ level, frequency });
  }, [scene, level, frequency]);

  // A place on one frequency scale is nowhere on the other, nor in a table of another length.
  useLayoutEffect(() => {
    link.setView(null);
  }, [link, frequency]);
  useEffect(
    () => partOf(data, ({ tableLength }) => tableLength).subscribe(() => link.setView(null)),
    [data, link],
  );

  return (
    <Plot
      title="Spectrum"
      kind="spectrum"
      scene={scene}
      data={data}
      link={link}
      manner={`${level} ${frequency}`}
      hasZoom
      controls={
        <>
          <span className="plot-choice">
            <span aria-hidden="true">level</span>
            <ChoiceField
              label="Level scale"
              hideLabel
              value={level}
              options={levels}
              onChange={(next) => {
                onChange({ level: next });
              }}
            />
          </span>
          <span className="plot-choice">
            <span aria-hidden="true">frequency</span>
            <ChoiceField
              label="Frequency scale"
              hideLabel
              value={frequency}
              options={frequencies}
              onChange={(next) => {
                onChange({ frequency: next });
              }}
            />
          </span>
        </>
      }
    />
  );
}
