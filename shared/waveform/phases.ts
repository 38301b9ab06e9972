import type { TableSettings } from '../contract/index.ts';

type Sampling = Pick<TableSettings, 'length' | 'cycles' | 'startPhaseDeg' | 'sampleAt'>;

/** δ of §1: entries are taken at the start (0) or the centre (½) of their step. */
export function stepFraction({ sampleAt }: Pick<TableSettings, 'sampleAt'>): number {
  return sampleAt === 'centre' ? 0.5 : 0;
}

/** Phase of each entry in cycles, `t = ((k+δ)·K/N + φ/360) mod 1`, 0 ≤ t < 1. */
export function phasesOf(table: Sampling): Float64Array {
  const { length, cycles, startPhaseDeg } = table;
  const fraction = stepFraction(table);
  const start = startPhaseDeg / 360;
  const phases = new Float64Array(length);
  for (let k = 0; k < length; k += 1) phases[k] = (((k + fraction) * cycles) / length + start) % 1;
  return phases;
}
