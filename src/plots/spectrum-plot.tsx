import { useLayoutEffect, useMemo, useState } from 'react';
import { ChoiceField } from '../components/index.ts';
import { Plot } from './plot.tsx';
import { createPlotLink } from './plot-link.ts';
import { SpectrumScene, type SpectrumData, type SpectrumScale } from './spectrum-scene.ts';

export interface SpectrumPlotProps {
  /** `A_k` of what the codes stand for, bins 0…⌊N/2⌋. */
  amplitudes: Float64Array;
  /** `A_k` of the levelled cycle. */
  intended: Float64Array;
  /** `A_k` of the error. */
  added: Float64Array;
  /** N, in entries. */
  tableLength: number;
  /** K, periods of the wave in the table. */
  cycles: number;
  /** Where given, a second axis shows Hz: bin k lies at k·sampleRateHz/tableLength. */
  sampleRateHz?: number;
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
export function SpectrumPlot({ scale, onScaleChange, ...data }: SpectrumPlotProps) {
  const [own, setOwn] = useState<SpectrumScale>({ level: 'db', frequency: 'linear' });
  const shown = scale ?? own;
  const change = (part: Partial<SpectrumScale>) => {
    setOwn({ ...shown, ...part });
    onScaleChange?.({ ...shown, ...part });
  };
  return (
    // The axis of hertz comes and goes with the sample rate, and the axes of a plot are made once.
    <SpectrumDrawing
      key={data.sampleRateHz === undefined ? 'bins' : 'hertz'}
      data={data}
      shown={shown}
      onChange={change}
    />
  );
}

interface SpectrumDrawingProps {
  data: SpectrumData;
  shown: SpectrumScale;
  onChange: (part: Partial<SpectrumScale>) => void;
}

function SpectrumDrawing({ data, shown, onChange }: SpectrumDrawingProps) {
  const [scene] = useState(() => new SpectrumScene(data, shown));
  const [link] = useState(createPlotLink);
  const { amplitudes, intended, added, tableLength, cycles, sampleRateHz } = data;
  const { level, frequency } = shown;

  useLayoutEffect(() => {
    scene.set({ amplitudes, intended, added, tableLength, cycles, sampleRateHz }, { level, frequency });
  }, [scene, amplitudes, intended, added, tableLength, cycles, sampleRateHz, level, frequency]);

  // A place on one frequency scale is nowhere on the other.
  useLayoutEffect(() => {
    link.setView(null);
  }, [link, frequency, added.length]);

  const version = useMemo(
    () => ({ amplitudes, intended, added, tableLength, cycles, sampleRateHz, level, frequency }),
    [amplitudes, intended, added, tableLength, cycles, sampleRateHz, level, frequency],
  );

  return (
    <Plot
      title="Spectrum"
      kind="spectrum"
      scene={scene}
      link={link}
      version={version}
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
