import type { Lines } from '../dft/index.ts';
import type { TableSettings } from '../contract/index.ts';
import { addHarmonics, type HarmonicLine } from './harmonic-sum.ts';

/**
 * The trigonometric polynomial through one cycle of evenly spaced values, harmonics below `limit` kept,
 * evaluated at the table's phases. Value j stands at phase j/M.
 *
 * @param lines unscaled lines of the values, at least those below the limit
 * @param count how many values there are, M
 * @param limit harmonics `1 ≤ m < limit` stay; it is at most M/2.
 */
export function bandlimitedCycle(
  lines: Lines,
  count: number,
  limit: number,
  table: TableSettings,
): Float64Array {
  const cycle = new Float64Array(table.length).fill(lines.re[0] / count);
  const harmonics: HarmonicLine[] = [];
  for (let m = 1; m < limit; m += 1) {
    harmonics.push({ harmonic: m, sine: (-2 * lines.im[m]) / count, cosine: (2 * lines.re[m]) / count });
  }
  addHarmonics(cycle, harmonics, table);
  return cycle;
}

/** First harmonic that no longer fits the table: `N/(2K)`. */
export function nyquistHarmonic({ length, cycles }: TableSettings): number {
  return length / (2 * cycles);
}
