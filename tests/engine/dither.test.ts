import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { valuesOf } from './support/waves.ts';

const length = 65_536;
const bits = 8;

/** Codes of a constant code position, dithered, as offsets from it. */
function offsetsAt(position: number, dither: 'rectangular' | 'triangular', seed: number): number[] {
  const values = new Array<number>(length).fill(position / (2 ** bits - 1));
  return Array.from(
    buildTable(valuesOf(values, { bits, range: 'unipolar', dither, seed })).codes,
    (code) => code - position,
  );
}
const mean = (list: number[]) => list.reduce((sum, x) => sum + x, 0) / list.length;
const variance = (list: number[]) => mean(list.map((x) => x * x)) - mean(list) ** 2;

// Properties of subtracted and non-subtracted dither: S. P. Lipshitz, R. A. Wannamaker & J. Vanderkooy,
// "Quantization and dither: a theoretical survey", J. Audio Eng. Soc. 40 (1992). Bounds are five standard errors.
describe('dither', () => {
  it.each([100, 100.25, 100.5, 100.8])('rectangular keeps the mean at %d', (position) => {
    for (const seed of [1, 77]) {
      const offsets = offsetsAt(position, 'rectangular', seed);
      expect(Math.abs(mean(offsets))).toBeLessThan((5 * 0.5) / Math.sqrt(length));
      // Its variance depends on the position: f·(1−f) of the fraction f.
      const fraction = position % 1;
      expect(variance(offsets)).toBeCloseTo(fraction * (1 - fraction), 1);
      expect(new Set(offsets).size).toBeLessThanOrEqual(2);
    }
  });

  it.each([100, 100.25, 100.5, 100.8])(
    'triangular keeps the mean, and a variance of ¼ LSB², at %d',
    (position) => {
      for (const seed of [1, 77]) {
        const offsets = offsetsAt(position, 'triangular', seed);
        expect(Math.abs(mean(offsets))).toBeLessThan((5 * 0.5) / Math.sqrt(length));
        expect(Math.abs(variance(offsets) - 0.25)).toBeLessThan(0.01);
        expect(new Set(offsets).size).toBeLessThanOrEqual(3);
      }
    },
  );

  it('neighbouring entries do not depend on each other', () => {
    const offsets = offsetsAt(100.5, 'triangular', 5);
    const middle = mean(offsets);
    const centred = offsets.map((x) => x - middle);
    for (const lag of [1, 2, 64]) {
      const correlation = mean(centred.map((x, k) => x * centred[(k + lag) % length])) / variance(offsets);
      expect(Math.abs(correlation)).toBeLessThan(5 / Math.sqrt(length));
    }
  });

  it('is the same with the same seed, another with another', () => {
    const of = (seed: number) => offsetsAt(100.5, 'rectangular', seed);
    expect(of(9)).toEqual(of(9));
    for (const other of [10, 0, 4_294_967_295]) expect(of(other)).not.toEqual(of(9));
  });

  it('takes the distortion of a small sine away', () => {
    const values = Float64Array.from(
      { length: 4096 },
      (_, k) => (1.3 / 255) * Math.sin((2 * Math.PI * 5 * k) / 4096),
    );
    const plain = buildTable(valuesOf(values, { bits })).report;
    const dithered = buildTable(valuesOf(values, { bits, dither: 'triangular' })).report;
    expect(Number(dithered.thdDb)).toBeLessThan(Number(plain.thdDb) - 6);
    expect(Number(dithered.unwantedDb)).toBeLessThan(Number(plain.unwantedDb));
  });
});
