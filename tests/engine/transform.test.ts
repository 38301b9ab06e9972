import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linesOf, lowLinesOf, realTransformOf, transformOf } from '../../shared/dft/index.ts';
import { holds, noise } from './support/seeded.ts';

const largeSizes = [4096, 32_749, 65_521, 65_535, 65_536];
const anySize = fc.oneof(fc.integer({ min: 2, max: 3000 }), fc.constantFrom(2, 3, 4, 5, 1024, 2048, 2999));
const seedNumber = fc.integer({ min: 1, max: 1_000_000 });

function transformed(data: Float64Array): Float64Array {
  const out = new Float64Array(data.length);
  transformOf(data.length / 2).forward(out, data);
  return out;
}

/** Largest difference against the root of the energy: what "equal" means for a transform. */
function distance(actual: Float64Array, wanted: Float64Array): number {
  let most = 0;
  let energy = 0;
  for (let i = 0; i < wanted.length; i += 1) {
    most = Math.max(most, Math.abs(actual[i] - wanted[i]));
    energy += wanted[i] ** 2;
  }
  return most / Math.sqrt(energy);
}
const rounding = 2e-14;

const energyOf = (data: Float64Array) => data.reduce((sum, x) => sum + x * x, 0);

/** X_k by the sum as it is written, angles reduced in whole numbers. */
function lineBySum(data: Float64Array, k: number): [re: number, im: number] {
  const size = data.length / 2;
  let re = 0;
  let im = 0;
  for (let n = 0; n < size; n += 1) {
    const angle = (-2 * Math.PI * ((n * k) % size)) / size;
    re += data[2 * n] * Math.cos(angle) - data[2 * n + 1] * Math.sin(angle);
    im += data[2 * n] * Math.sin(angle) + data[2 * n + 1] * Math.cos(angle);
  }
  return [re, im];
}

describe('the transform of any length', () => {
  const laws: [name: string, (size: number, seed: number) => void][] = [
    [
      'is the sum as it is written, line by line',
      (size, seed) => {
        const data = noise(2 * size, seed);
        const out = transformed(data);
        const tolerance = rounding * Math.sqrt(size * energyOf(data));
        for (const k of [0, 1, Math.floor(size / 2), size - 1, seed % size]) {
          const [re, im] = lineBySum(data, k);
          expect(Math.hypot(out[2 * k] - re, out[2 * k + 1] - im)).toBeLessThan(tolerance);
        }
      },
    ],
    [
      'is linear',
      (size, seed) => {
        const a = noise(2 * size, seed);
        const b = noise(2 * size, seed + 1);
        const [x, y] = [transformed(a), transformed(b)];
        const ofSum = transformed(a.map((value, i) => 0.75 * value - 2.5 * b[i]));
        expect(
          distance(
            ofSum,
            x.map((value, i) => 0.75 * value - 2.5 * y[i]),
          ),
        ).toBeLessThan(rounding);
      },
    ],
    [
      'turns a shift in time into a turn of phase',
      (size, seed) => {
        const data = noise(2 * size, seed);
        const shift = seed % size;
        const shifted = data.map((_, i) => data[(i + 2 * shift) % (2 * size)]);
        const turned = transformed(data);
        for (let k = 0; k < size; k += 1) {
          const angle = (2 * Math.PI * ((k * shift) % size)) / size;
          const [re, im] = [turned[2 * k], turned[2 * k + 1]];
          turned[2 * k] = re * Math.cos(angle) - im * Math.sin(angle);
          turned[2 * k + 1] = re * Math.sin(angle) + im * Math.cos(angle);
        }
        expect(distance(transformed(shifted), turned)).toBeLessThan(rounding);
      },
    ],
    [
      'keeps the energy (Parseval)',
      (size, seed) => {
        const data = noise(2 * size, seed);
        expect(energyOf(transformed(data)) / size / energyOf(data)).toBeCloseTo(1, 12);
      },
    ],
    [
      'comes back when it is done twice, read backwards',
      (size, seed) => {
        const data = noise(2 * size, seed);
        const twice = transformed(transformed(data));
        const back = data.map((_, i) => twice[(2 * (size - (i >> 1)) + (i & 1)) % (2 * size)] / size);
        expect(distance(back, data)).toBeLessThan(rounding);
      },
    ],
    [
      'of a real signal is the lower half of the complex one',
      (size, seed) => {
        const signal = noise(size, seed);
        const { bins, forward } = realTransformOf(size);
        const lines = new Float64Array(2 * bins);
        forward(lines, signal);
        const whole = transformed(
          Float64Array.from({ length: 2 * size }, (_, i) => (i % 2 ? 0 : signal[i / 2])),
        );
        expect(distance(lines, whole.slice(0, 2 * bins))).toBeLessThan(rounding);
      },
    ],
    [
      'gives the low lines of a signal 4 times as long',
      (size, seed) => {
        const signal = noise(4 * size, seed);
        const whole = linesOf(signal);
        const low = lowLinesOf(signal, 4);
        const bins = Math.floor(size / 2) + 1;
        expect([low.re.length, low.im.length]).toEqual([bins, bins]);
        const both = (lines: typeof low) =>
          Float64Array.from([...lines.re.slice(0, bins), ...lines.im.slice(0, bins)]);
        expect(distance(both(low), both(whole))).toBeLessThan(rounding);
      },
    ],
  ];

  it.each(laws)('%s', (_name, law) => {
    holds(fc.property(anySize, seedNumber, law), 60);
  });
  it.each(largeSizes)('holds the same laws at %i', { timeout: 20_000 }, (size) => {
    for (const [, law] of laws) law(size, 7);
  });

  it('an impulse has the same line everywhere', () => {
    for (const size of [2, 3, 7, 16, 100, 65_521]) {
      const data = new Float64Array(2 * size);
      data[0] = 1;
      const out = transformed(data);
      expect(out.every((value, i) => Math.abs(value - (i % 2 === 0 ? 1 : 0)) < 1e-12)).toBe(true);
    }
  });

  it('plans can be called in turns: none leaks into another', () => {
    const sizes = [5, 8, 7, 12, 100, 97, 64, 81, 1000, 31, 33, 63, 65, 6, 9];
    const wanted = sizes.map((size) => transformed(noise(2 * size, size)));
    for (let i = 0; i < 60; i += 1) {
      const pick = (i * 7) % sizes.length;
      expect(transformed(noise(2 * sizes[pick], sizes[pick]))).toEqual(wanted[pick]);
    }
  });
});
