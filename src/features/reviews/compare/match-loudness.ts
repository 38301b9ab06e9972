import type { Definition } from '../../../../shared/contract/index.ts';
import { sampleRateOfTone, type Sound } from '../../../audio/index.ts';

interface Voice {
  /** What the codes stand for, one value an entry. */
  readonly values: Float64Array;
  readonly table: Pick<Definition['table'], 'cycles' | 'range'>;
}

export type Matched =
  | {
      readonly kind: 'matched';
      /** Plays the first as the ideal curve and the second as the table: both sound at once, one of them heard. */
      readonly sound: Sound;
      /** By how much each is turned down, in dB; one of them by 0. */
      readonly turnedDownDb: { readonly a: number; readonly b: number };
    }
  /** One of them does not swing, so that nothing makes them equally loud. */
  | { readonly kind: 'silent'; readonly which: 'a' | 'b' | 'both' }
  /** Their rounds go together only after more entries than are rendered. */
  | { readonly kind: 'out-of-step' };

/** Entries of the longest common round that is played. */
const longestRound = 262_144;
/** A swing below this share of full scale is no sound. */
const leastRms = 1e-9;

/**
 * Brings two tables to one tone and one loudness: each is played without its mean, and the one with the larger RMS is
 * turned down to the RMS of the other. Nothing is turned up, so that neither is louder than alone.
 *
 * @param toneHz tone of both loops, in hertz
 */
export function matchLoudness(a: Voice, b: Voice, toneHz: number): Matched {
  const cycles = leastCommonMultiple(a.table.cycles, b.table.cycles);
  const [repeatsA, repeatsB] = [cycles / a.table.cycles, cycles / b.table.cycles];
  if (Math.max(a.values.length * repeatsA, b.values.length * repeatsB) > longestRound) {
    return { kind: 'out-of-step' };
  }
  const [swingA, swingB] = [swingOf(a), swingOf(b)];
  const [rmsA, rmsB] = [rmsOf(swingA), rmsOf(swingB)];
  const [isSilentA, isSilentB] = [rmsA < leastRms, rmsB < leastRms];
  if (isSilentA || isSilentB) {
    return { kind: 'silent', which: isSilentA && isSilentB ? 'both' : isSilentA ? 'a' : 'b' };
  }
  const rms = Math.min(rmsA, rmsB);
  const values = round(swingB, repeatsB, rms / rmsB);
  return {
    kind: 'matched',
    sound: {
      cycle: round(swingA, repeatsA, rms / rmsA),
      values,
      range: 'bipolar',
      mode: 'loop',
      sampleRateHz: sampleRateOfTone(toneHz, { tableLength: values.length, tableCycles: cycles }),
    },
    turnedDownDb: { a: 20 * Math.log10(rmsA / rms), b: 20 * Math.log10(rmsB / rms) },
  };
}

/** About its mean; a unipolar table's full scale, half as wide, is made as wide as a bipolar one's. */
function swingOf({ values, table: { range } }: Voice): Float64Array {
  let sum = 0;
  for (const value of values) sum += value;
  const mean = sum / values.length;
  const scale = range === 'unipolar' ? 2 : 1;
  return values.map((value) => scale * (value - mean));
}

function rmsOf(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return Math.sqrt(sum / values.length);
}

function round(values: Float64Array, repeats: number, gain: number): Float64Array {
  const whole = new Float64Array(values.length * repeats);
  for (let k = 0; k < whole.length; k += 1) whole[k] = gain * values[k % values.length];
  return whole;
}

function leastCommonMultiple(one: number, other: number): number {
  let [a, b] = [one, other];
  while (b !== 0) [a, b] = [b, a % b];
  return (one * other) / a;
}
