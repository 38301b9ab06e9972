import { FFT } from 'ml-fft';
import { describe, expect, it } from 'vitest';
import { transformOf } from '../../shared/dft/index.ts';
import { noise } from '../engine/support/seeded.ts';

// Source: the npm package ml-fft 1.3.5, which shares no code with the package the engine uses. It takes powers
// of two alone; the other lengths, r·2^m, are put together from its transforms of every r-th entry:
// X_k = Σ_j e^(−2πi·jk/N)·Y_j,(k mod 2^m), Y_j the transform of entries j, j+r, j+2r, …

/** Interleaved re, im, as the engine's transform takes and gives them. */
function bySecondPackage(data: Float64Array, classes: number): Float64Array {
  const size = data.length / 2;
  const part = size / classes;
  const out = new Float64Array(2 * size);
  FFT.init(part);
  for (let j = 0; j < classes; j += 1) {
    const re = Float64Array.from({ length: part }, (_, n) => data[2 * (j + n * classes)]);
    const im = Float64Array.from({ length: part }, (_, n) => data[2 * (j + n * classes) + 1]);
    FFT.fft(re, im);
    for (let k = 0; k < size; k += 1) {
      const angle = (-2 * Math.PI * ((j * k) % size)) / size;
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      out[2 * k] += re[k % part] * c - im[k % part] * s;
      out[2 * k + 1] += re[k % part] * s + im[k % part] * c;
    }
  }
  return out;
}

describe('a second FFT package', () => {
  it.each([
    [4, 1],
    [8, 1],
    [256, 1],
    [4096, 1],
    [65_536, 1],
    [12, 3],
    [24, 3],
    [100, 25],
    [360, 45],
    [1000, 125],
    [1536, 3],
    [3000, 375],
    [20_480, 5],
    [40_000, 625],
  ])('gives the same lines at %i', (size, classes) => {
    const data = noise(2 * size, size);
    const out = new Float64Array(2 * size);
    transformOf(size).forward(out, data);
    const wanted = bySecondPackage(data, classes);
    const most = out.reduce((furthest, value, i) => Math.max(furthest, Math.abs(value - wanted[i])), 0);
    // Its sine table comes from a recurrence, which loses some digits in long tables.
    expect(most / Math.sqrt(size)).toBeLessThan(1e-11);
  });
});
