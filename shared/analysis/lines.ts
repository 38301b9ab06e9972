import { transformOf } from './transform.ts';

/** The lines `X_k` of a real signal of N entries, k = 0…⌊N/2⌋, unscaled. */
export interface Lines {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

function emptyLines(size: number): Lines {
  const count = Math.floor(size / 2) + 1;
  return { re: new Float64Array(count), im: new Float64Array(count) };
}

/**
 * DFTs of two real signals of one length by a single complex transform: `x = a + i·b` gives
 * `A_k = (X_k + conj X_{N−k})/2` and `B_k = (X_k − conj X_{N−k})/2i`. The signals should be of like size, as
 * each carries the rounding noise of the other.
 */
export function linesOfPair(a: Float64Array, b: Float64Array): { a: Lines; b: Lines } {
  const size = a.length;
  const data = new Float64Array(2 * size);
  for (let n = 0; n < size; n += 1) {
    data[2 * n] = a[n];
    data[2 * n + 1] = b[n];
  }
  const out = new Float64Array(2 * size);
  transformOf(size).forward(out, data);

  const linesA = emptyLines(size);
  const linesB = emptyLines(size);
  for (let k = 0; k < linesA.re.length; k += 1) {
    const mirror = k === 0 ? 0 : size - k;
    const re = out[2 * k];
    const im = out[2 * k + 1];
    const mirrorRe = out[2 * mirror];
    const mirrorIm = out[2 * mirror + 1];
    linesA.re[k] = (re + mirrorRe) / 2;
    linesA.im[k] = (im - mirrorIm) / 2;
    linesB.re[k] = (im + mirrorIm) / 2;
    linesB.im[k] = (mirrorRe - re) / 2;
  }
  return { a: linesA, b: linesB };
}

/** DFT of one real signal of any length. */
export function linesOf(signal: Float64Array): Lines {
  const size = signal.length;
  const data = new Float64Array(2 * size);
  for (let n = 0; n < size; n += 1) data[2 * n] = signal[n];
  const out = new Float64Array(2 * size);
  transformOf(size).forward(out, data);
  const lines = emptyLines(size);
  for (let k = 0; k < lines.re.length; k += 1) {
    lines.re[k] = out[2 * k];
    lines.im[k] = out[2 * k + 1];
  }
  return lines;
}
