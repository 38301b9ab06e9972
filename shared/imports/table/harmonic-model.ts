import type { HarmonicsSource } from '../../contract/index.ts';
import { linesOf } from '../../dft/index.ts';
import { harmonicsFrom } from './harmonics-from.ts';

/** The harmonics that best tell what a table was made of. */
export interface HarmonicModel {
  /** In codes. */
  readonly source: HarmonicsSource;
  /** Harmonics kept. */
  readonly count: number;
  /** Power of the kept harmonics and of what is left of the table beside them, in codes squared. */
  readonly power: number;
  readonly restPower: number;
  /** The criterion's value for one entry: the lower, the better the model tells the table. */
  readonly cost: number;
}

/** Power of an even rounding error, in codes squared (W. R. Bennett, 1948): nothing below it is worth telling. */
const roundingPower = 1 / 12;

/**
 * Picks the number of harmonics, strongest first, by Schwarz's criterion (G. Schwarz, 1978):
 * `N·ln(rest/N) + 2·p·ln N`, as each harmonic has an amplitude and a phase. The rest counts as no less than a rounding
 * error. So a slip in one entry stays in the rest, and a sawtooth keeps all its lines.
 *
 * @param codes at least 4 of them
 */
export function harmonicModelOf(codes: ArrayLike<number>): HarmonicModel {
  const length = codes.length;
  const lines = linesOf(Float64Array.from(codes));
  const { re, im } = lines;
  const powers: { harmonic: number; power: number }[] = [];
  let total = 0;
  for (let harmonic = 1; 2 * harmonic <= length; harmonic += 1) {
    const isHalf = 2 * harmonic === length;
    const power = ((isHalf ? 1 : 2) * (re[harmonic] ** 2 + im[harmonic] ** 2)) / length ** 2;
    total += power;
    // The line at half the length is no harmonic that a table could hold.
    if (!isHalf) powers.push({ harmonic, power });
  }
  powers.sort((a, b) => b.power - a.power || a.harmonic - b.harmonic);

  const penalty = (2 * Math.log(length)) / length;
  let rest = total;
  let best = { count: 0, cost: Math.log(Math.max(rest, roundingPower)), rest };
  powers.forEach(({ power }, index) => {
    rest = Math.max(0, rest - power);
    const cost = Math.log(Math.max(rest, roundingPower)) + penalty * (index + 1);
    if (cost < best.cost) best = { count: index + 1, cost, rest };
  });
  const kept = new Set(powers.slice(0, best.count).map(({ harmonic }) => harmonic));
  return {
    source: harmonicsFrom(lines, length, (harmonic) => kept.has(harmonic)),
    count: best.count,
    power: total - best.rest,
    restPower: best.rest,
    cost: best.cost,
  };
}
