import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { sumHeadroom, sumOfVoices } from '../../shared/playback/index.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

const sineWords = (length: number, bits: number) =>
  buildTable(waveOf({ table: { length, bits, coding: 'twos-complement' } })).stored;

describe('a sum of voices', () => {
  it('of two full sines takes one bit more, and one shift puts it back', () => {
    const tables = [sineWords(256, 8), sineWords(64, 8)];
    const headroom = sumHeadroom(tables, 8);
    expect(headroom).toEqual({
      lowest: -256,
      highest: 254,
      sumBits: 9,
      shift: 1,
      lossDb: 20 * Math.log10(2),
    });
  });

  it.each([
    [1, 8, 0],
    [2, 8, 1],
    [3, 8, 2],
    [4, 8, 2],
    [5, 8, 3],
    [2, 9, 0],
  ])('of %i full tables of 8 bits in %i bits needs a shift of %i', (count, bits, shift) => {
    const tables = Array.from({ length: count }, () => sineWords(256, 8));
    expect(sumHeadroom(tables, bits).shift).toBe(shift);
  });

  it('never leaves its ends nor, shifted, the converter, and reaches the ends', () => {
    const table = fc.array(fc.integer({ min: -128, max: 127 }), { minLength: 8, maxLength: 8 });
    const step = fc.integer({ min: 1, max: 4095 });
    holds(
      fc.property(table, table, step, step, (first, second, firstStep, secondStep) => {
        const { lowest, highest, shift } = sumHeadroom([first, second], 8);
        const sums = sumOfVoices(
          [
            { words: first, accumulator: { accumulatorBits: 12, stepWord: firstStep } },
            { words: second, accumulator: { accumulatorBits: 12, stepWord: secondStep } },
          ],
          4096,
        );
        expect(Math.min(...sums)).toBeGreaterThanOrEqual(lowest);
        expect(Math.max(...sums)).toBeLessThanOrEqual(highest);
        expect(Math.min(...sums) >> shift).toBeGreaterThanOrEqual(-128);
        expect(Math.max(...sums) >> shift).toBeLessThanOrEqual(127);
        expect([lowest, highest]).toEqual([
          Math.min(...first) + Math.min(...second),
          Math.max(...first) + Math.max(...second),
        ]);
      }),
    );
  });

  it('adds the entries that the top bits of each accumulator point at', () => {
    const sums = sumOfVoices(
      [
        { words: [1, 2, 3, 4], accumulator: { accumulatorBits: 4, stepWord: 6 } },
        { words: [10, 20], accumulator: { accumulatorBits: 48, stepWord: 2 ** 47 + 2 ** 46 } },
      ],
      6,
    );
    // Phases 0 6 12 2 8 14 of 16; quarters 0 3 2 1 0 3 of 4.
    expect(Array.from(sums)).toEqual([1 + 10, 2 + 20, 4 + 20, 1 + 10, 3 + 10, 4 + 20]);
  });
});
