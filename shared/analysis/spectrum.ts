import { realTransformOf } from '../dft/index.ts';

/** One-sided spectra of a table of N entries, bins 0…⌊N/2⌋ (engine specification §4). */
export interface Spectrum {
  /** `A_k` of what the codes stand for; an amplitude-1 sine is 1. */
  readonly amplitudes: Float64Array;
  /** `A_k` of the levelled cycle: what was intended. */
  readonly intended: Float64Array;
  /** `A_k` of the error: what quantising added. */
  readonly added: Float64Array;
}

/** Lowest level shown, in dBFS. */
export const floorDbfs = -200;

/**
 * Spectra of a cycle r, of the error `e = q − r` and of what the codes stand for, q: `A_0 = |X_0|/N`,
 * `A_k = 2|X_k|/N`, `A_{N/2} = |X_{N/2}|/N`. The lines of q are the sum of the lines of both. Each has a transform of
 * its own, so that the small error carries no rounding noise of the cycle.
 */
export function spectrumOf(cycle: Float64Array, error: Float64Array): Spectrum {
  const size = cycle.length;
  const { bins, lines, otherLines, forward } = realTransformOf(size);
  forward(lines, cycle);
  forward(otherLines, error);
  const amplitudes = new Float64Array(bins);
  const intended = new Float64Array(bins);
  const added = new Float64Array(bins);
  const scale = 2 / size;
  for (let k = 0; k < bins; k += 1) {
    const re = lines[2 * k];
    const im = lines[2 * k + 1];
    const errorRe = otherLines[2 * k];
    const errorIm = otherLines[2 * k + 1];
    intended[k] = Math.sqrt(re * re + im * im) * scale;
    added[k] = Math.sqrt(errorRe * errorRe + errorIm * errorIm) * scale;
    amplitudes[k] = Math.sqrt((re + errorRe) * (re + errorRe) + (im + errorIm) * (im + errorIm)) * scale;
  }
  // DC and N/2 have no line on the other side to share with.
  for (const list of [amplitudes, intended, added]) {
    list[0] /= 2;
    if (size % 2 === 0) list[size / 2] /= 2;
  }
  return { amplitudes, intended, added };
}

/**
 * The strongest line `A_k`, k ≥ 1, of one signal: the same number, to the last bit, as the largest of its amplitudes,
 * with one root instead of one a line.
 */
export function strongestLineOf(signal: Float64Array): number {
  return realTransformOf(signal.length).strongest(signal) * (2 / signal.length);
}

/** 20·log10 of an amplitude, not below −200 dB. An amplitude-1 sine is 0 dBFS. */
export function dbfsOf(amplitude: number): number {
  return amplitude <= 1e-10 ? floorDbfs : 20 * Math.log10(amplitude);
}
