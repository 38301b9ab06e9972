import { linesOfPair, type Lines } from './lines.ts';

/** One-sided spectra of a table of N entries, bins 0…⌊N/2⌋ (engine specification §4). */
export interface Spectrum {
  /** `A_k` of what the codes stand for; an amplitude-1 sine is 1. */
  readonly amplitudes: Float64Array;
  /** Phase of bin k in degrees of a sine, −180 < φ ≤ 180. */
  readonly phasesDeg: Float64Array;
  /** `A_k` of the levelled cycle: what was intended. */
  readonly intended: Float64Array;
  /** `A_k` of the error: what quantising added. */
  readonly added: Float64Array;
}

/** Lowest level shown, in dBFS. */
export const floorDbfs = -200;

/**
 * Spectra of a cycle, of its error, and of their sum, which is what the codes stand for.
 *
 * @param lsb size of one LSB: the error is brought to the size of the signal before the shared transform.
 */
export function spectrumOf(cycle: Float64Array, error: Float64Array, lsb: number): Spectrum {
  const size = cycle.length;
  const { a: wanted, b: errors } = linesOfPair(
    cycle,
    error.map((e) => e / lsb),
  );
  const bins = wanted.re.length;
  const sum: Lines = { re: new Float64Array(bins), im: new Float64Array(bins) };
  for (let k = 0; k < bins; k += 1) {
    errors.re[k] *= lsb;
    errors.im[k] *= lsb;
    sum.re[k] = wanted.re[k] + errors.re[k];
    sum.im[k] = wanted.im[k] + errors.im[k];
  }
  return {
    amplitudes: amplitudesOf(sum, size),
    phasesDeg: phasesDegOf(sum),
    intended: amplitudesOf(wanted, size),
    added: amplitudesOf(errors, size),
  };
}

/** `A_0 = |X_0|/N`, `A_k = 2|X_k|/N`, `A_{N/2} = |X_{N/2}|/N`. */
function amplitudesOf({ re, im }: Lines, size: number): Float64Array {
  const amplitudes = new Float64Array(re.length);
  for (let k = 0; k < re.length; k += 1) amplitudes[k] = (2 * Math.sqrt(re[k] * re[k] + im[k] * im[k])) / size;
  amplitudes[0] /= 2;
  if (size % 2 === 0) amplitudes[size / 2] /= 2;
  return amplitudes;
}

function phasesDegOf({ re, im }: Lines): Float64Array {
  const phases = new Float64Array(re.length);
  const degrees = 180 / Math.PI;
  // a·sin(θ+φ) has the line (a/2)·e^(i(φ−90°)): its cosine part is a·sin φ, its sine part a·cos φ.
  for (let k = 0; k < re.length; k += 1) phases[k] = Math.atan2(re[k], -im[k]) * degrees;
  return phases;
}

/** `20·log10 A`, not below −200 dB. An amplitude-1 sine is 0 dBFS. */
export function dbfsOf(amplitude: number): number {
  return amplitude <= 1e-10 ? floorDbfs : 20 * Math.log10(amplitude);
}
