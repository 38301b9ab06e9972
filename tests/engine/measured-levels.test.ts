import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { holds, noise } from './support/seeded.ts';
import { valuesOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

/** §3.4 by trying every code: nearest in rounded distance, then the higher voltage, then the lower code. */
function byForce(x: number, levels: number[], range: Table['range']): number {
  const lowest = Math.min(...levels);
  const span = Math.max(...levels) - lowest;
  const grain = span / (levels.length - 1) / 2 ** 24;
  const wanted = lowest + (range === 'unipolar' ? x : (x + 1) / 2) * span;
  return levels
    .map((volts, code) => ({ volts, code, distance: Math.round(Math.abs(volts - wanted) / grain) }))
    .sort((a, b) => a.distance - b.distance || b.volts - a.volts || a.code - b.code)[0].code;
}

/** Volts in a few steps only: equal ones and exact ties come up often. */
const coarseLevels = fc.integer({ min: 1, max: 5 }).chain((bits) =>
  fc
    .array(
      fc.integer({ min: -8, max: 8 }).map((quarter) => quarter / 4),
      { minLength: 2 ** bits, maxLength: 2 ** bits },
    )
    .filter((levels) => new Set(levels).size > 1)
    .map((levels) => ({ bits, levels })),
);
const fineLevels = fc.integer({ min: 1, max: 7 }).chain((bits) =>
  fc
    .array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 2 ** bits, maxLength: 2 ** bits })
    .filter((levels) => Math.max(...levels) - Math.min(...levels) > 1e-3)
    .map((levels) => ({ bits, levels })),
);
const range = fc.constantFrom<Table['range']>('bipolar', 'unipolar');

describe('measured levels', () => {
  it('give the code that trying every code gives', () => {
    holds(
      fc.property(
        fc.oneof(coarseLevels, fineLevels),
        range,
        fc.integer({ min: 1, max: 1e6 }),
        ({ bits, levels }, range, seed) => {
          const values = Array.from(noise(60, seed), (x, k) =>
            k % 3 === 0 ? Math.round(x * 16) / 16 : x,
          ).map((x) => (range === 'unipolar' ? Math.abs(x) : x));
          const { codes } = buildTable(valuesOf(values, { bits, levels, range }));
          expect(Array.from(codes)).toEqual(values.map((x) => byForce(x, levels, range)));
        },
      ),
      300,
    );
  });

  it('a tie goes to the higher voltage, then to the lower code, across the last bits', () => {
    // Codes 1 and 3 share 1 V, codes 0 and 2 are 0 V; ½ V lies between, also when arithmetic blurs it.
    for (const blur of [-(2 ** -40), 0, 2 ** -40]) {
      const { codes } = buildTable(
        valuesOf([0.5 + blur, 0, 1, 0.49], { bits: 2, levels: [0, 1, 0, 1], range: 'unipolar' }),
      );
      expect(Array.from(codes)).toEqual([1, 0, 1, 0]);
    }
  });

  it('that are even give the codes of the even steps', () => {
    holds(
      fc.property(
        fc.integer({ min: 1, max: 12 }),
        range,
        fc.integer({ min: 1, max: 1e6 }),
        (bits, range, seed) => {
          const values = Array.from(noise(200, seed), (x) => (range === 'unipolar' ? Math.abs(x) : x));
          const levels = Array.from({ length: 2 ** bits }, (_, code) => code);
          const measured = buildTable(valuesOf(values, { bits, range, levels }));
          const even = buildTable(valuesOf(values, { bits, range }));
          expect(measured.codes).toEqual(even.codes);
          measured.values.forEach((q, k) => expect(q).toBeCloseTo(even.values[k], 13));
        },
      ),
    );
  });

  it('are what the values stand for', () => {
    const levels = [0.1, 1.9, 0.9, 3.1];
    const { codes, values } = buildTable(valuesOf([-1, -0.4, 0.3, 1], { bits: 2, levels }));
    expect(Array.from(codes)).toEqual([0, 2, 1, 3]);
    values.forEach((q, k) => expect(q).toBeCloseTo((2 * (levels[codes[k]] - 0.1)) / 3 - 1, 14));
  });
});
