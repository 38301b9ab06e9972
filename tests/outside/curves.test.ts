import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { transformOf } from '../../shared/dft/index.ts';
import type { Point } from '../../shared/contract/index.ts';
import { closedCurve } from '../../shared/waveform/index.ts';
import { examplesOf, noise } from '../engine/support/seeded.ts';
import { askPython } from './numpy/python.ts';
import { commitSeed } from './numpy/seed.ts';

// Sources: SciPy's CubicSpline (bc_type="periodic") and PchipInterpolator (Fritsch & Butland 1984), NumPy's
// fft (pocketfft). Versions are Debian 12's: SciPy 1.10, NumPy 1.24.

const sizes = [
  2, 3, 4, 5, 6, 7, 8, 12, 31, 97, 100, 243, 256, 360, 719, 1000, 1024, 2999, 3000, 8191, 16_384, 44_100,
  65_521, 65_535, 65_536,
];

const pointLists = examplesOf(
  fc
    .uniqueArray(fc.double({ min: 0, max: 0.9999, noNaN: true }), { minLength: 3, maxLength: 40 })
    .map((places) => [...places].sort((a, b) => a - b))
    .filter((places) => places.every((x, i) => i === 0 || x - places[i - 1] > 1e-4))
    .chain((places) =>
      fc
        .array(fc.oneof(fc.double({ min: -1, max: 1, noNaN: true }), fc.constantFrom(0, 0.5, 1)), {
          minLength: places.length,
          maxLength: places.length,
        })
        .map((ys): Point[] => places.map((x, i) => ({ x, y: ys[i] }))),
    ),
  60,
  commitSeed(),
);

/** Phases from x₀ over one cycle: SciPy's spline reaches no further. */
const phasesFrom = (start: number) => Array.from({ length: 200 }, (_, i) => start + i / 200);
const question = pointLists.map((points) => ({ points, at: phasesFrom(points[0].x) }));
const signals = sizes.map((size) => ({
  re: Array.from(noise(size, size)),
  im: Array.from(noise(size, size + 1)),
}));
const answer = askPython<{
  splines: number[][];
  pchips: number[][];
  transforms: { re: number[]; im: number[] }[];
}>('curves.py', { splines: question, pchips: question, transforms: signals });

describe('SciPy', () => {
  it.each([
    ['spline', 'splines'],
    ['monotone', 'pchips'],
  ] as const)('%s is the periodic curve of %s', (interpolation, name) => {
    pointLists.forEach((points, i) => {
      const curve = closedCurve({ interpolation, points });
      const wanted = answer[name][i];
      const size = Math.max(1, ...wanted.map(Math.abs));
      question[i].at.forEach((t, k) => {
        expect(Math.abs(curve(t >= 1 ? t - 1 : t) - wanted[k])).toBeLessThan(1e-9 * size);
      });
    });
  });
});

describe('NumPy', () => {
  it.each(sizes.map((size, i) => [size, i] as const))('a transform of %i is the same', (size, i) => {
    const { re, im } = signals[i];
    const data = Float64Array.from({ length: 2 * size }, (_, j) => (j % 2 === 0 ? re : im)[j >> 1]);
    const out = new Float64Array(2 * size);
    transformOf(size).forward(out, data);
    const wanted = answer.transforms[i];
    let most = 0;
    for (let k = 0; k < size; k += 1) {
      most = Math.max(most, Math.abs(out[2 * k] - wanted.re[k]), Math.abs(out[2 * k + 1] - wanted.im[k]));
    }
    // Lines of noise are about √N; rounding is about their last bit times log₂ N.
    expect(most / Math.sqrt(size)).toBeLessThan(1e-13);
  });
});
