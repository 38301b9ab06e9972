import { joined, type Live } from '../../../live/index.ts';
import type { CycleData, SpectrumData } from '../../../plots/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';

/** What the cycle plot shows of a table. */
export function cycleData({ definition, cycle, values, codes, lsb, errorLsb }: TableAnswer): CycleData {
  const { bits, range, sampleAt, cycles, startPhaseDeg } = definition.table;
  return { cycle, values, codes, bits, range, lsb, errorLsb, sampleAt, cycles, startPhaseDeg };
}

/** What the spectrum shows of a table at a sample rate; no axis of hertz where the rate is none. */
export function spectrumData(table: Live<TableAnswer>, sampleRateHz: Live<number>): Live<SpectrumData> {
  return joined(table, sampleRateHz, ({ spectrum, definition }, rate) => {
    const { amplitudes, intended, added } = spectrum;
    const { length: tableLength, cycles } = definition.table;
    const isRate = rate > 0 && Number.isFinite(rate);
    return { amplitudes, intended, added, tableLength, cycles, sampleRateHz: isRate ? rate : undefined };
  });
}
