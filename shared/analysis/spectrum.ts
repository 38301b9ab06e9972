import { transformOf } from '../dft/index.ts';

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
 * Spectra of a cycle r, of what the codes stand for, q, and of the error `e = q − r`: `A_0 = |X_0|/N`,
 * `A_k = 2|X_k|/N`, `A_{N/2} = |X_{N/2}|/N`.
 *
 * One complex transform gives both: of `x = r/r̂ + i·e/ê` the lines are `R_k/r̂ = (X_k + conj X_{N−k})/2` and
 * `E_k/ê = (X_k − conj X_{N−k})/2i`. Each carries the rounding noise of the other, so both are brought to one size
 * first, by their peaks r̂ and ê. The lines of q are the sum of both.
 */
export function spectrumOf(
  cycle: Float64Array,
  values: Float64Array,
  { cyclePeak, errorPeak }: { cyclePeak: number; errorPeak: number },
): Spectrum {
  const size = cycle.length;
  const { data, out, forward } = transformOf(size);
  const cycleUnit = cyclePeak === 0 ? 1 : cyclePeak;
  const errorUnit = errorPeak === 0 ? 1 : errorPeak;
  for (let n = 0; n < size; n += 1) {
    data[2 * n] = cycle[n] / cycleUnit;
    data[2 * n + 1] = (values[n] - cycle[n]) / errorUnit;
  }
  forward(out, data);

  const bins = Math.floor(size / 2) + 1;
  const amplitudes = new Float64Array(bins);
  const intended = new Float64Array(bins);
  const added = new Float64Array(bins);
  const cycleScale = cycleUnit / size;
  const errorScale = errorUnit / size;
  for (let k = 0; k < bins; k += 1) {
    const mirror = k === 0 ? 0 : size - k;
    const re = out[2 * k] + out[2 * mirror];
    const im = out[2 * k + 1] - out[2 * mirror + 1];
    const errorRe = out[2 * k + 1] + out[2 * mirror + 1];
    const errorIm = out[2 * mirror] - out[2 * k];
    intended[k] = Math.sqrt(re * re + im * im) * cycleScale;
    added[k] = Math.sqrt(errorRe * errorRe + errorIm * errorIm) * errorScale;
    const sumRe = re * cycleScale + errorRe * errorScale;
    const sumIm = im * cycleScale + errorIm * errorScale;
    amplitudes[k] = Math.sqrt(sumRe * sumRe + sumIm * sumIm);
  }
  // DC and N/2 have no line on the other side to share with.
  for (const list of [amplitudes, intended, added]) {
    list[0] /= 2;
    if (size % 2 === 0) list[size / 2] /= 2;
  }
  return { amplitudes, intended, added };
}

/** 20·log10 of an amplitude, not below −200 dB. An amplitude-1 sine is 0 dBFS. */
export function dbfsOf(amplitude: number): number {
  return amplitude <= 1e-10 ? floorDbfs : 20 * Math.log10(amplitude);
}
