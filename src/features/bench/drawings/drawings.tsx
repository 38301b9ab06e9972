import { memo, useMemo } from 'react';
import { partOf, useAsLive, type Live } from '../../../live/index.ts';
import { CyclePlot, ErrorPlot, SpectrumPlot } from '../../../plots/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import type { PointsOverlay } from '../shape/index.ts';
import { useSpectrumScale } from '../view/use-spectrum-scale.ts';
import { cycleData, spectrumData } from './plot-data.ts';

interface DrawingsProps {
  table: TableAnswer;
  sampleRateHz: number;
}

/** The cycle, its error and its spectrum. */
export function Drawings({ table, sampleRateHz }: DrawingsProps) {
  return <LiveDrawings table={useAsLive(table)} sampleRateHz={useAsLive(sampleRateHz)} />;
}

interface LiveDrawingsProps {
  table: Live<TableAnswer>;
  sampleRateHz: Live<number>;
  overlay?: PointsOverlay | undefined;
}

/** The same, drawn from each new table directly: nothing is rendered for it. */
export const LiveDrawings = memo(function LiveDrawings({ table, sampleRateHz, overlay }: LiveDrawingsProps) {
  const cycle = useMemo(() => partOf(table, cycleData), [table]);
  const error = useMemo(() => partOf(table, ({ errorLsb }) => errorLsb), [table]);
  const spectrum = useMemo(() => spectrumData(table, sampleRateHz), [table, sampleRateHz]);
  const scale = useSpectrumScale();
  return (
    <>
      <CyclePlot data={cycle} {...overlay} />
      <ErrorPlot errorLsb={error} />
      <SpectrumPlot data={spectrum} {...scale} />
    </>
  );
});
