import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { holds } from './support/seeded.ts';
import { valuesOf } from './support/waves.ts';

const tableOf = (codes: number[], bits: number) =>
  buildTable(
    valuesOf(
      codes.map((code) => code / (2 ** bits - 1)),
      { bits, range: 'unipolar' },
    ),
  );

const onesIn = (word: number) => word.toString(2).replaceAll('0', '').length;

describe('bits that change', () => {
  it('are counted at every step of the loop, the worst and first kept', () => {
    const codes = fc.integer({ min: 1, max: 16 }).chain((bits) =>
      fc.record({
        bits: fc.constant(bits),
        list: fc.array(fc.nat(2 ** bits - 1), { minLength: 2, maxLength: 200 }),
      }),
    );
    holds(
      fc.property(codes, ({ bits, list }) => {
        const { report, codes: built } = tableOf(list, bits);
        expect(Array.from(built)).toEqual(list);
        const steps = list.map((from, index) => ({ from, index, to: list[(index + 1) % list.length] }));
        const changed = steps.map(({ from, to }) => onesIn(from ^ to));
        const bitsAtWorst = Math.max(...changed);
        expect(report.meanToggles).toBeCloseTo(
          changed.reduce((sum, ones) => sum + ones, 0) / list.length,
          12,
        );
        expect(report.worstToggle).toEqual({ bits: bitsAtWorst, ...steps[changed.indexOf(bitsAtWorst)] });
      }),
      200,
    );
  });

  it('are all of them at the middle of the range', () => {
    expect(tableOf([0, 32_767, 32_768, 16_384], 16).report.worstToggle).toEqual({
      bits: 16,
      index: 1,
      from: 32_767,
      to: 32_768,
    });
  });
});

describe('bytes', () => {
  it('are one an entry up to 8 bits, else two', () => {
    expect([1, 8, 9, 16].map((bits) => tableOf([0, 1, 0], bits).report.tableBytes)).toEqual([3, 3, 6, 6]);
  });
});
