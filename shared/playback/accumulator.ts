import { Refusal, showValue, type Problem } from '../contract/index.ts';

/** A phase accumulator: at each sample the step word is added, modulo 2^M; the top p bits index the table. */
export interface Accumulator {
  /** M, from p (the table has 2^p entries) to 48. */
  readonly accumulatorBits: number;
  /** W, a whole number 1 ≤ W < 2^M. */
  readonly stepWord: number;
}

const accumulatorBitsAtMost = 48;

/** What is wrong with an accumulator for a table of some length; an empty list where nothing is. */
export function accumulatorProblems(
  tableLength: number,
  { accumulatorBits, stepWord }: Accumulator,
): Problem[] {
  const indexBits = Math.log2(tableLength);
  if (!Number.isInteger(indexBits) || indexBits < 1) {
    return [
      problem('table.length', tableLength, 'a power of two, as the top bits of the accumulator index it'),
    ];
  }
  const isWidth =
    Number.isInteger(accumulatorBits) &&
    accumulatorBits >= indexBits &&
    accumulatorBits <= accumulatorBitsAtMost;
  if (!isWidth) {
    const allowed = `a whole number from ${indexBits} to ${accumulatorBitsAtMost}`;
    return [problem('accumulatorBits', accumulatorBits, allowed)];
  }
  const largest = 2 ** accumulatorBits - 1;
  if (!Number.isInteger(stepWord) || stepWord < 1 || stepWord > largest) {
    return [problem('stepWord', stepWord, `a whole number from 1 to ${largest}`)];
  }
  return [];
}

const problem = (path: string, value: unknown, allowed: string): Problem => ({
  path,
  value: showValue(value),
  allowed,
});

/** @throws {Refusal} where `accumulatorProblems` names any. */
export function checkAccumulator(tableLength: number, accumulator: Accumulator): void {
  const [first, ...others] = accumulatorProblems(tableLength, accumulator);
  if (first !== undefined) throw new Refusal(first, ...others);
}

/** Smallest step of frequency, `fs/2^M`, in Hz. */
export function resolutionHz(accumulatorBits: number, sampleRateHz: number): number {
  return sampleRateHz / 2 ** accumulatorBits;
}

/** Frequency of one turn of the table, `W·fs/2^M`, in Hz. Above fs/2 it is heard folded back, at `fs − f`. */
export function outputHz({ accumulatorBits, stepWord }: Accumulator, sampleRateHz: number): number {
  return (stepWord * sampleRateHz) / 2 ** accumulatorBits;
}

/** How the accumulator comes round: after P samples, in steps of w (odd) modulo P. Both exact up to 2^48. */
export interface Round {
  /** P = 2^M/g with g = gcd(W, 2^M): samples until it repeats. */
  readonly period: number;
  /** W/g. */
  readonly oddStep: number;
}

export function roundOf({ accumulatorBits, stepWord }: Accumulator): Round {
  let period = 2 ** accumulatorBits;
  let oddStep = stepWord;
  while (oddStep % 2 === 0) {
    oddStep /= 2;
    period /= 2;
  }
  return { period, oddStep };
}

const half = 2 ** 24;

/**
 * Where line k of §5 is heard: `k·w mod P`, folded into 0…P/2, in units of fs/P. The step is split in two, so that
 * every product stays a whole number of a double; beyond that k is rare, and left to long integers.
 *
 * @param k a whole number up to P/2
 */
export function binOf(k: number, { period, oddStep }: Round): number {
  const bin =
    k < 2 ** 28 ? turnsLeft(k, period, oddStep) : Number((BigInt(k) * BigInt(oddStep)) % BigInt(period));
  return Math.min(bin, period - bin);
}

/** `k·w mod P` for k below 2^28. */
function turnsLeft(k: number, period: number, oddStep: number): number {
  const high = Math.floor(oddStep / half);
  const low = oddStep - high * half;
  // A period of 24 bits or less leaves no high part.
  const highPart = high === 0 ? 0 : ((k * high) % (period / half)) * half;
  return (highPart + k * low) % period;
}
