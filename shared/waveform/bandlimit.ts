import { linesOf } from '../analysis/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { addSines, type Sine } from './harmonic-sum.ts';

/**
 * The trigonometric polynomial through one cycle of evenly spaced values, harmonics below `limit` kept,
 * evaluated at the table's phases. Value j stands at phase j/M.
 *
 * @param limit harmonics `1 ≤ m < limit` stay; it is at most M/2.
 */
export function bandlimitedCycle(values: Float64Array, limit: number, table: TableSettings): Float64Array {
  const lines = linesOf(values);
  const count = values.length;
  const cycle = new Float64Array(table.length).fill(lines.re[0] / count);
  const sines: Sine[] = [];
  for (let m = 1; m < limit; m += 1) {
    const re = (2 * lines.re[m]) / count;
    const im = (2 * lines.im[m]) / count;
    // re·cos(a) − im·sin(a) as one sine.
    sines.push({ harmonic: m, amplitude: Math.hypot(re, im), phaseRad: Math.atan2(re, -im) });
  }
  addSines(cycle, sines, table);
  return cycle;
}

/** First harmonic that no longer fits the table: `N/(2K)`. */
export function nyquistHarmonic({ length, cycles }: TableSettings): number {
  return length / (2 * cycles);
}
