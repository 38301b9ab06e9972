import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable, type BuiltTable } from '../../shared/build-table.ts';
import { Refusal, reportSchema, type DefinitionInput } from '../../shared/contract/index.ts';
import { ditheredDefinition } from './support/definitions.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

/** A refusal of the signal or of the fold is an answer too; any other error is a defect. */
function tableOrRefusal(definition: DefinitionInput): BuiltTable | Refusal {
  try {
    return buildTable(definition);
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
}

function expectWhole(table: BuiltTable): void {
  const { definition, cycle, values, codes, stored, report, spectrum } = table;
  const { length, bits, range, fold, coding } = definition.table;
  const bins = Math.floor(length / 2) + 1;
  expect([cycle.length, values.length, codes.length]).toEqual([length, length, length]);
  expect(stored.length).toBe(fold === 'quarter' ? length / 4 : length);
  for (const list of Object.values(spectrum)) expect(list.length).toBe(bins);

  // The schema takes finite numbers alone; `null` stands for a figure that does not exist.
  reportSchema.parse(report);
  const lists = [cycle, values, ...Object.values(spectrum)];
  expect(lists.every((list) => list.every(Number.isFinite))).toBe(true);
  expect(codes.every((code) => code < 2 ** bits)).toBe(true);
  const lowestWord = coding === 'twos-complement' ? -(2 ** (bits - 1)) : 0;
  expect(stored.every((word) => word >= lowestWord && word < lowestWord + 2 ** bits)).toBe(true);
  expect(cycle.every((x) => x <= 1 && x >= (range === 'bipolar' ? -1 : 0))).toBe(true);
}

describe('any definition that is taken', () => {
  it('gives codes in range and finite figures', () => {
    holds(
      fc.property(ditheredDefinition, (definition) => {
        const table = tableOrRefusal(definition);
        if (table instanceof Refusal) expect(table.problems[0].path).toMatch(/^source$|^table\.fold$/);
        else expectWhole(table);
      }),
      600,
    );
  });

  it('gives the same table twice, and from its own parsed definition', () => {
    holds(
      fc.property(ditheredDefinition, (definition) => {
        const first = tableOrRefusal(definition);
        if (first instanceof Refusal) return;
        expect(buildTable(structuredClone(definition))).toEqual(first);
        expect(buildTable(first.definition)).toEqual(first);
      }),
      150,
    );
  });

  it('gives arrays that belong to the caller', () => {
    holds(
      fc.property(ditheredDefinition, (definition) => {
        const first = tableOrRefusal(definition);
        if (first instanceof Refusal) return;
        const kept = structuredClone(first);
        const { spectrum, cycle, values, codes, stored } = tableOrRefusal(definition) as BuiltTable;
        for (const list of [cycle, values, codes, stored, ...Object.values(spectrum)]) list.fill(1);
        expect(buildTable(definition)).toEqual(kept);
        expect(first).toEqual(kept);
      }),
      50,
    );
  });
});

describe('numbers at the ends of what a double holds', () => {
  const extreme = fc.oneof(
    fc.constantFrom(
      0,
      -0,
      5e-324,
      -5e-324,
      1e-310,
      1e-200,
      -1e-160,
      1e-17,
      1,
      -1,
      1e154,
      1e300,
      -1e308,
      Number.MAX_VALUE,
    ),
    fc.double({ noNaN: true, noDefaultInfinity: true }),
  );
  const source = fc.oneof(
    fc.record({
      kind: fc.constant('harmonics' as const),
      offset: extreme,
      partials: fc.array(
        fc.record({ harmonic: fc.integer({ min: 1, max: 40 }), amplitude: extreme, phaseDeg: extreme }),
        {
          minLength: 1,
          maxLength: 4,
        },
      ),
    }),
    fc.record({
      kind: fc.constant('samples' as const),
      values: fc.array(extreme, { minLength: 2, maxLength: 12 }),
      resampling: fc.constantFrom('bandlimited' as const, 'linear' as const, 'hold' as const),
    }),
    fc.record({
      kind: fc.constant('points' as const),
      interpolation: fc.constantFrom(
        'step' as const,
        'linear' as const,
        'monotone' as const,
        'spline' as const,
      ),
      bandlimit: fc.boolean(),
      points: fc
        .uniqueArray(
          fc.oneof(
            fc.constantFrom(0, 5e-324, 1e-300, 1e-17, 0.5, 1 - 2 ** -53),
            fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }),
          ),
          {
            minLength: 3,
            maxLength: 6,
            comparator: 'SameValueZero',
          },
        )
        .chain((xs) =>
          fc
            .array(extreme, { minLength: xs.length, maxLength: xs.length })
            .map((ys) => [...xs].sort((a, b) => a - b).map((x, i) => ({ x, y: ys[i] }))),
        ),
    }),
  );
  const definition: fc.Arbitrary<DefinitionInput> = fc
    .tuple(
      source,
      fc.record({
        removeMean: fc.boolean(),
        normalise: fc.constantFrom('none' as const, 'peak' as const, 'span' as const),
        level: fc.double({ min: 0, max: 1, noNaN: true }),
      }),
      fc.record({
        length: fc.integer({ min: 2, max: 64 }),
        bits: fc.integer({ min: 1, max: 16 }),
        shaping: fc.constantFrom(0 as const, 1 as const, 2 as const),
        dither: fc.constantFrom('none' as const, 'rectangular' as const, 'triangular' as const),
        range: fc.constantFrom('bipolar' as const, 'unipolar' as const),
        startPhaseDeg: fc.constantFrom(0, 5e-324, 359.99999999999994, 90),
      }),
    )
    .map(([from, level, table]) => waveOf({ source: from, level, table }));

  it('give finite figures or a refusal', () => {
    holds(
      fc.property(definition, (input) => {
        const table = tableOrRefusal(input);
        if (table instanceof Refusal) expect(table.problems[0].path).toBe('source');
        else expectWhole(table);
      }),
      4000,
    );
  });
});
