import { linesOf } from '../dft/index.ts';
import { roundOf, type Accumulator, type Round } from './accumulator.ts';

/**
 * The lines of one round of a phase accumulator (§5), k = 1…P/2: of P samples that visit `base` different entries,
 * each `repeats` = P/base times. Where P ≤ N those are every (N/P)th entry, each once; else all N of them.
 */
export interface RoundLines extends Round {
  readonly base: number;
  readonly repeats: number;
  /** `2·|X_r|/base` of the visited entries in order of the table, r = 0…base/2. */
  readonly tableAmplitudes: Float64Array;
}

export function roundLinesOf(values: Float64Array, accumulator: Accumulator): RoundLines {
  const round = roundOf(accumulator);
  const base = Math.min(values.length, round.period);
  const stride = values.length / base;
  const { re, im } = linesOf(stride === 1 ? values : values.filter((_, n) => n % stride === 0));
  const tableAmplitudes = new Float64Array(re.length);
  for (let r = 0; r < re.length; r += 1) {
    tableAmplitudes[r] = (2 * Math.sqrt(re[r] * re[r] + im[r] * im[r])) / base;
  }
  return { ...round, base, repeats: round.period / base, tableAmplitudes };
}

/** Line r of the table that line k of the output comes from: k mod base, folded into 0…base/2. */
export function tableLineOf(k: number, { base }: RoundLines): number {
  const rest = k % base;
  return Math.min(rest, base - rest);
}

/**
 * Amplitude of line k ≥ 1: `2·|X_{k mod N}|/N·|sin(πk/N)| / ((P/N)·|sin(πk/P)|)`, halved at P/2. Each angle is taken
 * from whole numbers folded into a quarter turn, so that it keeps its last bits.
 */
export function amplitudeOf(k: number, lines: RoundLines): number {
  const { period, base, repeats, tableAmplitudes } = lines;
  const r = tableLineOf(k, lines);
  const hold =
    repeats === 1 ? 1 : Math.sin((Math.PI * r) / base) / (repeats * Math.sin((Math.PI * k) / period));
  const amplitude = tableAmplitudes[r] * hold;
  return 2 * k === period ? amplitude / 2 : amplitude;
}

/** Power of table line r in the output, over all the lines that come from it. */
export function tablePowerOf(r: number, { base, tableAmplitudes }: RoundLines): number {
  const amplitude = tableAmplitudes[r];
  return (amplitude * amplitude) / (2 * r === base ? 4 : 2);
}

/**
 * Power of table line r that does not come out at line k = r but in its images: power·(1 − h²) with the hold's factor
 * h = sin(x)/(Q·sin(x/Q)), x = πr/base, Q repeats. For small x the difference `Q·sin(x/Q) − sin(x)` is a series, as
 * the two would cancel.
 */
export function imagePowerOf(r: number, lines: RoundLines): number {
  const { base, repeats } = lines;
  if (repeats === 1) return 0;
  const x = (Math.PI * r) / base;
  const held = repeats * Math.sin(x / repeats);
  const power = tablePowerOf(r, lines);
  if (2 * r === base) {
    // N/2 and its mirror image part company: each carries a line of its own.
    const hold = 1 / held;
    return power * (1 - 2 * hold * hold);
  }
  const lost = (x < 0.1 ? heldMinusSine(x, repeats) : held - Math.sin(x)) / held;
  return power * lost * (2 - lost);
}

/** `Q·sin(x/Q) − sin(x) = Σ (−1)^(i+1)·x^(2i+1)/(2i+1)!·(1 − Q^(−2i))`, i ≥ 1; below x = 0.1 five terms fill a double. */
function heldMinusSine(x: number, repeats: number): number {
  let sum = 0;
  let term = x;
  let share = 1;
  for (let i = 1; i <= 5; i += 1) {
    term *= -(x * x) / (2 * i * (2 * i + 1));
    share /= repeats * repeats;
    sum -= term * (1 - share);
  }
  return sum;
}
