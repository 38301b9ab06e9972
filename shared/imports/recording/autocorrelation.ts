import FFT from 'fft.js';

/**
 * Normalised square difference of a signal with itself, one value a lag 0…lags−1 (P. McLeod, G. Wyvill, A smarter way
 * to find pitch, 2005): `2·Σ x_j·x_{j+τ} / Σ (x_j² + x_{j+τ}²)`, 1 where the signal repeats after τ, −1 where it
 * is turned over.
 *
 * The sums come block by block: of a block a of B entries and the 2B from its start on, c, the products of lines add up
 * over all blocks, and one transform back gives the sums of every lag below B. `a + i·c` goes through one complex
 * transform, so a recording of any length takes transforms of 2B alone.
 *
 * @param lags a power of two, at least 2
 */
export function squareDifference(signal: Float64Array, lags: number): Float64Array {
  const size = 2 * lags;
  const fft = new FFT(size);
  const data = new Float64Array(2 * size);
  const out = new Float64Array(2 * size);
  const cross = new Float64Array(2 * size);
  for (let start = 0; start < signal.length; start += lags) {
    for (let n = 0; n < size; n += 1) {
      const x = start + n < signal.length ? signal[start + n] : 0;
      data[2 * n] = n < lags ? x : 0;
      data[2 * n + 1] = x;
    }
    fft.transform(out, data);
    addCross(cross, out, size);
  }

  // The sums are real and the lines those of a real signal: conjugated, the forward transform turns back.
  for (let k = 1; k < 2 * size; k += 2) cross[k] = -cross[k];
  fft.transform(out, cross);
  return normalised(signal, out, lags, size);
}

/** Adds `conj(A_k)·C_k`, A and C the lines of real and imaginary part. */
function addCross(cross: Float64Array, out: Float64Array, size: number): void {
  for (let k = 0; k < size; k += 1) {
    const mirror = k === 0 ? 0 : size - k;
    const aRe = (out[2 * k] + out[2 * mirror]) / 2;
    const aIm = (out[2 * k + 1] - out[2 * mirror + 1]) / 2;
    const cRe = (out[2 * k + 1] + out[2 * mirror + 1]) / 2;
    const cIm = (out[2 * mirror] - out[2 * k]) / 2;
    cross[2 * k] += aRe * cRe + aIm * cIm;
    cross[2 * k + 1] += aRe * cIm - aIm * cRe;
  }
}

function normalised(signal: Float64Array, sums: Float64Array, lags: number, size: number): Float64Array {
  let energy = 0;
  for (let j = 0; j < signal.length; j += 1) energy += signal[j] * signal[j];
  const result = new Float64Array(lags);
  const silent = energy * 1e-12;
  // Σ x_j² + Σ x_{j+τ}², each sum without the τ entries that have no partner.
  let both = 2 * energy;
  for (let lag = 0; lag < lags && lag < signal.length; lag += 1) {
    result[lag] = both > silent ? (2 * sums[2 * lag]) / size / both : 0;
    const [first, last] = [signal[lag], signal[signal.length - 1 - lag]];
    both -= first * first + last * last;
  }
  return result;
}
