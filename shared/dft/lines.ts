import { realTransformOf } from './real-transform.ts';
import { transformOf } from './transform.ts';

/** The lines `X_k` of a real signal of N entries, k = 0…⌊N/2⌋, unscaled. */
export interface Lines {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** DFT of one real signal of any length. */
export function linesOf(signal: Float64Array): Lines {
  const { bins, forward } = realTransformOf(signal.length);
  const lines = new Float64Array(2 * bins);
  forward(lines, signal);
  const re = new Float64Array(bins);
  const im = new Float64Array(bins);
  for (let k = 0; k < bins; k += 1) {
    re[k] = lines[2 * k];
    im[k] = lines[2 * k + 1];
  }
  return { re, im };
}

/**
 * Lines k = 0…⌊N/2⌋ of a real signal of `parts·N` entries, without a transform of that length: with `Y_j` the
 * transform of entries j, j+parts, j+2·parts, …, `X_k = Σ_j e^(−2πi·jk/(parts·N))·Y_{j,k}` (decimation in time).
 * Two `Y_j` come from each complex transform of N.
 *
 * @param parts an even number
 */
export function lowLinesOf(signal: Float64Array, parts: number): Lines {
  const size = signal.length / parts;
  const { data, out, forward } = transformOf(size);
  const bins = Math.floor(size / 2) + 1;
  const lines = { re: new Float64Array(bins), im: new Float64Array(bins) };
  for (let j = 0; j < parts; j += 2) {
    for (let n = 0; n < size; n += 1) {
      data[2 * n] = signal[j + n * parts];
      data[2 * n + 1] = signal[j + 1 + n * parts];
    }
    forward(out, data);
    for (let k = 0; k < bins; k += 1) {
      const mirror = k === 0 ? 0 : size - k;
      const sumRe = (out[2 * k] + out[2 * mirror]) / 2;
      const sumIm = (out[2 * k + 1] - out[2 * mirror + 1]) / 2;
      addTurned(lines, k, sumRe, sumIm, (j * k) / signal.length);
      const differenceRe = (out[2 * k + 1] + out[2 * mirror + 1]) / 2;
      const differenceIm = (out[2 * mirror] - out[2 * k]) / 2;
      addTurned(lines, k, differenceRe, differenceIm, ((j + 1) * k) / signal.length);
    }
  }
  return lines;
}

/** Adds `(re + i·im)·e^(−2πi·turns)` to line k. */
function addTurned(lines: Lines, k: number, re: number, im: number, turns: number): void {
  const c = Math.cos(2 * Math.PI * turns);
  const s = Math.sin(2 * Math.PI * turns);
  lines.re[k] += re * c + im * s;
  lines.im[k] += im * c - re * s;
}

/** Phase of each line in degrees of a sine, −180 ≤ φ ≤ 180. */
export function phasesDegOf({ re, im }: Lines): Float64Array {
  const phases = new Float64Array(re.length);
  const degrees = 180 / Math.PI;
  // a·sin(θ+φ) has the line (a/2)·e^(i(φ−90°)): its cosine part is a·sin φ, its sine part a·cos φ.
  for (let k = 0; k < re.length; k += 1) phases[k] = Math.atan2(re[k], -im[k]) * degrees;
  return phases;
}
