import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { TableSettings } from '../contract/index.ts';

/**
 * Dither of §3.3, one value an entry, in LSB: uniform ±½ a draw, triangular the sum of two. Drawn once and in
 * order from xoroshiro128+ (the `pure-rand` package), 32 bits a draw, so that a seed gives one table.
 *
 * @returns null where no dither is asked for.
 */
export function ditherOf(
  length: number,
  { dither, seed }: Pick<TableSettings, 'dither' | 'seed'>,
): Float64Array | null {
  if (dither === 'none') return null;
  const generator = xoroshiro128plus(seed);
  const draw = () => ((generator.next() >>> 0) + 0.5) / 2 ** 32 - 0.5;
  const values = new Float64Array(length);
  for (let k = 0; k < length; k += 1) values[k] = dither === 'triangular' ? draw() + draw() : draw();
  return values;
}
