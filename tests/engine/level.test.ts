import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { holds } from './support/seeded.ts';
import { valuesOf } from './support/waves.ts';

type Level = NonNullable<DefinitionInput['level']>;
type Table = NonNullable<DefinitionInput['table']>;

const levelled = (values: number[], level: Level, table: Table = {}) =>
  buildTable(valuesOf(values, table, level));
const moving = fc
  .array(fc.integer({ min: -1000, max: 1000 }), { minLength: 4, maxLength: 60 })
  .map((list) => list.map((whole) => whole / 250))
  .filter((list) => Math.max(...list) > Math.min(...list) && Math.max(...list) > 0);
const level = fc.integer({ min: 1, max: 100 }).map((percent) => percent / 100);
const expectNear = (actual: ArrayLike<number>, wanted: number[]) =>
  wanted.forEach((value, k) => expect(actual[k]).toBeCloseTo(value, 13));
const clipped = (x: number, lowest: number) => Math.min(Math.max(x, lowest), 1);

describe('level', () => {
  it('"none" takes values as they are, times the level, and clips', () => {
    holds(
      fc.property(moving, level, (values, share) => {
        const { cycle, report } = levelled(values, { normalise: 'none', level: share });
        expectNear(
          cycle,
          values.map((x) => clipped(x * share, -1)),
        );
        expect(report.clippedSamples).toBe(values.filter((x) => Math.abs(x * share) > 1 + 1e-12).length);
      }),
    );
  });

  it('"peak" brings the largest absolute value to the level', () => {
    holds(
      fc.property(moving, level, (values, share) => {
        const peak = Math.max(...values.map(Math.abs));
        const { cycle } = levelled(values, { normalise: 'peak', level: share });
        expectNear(
          cycle,
          values.map((x) => (x / peak) * share),
        );
      }),
    );
  });

  it('"span" brings lowest and highest to the ends, about the middle of the range', () => {
    holds(
      fc.property(
        moving,
        level,
        fc.constantFrom<'bipolar' | 'unipolar'>('bipolar', 'unipolar'),
        (values, share, range) => {
          const { cycle } = levelled(values, { normalise: 'span', level: share }, { range });
          const [low, high] = [Math.min(...cycle), Math.max(...cycle)];
          const [bottom, middle] = range === 'bipolar' ? [-1, 0] : [0, 0.5];
          expect(low).toBeCloseTo(middle + (bottom - middle) * share, 13);
          expect(high).toBeCloseTo(middle + (1 - middle) * share, 13);
        },
      ),
    );
  });

  it('takes the mean off first', () => {
    holds(
      fc.property(
        moving,
        fc.constantFrom<Level['normalise']>('none', 'peak', 'span'),
        (values, normalise) => {
          const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
          const shifted = values.map((x) => x - mean);
          fc.pre(Math.max(...shifted) > 0.01);
          expectNear(
            levelled(values, { normalise, removeMean: true }).cycle,
            Array.from(levelled(shifted, { normalise }).cycle),
          );
        },
      ),
    );
  });

  it('at level 0 is silence in the middle', () => {
    expect(new Set(levelled([1, -1, 0.5, 0], { level: 0 }).codes)).toEqual(new Set([128]));
    expect(
      new Set(levelled([1, 0, 0.5, 0], { level: 0, normalise: 'span' }, { range: 'unipolar' }).codes),
    ).toEqual(new Set([128]));
  });

  it('a value out of range by rounding alone is no clipped sample', () => {
    const over = 1 + 5e-13;
    expect(levelled([over, -over, 0, 0.5], { normalise: 'none' }).report.clippedSamples).toBe(0);
    const { report, warnings, cycle } = levelled([1 + 2e-12, -1.5, 0, 0.5], { normalise: 'none' });
    expect(report.clippedSamples).toBe(2);
    expect(warnings).toMatchObject([{ code: 'clipped', path: 'level' }]);
    expect(Array.from(cycle)).toEqual([1, -1, 0, 0.5]);
  });

  it('what lies below 0 is clipped where the range is unipolar', () => {
    const { cycle, report } = levelled([1, -1, 0.25, -1e-13], { normalise: 'none' }, { range: 'unipolar' });
    expect(Array.from(cycle)).toEqual([1, 0, 0.25, 0]);
    expect(report.clippedSamples).toBe(1);
  });
});

describe('transfer', () => {
  const unipolar: Table = { range: 'unipolar' };

  it('gamma raises to a power after the level', () => {
    holds(
      fc.property(
        level,
        fc.integer({ min: 1, max: 100 }).map((tenths) => tenths / 10),
        (share, gamma) => {
          const values = [0, 0.1, 0.25, 0.5, 0.9, 1];
          const { cycle } = levelled(values, { level: share, transfer: { gamma } }, unipolar);
          expectNear(
            cycle,
            values.map((x) => (x * share) ** gamma),
          );
        },
      ),
    );
  });

  it('lightness joins at L* = 8 and ends at 0 and 1', () => {
    const { cycle } = levelled([0, 0.0799999, 0.08, 0.0800001, 1], { transfer: 'cie-lightness' }, unipolar);
    expect(cycle[0]).toBe(0);
    expect(cycle[4]).toBe(1);
    expect(cycle[2] / cycle[1] - 1).toBeLessThan(1e-4);
    expect(cycle[3] / cycle[2] - 1).toBeLessThan(1e-4);
  });

  it('a sample below 0 is clipped and counted, whatever the power', () => {
    for (const transfer of [{ gamma: 0.5 }, { gamma: 2 }, 'cie-lightness'] as const) {
      const { cycle, report } = levelled([-0.5, 0.5, 1, 0], { normalise: 'none', transfer }, unipolar);
      expect(cycle[0]).toBe(0);
      expect(report.clippedSamples).toBe(1);
    }
  });
});
