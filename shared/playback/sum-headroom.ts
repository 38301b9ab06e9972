import { Refusal } from '../contract/index.ts';
import { checkAccumulator, type Accumulator } from './accumulator.ts';
import { mustBeWhole } from './inputs.ts';

/** What adding the words of several tables asks for, in two's complement. */
export interface SumHeadroom {
  /** The sum's ends, reached where every table stands at its own. */
  readonly lowest: number;
  readonly highest: number;
  /** Bits that hold both. */
  readonly sumBits: number;
  /** Places by which the sum is shifted right, so that it keeps the converter's width: `sum >> shift`. */
  readonly shift: number;
  /** Level that the shift costs, `20·log10(2^shift)`. */
  readonly lossDb: number;
}

/**
 * Headroom of the sum of several tables, each played by an accumulator of its own: whatever their phases, no sum
 * leaves the ends, and shifted right none leaves the converter's bits.
 *
 * @param tables signed words of each table
 * @param bits the converter's, 1…32
 * @throws {Refusal} where there is no table.
 */
export function sumHeadroom(tables: readonly ArrayLike<number>[], bits: number): SumHeadroom {
  mustBeWhole('bits', bits, 1, 32);
  if (tables.length === 0) {
    throw new Refusal({ path: 'tables', value: 'an empty list', allowed: 'at least one table' });
  }
  let lowest = 0;
  let highest = 0;
  for (const table of tables) {
    let least = Infinity;
    let most = -Infinity;
    for (let k = 0; k < table.length; k += 1) {
      least = Math.min(least, table[k]);
      most = Math.max(most, table[k]);
    }
    lowest += least;
    highest += most;
  }
  let sumBits = 1;
  while (lowest < -(2 ** (sumBits - 1)) || highest > 2 ** (sumBits - 1) - 1) sumBits += 1;
  const shift = Math.max(0, sumBits - bits);
  return { lowest, highest, sumBits, shift, lossDb: 20 * Math.log10(2 ** shift) };
}

/** One table and the accumulator that plays it. */
export interface Voice {
  /** 2^p words. */
  readonly words: ArrayLike<number>;
  readonly accumulator: Accumulator;
}

/**
 * What the voices add up to, sample by sample from phase 0: `Σ words[acc >> (M−p)]`, before any shift.
 *
 * @throws {Refusal} where an accumulator does not fit its table.
 */
export function sumOfVoices(voices: readonly Voice[], count: number): Float64Array {
  const sums = new Float64Array(count);
  for (const { words, accumulator } of voices) {
    checkAccumulator(words.length, accumulator);
    const turn = 2 ** accumulator.accumulatorBits;
    const repeats = turn / words.length;
    let phase = 0;
    for (let n = 0; n < count; n += 1) {
      sums[n] += words[Math.floor(phase / repeats)];
      phase += accumulator.stepWord;
      if (phase >= turn) phase -= turn;
    }
  }
  return sums;
}
