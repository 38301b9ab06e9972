import { useMemo, useState } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { useAsLive } from '../../../live/index.ts';
import { Plot, createPlotLink } from '../../../plots/index.ts';
import type { LevelsAnswer, PlayingAnswer } from '../../../workers/stage-messages.ts';
import { LinesScene, type LinesData } from './lines-scene.ts';
import { TracesPlot } from './traces-plot.tsx';
import type { Trace, TracesData } from './traces-scene.ts';

/** The wave in volts over time, and its spectrum. */
export function PlayingPlots({ board, answer }: { board: Board; answer: PlayingAnswer }) {
  const waveform = useMemo(() => waveformOf(board, answer), [board, answer]);
  return (
    <>
      <TracesPlot title="Voltage over time" kind="waveform" data={waveform} />
      <LinesPlot data={answer} />
    </>
  );
}

function LinesPlot({ data }: { data: LinesData }) {
  const [scene] = useState(() => new LinesScene(data));
  const [link] = useState(createPlotLink);
  return (
    <Plot
      title="Spectrum at the output"
      kind="lines"
      scene={scene}
      data={useAsLive(data)}
      link={link}
      hasZoom
    />
  );
}

function waveformOf({ stage }: Board, answer: PlayingAnswer): TracesData {
  const { waveform, sampleRateHz, pointsPerHold } = answer;
  const { pin, buffer, output } = waveform;
  const traces: [Trace, ...Trace[]] = [
    {
      name: 'at the pin',
      values: pin,
      color: 'brick',
      width: 1.4,
      isStairs: stage.outputCapacitanceF === 0,
    },
  ];
  if (stage.opAmp !== undefined)
    traces.push({ name: 'after the op-amp', values: buffer, color: 'ink', width: 1.2, dash: [5, 3] });
  if (stage.filter.kind !== 'none')
    traces.push({ name: 'after the filter', values: output, color: 'water', width: 2 });
  const v = (volts: number) => formatQuantity(volts, 'V', { significant: 4 });
  const ends = (values: Float64Array) =>
    `${v(values.reduce((a, b) => Math.min(a, b)))} to ${v(values.reduce((a, b) => Math.max(a, b)))}`;
  return {
    traces,
    from: 0,
    step: 1 / (sampleRateHz * pointsPerHold),
    x: { name: 'time', unit: 's' },
    y: { name: 'voltage', unit: 'V' },
    summary:
      `One round of the loop, ${formatQuantity(waveform.timeS.length / (sampleRateHz * pointsPerHold), 's')}. ` +
      `${traces.map(({ name, values }) => `${name[0].toUpperCase()}${name.slice(1)}: ${ends(values)}`).join('. ')}.`,
  };
}

/** INL and DNL over codes. */
export function LevelPlots({ answer }: { answer: LevelsAnswer }) {
  const { linearity } = answer;
  const inl = useMemo(() => overCodes('INL', linearity.inl), [linearity]);
  const dnl = useMemo(() => overCodes('DNL', linearity.dnl), [linearity]);
  return (
    <>
      <TracesPlot title="Integral non-linearity" kind="linearity" data={inl} />
      <TracesPlot title="Differential non-linearity" kind="linearity" data={dnl} />
    </>
  );
}

function overCodes(name: string, values: Float64Array): TracesData {
  let worst = 0;
  for (let code = 1; code < values.length; code += 1)
    if (Math.abs(values[code]) > Math.abs(values[worst])) worst = code;
  return {
    traces: [{ name, values, color: 'brick', width: 1.2, isStairs: true }],
    from: 0,
    step: 1,
    x: { name: 'code', unit: '' },
    y: { name, unit: 'LSB' },
    reach: [-0.5, 0.5],
    levels: [0, -0.5, 0.5],
    summary: `${name} of ${values.length} codes. The largest is ${formatQuantity(values[worst], 'LSB', { significant: 3 })}, at code ${worst}.`,
  };
}
