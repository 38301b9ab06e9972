import FFT from 'fft.js';

/** Complex DFT of one size, `X_k = Σ x_n·e^(−2πi·nk/N)`, unscaled, on interleaved re, im arrays. */
export interface Transform {
  readonly size: number;
  /** Fills `out` (2N numbers) from `data` (2N numbers). The two must be different arrays. */
  readonly forward: (out: Float64Array, data: Float64Array) => void;
  /** Two arrays of 2N numbers for any caller's use; what they hold lasts until the next caller's. */
  readonly data: Float64Array;
  readonly out: Float64Array;
}

/** Plans kept for reuse, oldest first, as long as their sizes come to no more than this: some 40 MB. */
const plans = new Map<number, Transform>();
const entriesKept = 2 ** 18;

/** The transform of any size ≥ 1: the FFT package where the size is a power of two, else Bluestein's. */
export function transformOf(size: number): Transform {
  const known = plans.get(size);
  if (known !== undefined) return known;
  const plan = {
    size,
    forward: planFor(size),
    data: new Float64Array(2 * size),
    out: new Float64Array(2 * size),
  };
  let kept = size;
  for (const other of plans.keys()) kept += other;
  for (const oldest of plans.keys()) {
    if (kept <= entriesKept) break;
    plans.delete(oldest);
    kept -= oldest;
  }
  plans.set(size, plan);
  return plan;
}

function planFor(size: number): Transform['forward'] {
  if (size <= 3) return directTransform(size);
  if ((size & (size - 1)) === 0) return powerOfTwoTransform(size);
  return chirpTransform(size);
}

function powerOfTwoTransform(size: number): Transform['forward'] {
  const fft = new FFT(size);
  return (out, data) => fft.transform(out, data);
}

/** The sum as it is written; for the few sizes that the package does not take. */
function directTransform(size: number): Transform['forward'] {
  return (out, data) => {
    for (let k = 0; k < size; k += 1) {
      let re = 0;
      let im = 0;
      for (let n = 0; n < size; n += 1) {
        const angle = (-2 * Math.PI * ((n * k) % size)) / size;
        const c = Math.cos(angle);
        const s = Math.sin(angle);
        re += data[2 * n] * c - data[2 * n + 1] * s;
        im += data[2 * n] * s + data[2 * n + 1] * c;
      }
      out[2 * k] = re;
      out[2 * k + 1] = im;
    }
  };
}

/**
 * Bluestein's chirp-z transform (L. I. Bluestein, 1970): with `nk = (n² + k² − (k−n)²)/2` the DFT becomes
 * `X_k = w_k · Σ (x_n·w_n)·conj(w_{k−n})`, `w_n = e^(−πi·n²/N)`: a convolution, done by a power-of-two FFT.
 */
function chirpTransform(size: number): Transform['forward'] {
  let padded = 1;
  while (padded < 2 * size - 1) padded *= 2;
  const fft = new FFT(padded);

  const chirp = new Float64Array(2 * size);
  for (let n = 0; n < size; n += 1) {
    // n² taken modulo 2N in whole numbers: the angle keeps its last bits at any length.
    const angle = (-Math.PI * ((n * n) % (2 * size))) / size;
    chirp[2 * n] = Math.cos(angle);
    chirp[2 * n + 1] = Math.sin(angle);
  }
  const kernel = new Float64Array(2 * padded);
  for (let n = 0; n < size; n += 1) {
    const mirrored = n === 0 ? 0 : padded - n;
    kernel[2 * n] = kernel[2 * mirrored] = chirp[2 * n];
    kernel[2 * n + 1] = kernel[2 * mirrored + 1] = -chirp[2 * n + 1];
  }
  const kernelLines = new Float64Array(2 * padded);
  fft.transform(kernelLines, kernel);

  const work = new Float64Array(2 * padded);
  const lines = new Float64Array(2 * padded);
  return (out, data) => {
    work.fill(0, 2 * size);
    for (let i = 0; i < 2 * size; i += 2) {
      work[i] = data[i] * chirp[i] - data[i + 1] * chirp[i + 1];
      work[i + 1] = data[i] * chirp[i + 1] + data[i + 1] * chirp[i];
    }
    fft.transform(lines, work);
    // Conjugated on the way in and out, the forward FFT serves as the inverse.
    for (let i = 0; i < 2 * padded; i += 2) {
      const re = lines[i] * kernelLines[i] - lines[i + 1] * kernelLines[i + 1];
      const im = lines[i] * kernelLines[i + 1] + lines[i + 1] * kernelLines[i];
      work[i] = re;
      work[i + 1] = -im;
    }
    fft.transform(lines, work);
    const scale = 1 / padded;
    for (let i = 0; i < 2 * size; i += 2) {
      const re = lines[i] * scale;
      const im = -lines[i + 1] * scale;
      out[i] = re * chirp[i] - im * chirp[i + 1];
      out[i + 1] = re * chirp[i + 1] + im * chirp[i];
    }
  };
}
