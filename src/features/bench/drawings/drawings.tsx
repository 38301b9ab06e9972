import { memo } from 'react';
import { CyclePlot, ErrorPlot, SpectrumPlot } from '../../../plots/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import type { PointsOverlay } from '../shape/index.ts';
import { useSpectrumScale } from '../view/use-spectrum-scale.ts';

interface DrawingsProps {
  table: TableAnswer;
  sampleRateHz: number;
  overlay?: PointsOverlay | undefined;
}

/** The cycle, its error and its spectrum. */
export function Drawings({ table, sampleRateHz, overlay }: DrawingsProps) {
  return (
    <>
      <Cycle table={table} overlay={overlay} />
      <ErrorPlot errorLsb={table.errorLsb} />
      <Spectrum table={table} sampleRateHz={sampleRateHz} />
    </>
  );
}

const Cycle = memo(function Cycle({ table, overlay }: Pick<DrawingsProps, 'table' | 'overlay'>) {
  const { bits, range, sampleAt, cycles, startPhaseDeg } = table.definition.table;
  const { cycle, values, codes, lsb, errorLsb } = table;
  return (
    <CyclePlot
      {...{ cycle, values, codes, bits, range, lsb, errorLsb, sampleAt, cycles, startPhaseDeg }}
      {...overlay}
    />
  );
});

const Spectrum = memo(function Spectrum({ table, sampleRateHz }: Omit<DrawingsProps, 'overlay'>) {
  const { amplitudes, intended, added } = table.spectrum;
  const { length, cycles } = table.definition.table;
  const scale = useSpectrumScale();
  return (
    <SpectrumPlot
      {...{ amplitudes, intended, added, cycles }}
      {...scale}
      tableLength={length}
      sampleRateHz={sampleRateHz > 0 && Number.isFinite(sampleRateHz) ? sampleRateHz : undefined}
    />
  );
});
