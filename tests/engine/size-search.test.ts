import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { checkDefinition, parseDefinition, Refusal, type Definition } from '../../shared/contract/index.ts';
import {
  paretoOf,
  sizeMapOf,
  sizeSearch,
  smallestThatMeets,
  usualAxes,
  type SizeCell,
} from '../../shared/size-search/index.ts';
import { standardShapes } from '../../shared/waveform/index.ts';
import { ditheredDefinition } from './support/definitions.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

type Figures = Pick<SizeCell, 'snrDb' | 'unwantedDb' | 'exact' | 'tableBytes'>;

/** The same size by itself: parsed and tabulated, or the path of what is refused. */
function bySingleTable(definition: Definition, tableLength: number, bits: number): Figures | string {
  const checked = checkDefinition({
    ...definition,
    table: { ...definition.table, length: tableLength, bits },
  });
  if ('problems' in checked) return checked.problems[0].path;
  try {
    const { snrDb, unwantedDb, exact, tableBytes } = tabulate(checked.definition).report;
    return { snrDb, unwantedDb, exact, tableBytes };
  } catch (error) {
    if (error instanceof Refusal) return error.problems[0].path;
    throw error;
  }
}

const outcomeOf = ({ problem, snrDb, unwantedDb, exact, tableBytes }: SizeCell) =>
  problem === null ? { snrDb, unwantedDb, exact, tableBytes } : problem.path;

describe('the search over sizes', () => {
  it('gives each size the figures of its own table, to the last bit, or the same refusal', () => {
    let [taken, refused] = [0, 0];
    holds(
      fc.property(
        ditheredDefinition.filter(({ table }) => table?.levels === undefined),
        fc.uniqueArray(fc.oneof(fc.integer({ min: 2, max: 600 }), fc.constantFrom(16, 64, 256, 1024, 2048)), {
          minLength: 1,
          maxLength: 3,
        }),
        fc.uniqueArray(fc.integer({ min: 1, max: 16 }), { minLength: 1, maxLength: 3 }),
        (input, lengths, bits) => {
          const definition = parseDefinition(input);
          const cells = [...sizeSearch(definition, { lengths, bits })];
          expect(cells.map(({ tableLength, bits: depth }) => [tableLength, depth])).toEqual(
            lengths.flatMap((tableLength) => bits.map((depth) => [tableLength, depth])),
          );
          for (const cell of cells) {
            const outcome = outcomeOf(cell);
            expect(outcome).toEqual(bySingleTable(definition, cell.tableLength, cell.bits));
            if (typeof outcome === 'string') refused += 1;
            else taken += 1;
          }
        },
      ),
      60,
    );
    expect(taken).toBeGreaterThan(100);
    expect(refused).toBeGreaterThan(5);
  });

  it.each([
    ['rectangular dither', { dither: 'rectangular' as const, seed: 7 }],
    ['triangular dither in an unipolar range', { dither: 'triangular' as const, range: 'unipolar' as const }],
    ['shaping of order 1', { shaping: 1 as const }],
    ['shaping of order 2 with dither', { shaping: 2 as const, dither: 'triangular' as const }],
    ['mid-tread', { scale: 'mid-tread' as const, rounding: 'half-even' as const }],
    ['a quarter fold', { fold: 'quarter' as const, sampleAt: 'centre' as const }],
  ])('does so with %s', (_name, table) => {
    const source = standardShapes.triangle(15);
    const definition = parseDefinition(waveOf({ source, table }));
    for (const cell of sizeSearch(definition, { lengths: [16, 60, 64, 101, 1024], bits: [1, 5, 8, 9, 16] })) {
      expect(outcomeOf(cell)).toEqual(bySingleTable(definition, cell.tableLength, cell.bits));
    }
  });

  it('goes a cell at a time, lengths outside, and can be stopped between two', () => {
    const definition = parseDefinition(waveOf());
    const search = sizeSearch(definition);
    const first = Array.from({ length: 17 }, () => search.next().value as SizeCell);
    expect(first.map(({ tableLength, bits }) => `${tableLength}×${bits}`).slice(0, 3)).toEqual([
      '16×1',
      '16×2',
      '16×3',
    ]);
    expect(first[16]).toMatchObject({ tableLength: 32, bits: 1 });
    search.return();
    expect(search.next()).toEqual({ done: true, value: undefined });
    expect([...sizeSearch(definition)]).toHaveLength(160);
  });

  it('leaves the definition as it was', () => {
    const definition = parseDefinition(waveOf({ table: { length: 100, bits: 7, dither: 'triangular' } }));
    const before = structuredClone(definition);
    for (const cell of sizeSearch(definition, { lengths: [64], bits: [8] })) expect(cell.problem).toBeNull();
    expect(definition).toEqual(before);
  });

  it('refuses measured levels, which hold for one depth', () => {
    const definition = parseDefinition(waveOf({ table: { bits: 2, levels: [0, 1.1, 2, 3] } }));
    expect(() => sizeSearch(definition).next()).toThrow(/^table\.levels: a list of 4 is not allowed/);
  });
});

const cell = (tableBytes: number, snrDb: number | null, more: Partial<SizeCell> = {}): SizeCell => ({
  tableLength: tableBytes,
  bits: 8,
  snrDb,
  unwantedDb: snrDb === null ? null : -snrDb - 5,
  exact: false,
  tableBytes,
  problem: null,
  ...more,
});
const problem = { path: 'table.cycles', value: '9', allowed: 'fewer' };

describe('what a search is good for', () => {
  const cells = [
    cell(64, 40),
    cell(32, 30),
    cell(32, 31, { bits: 4 }),
    cell(128, 40),
    cell(256, 35),
    cell(512, 60),
    cell(16, null),
    cell(8, null, { problem }),
    cell(1024, null, { exact: true }),
    cell(2048, 90),
  ];

  it('the front holds those that no smaller or equally small one equals or beats, by size', () => {
    expect(
      paretoOf(cells, 'snrDb').map(({ tableBytes, snrDb, exact }) => [tableBytes, snrDb, exact]),
    ).toEqual([
      [32, 31, false],
      [64, 40, false],
      [512, 60, false],
      [1024, null, true],
    ]);
  });

  it('the front of any search is the one that comparing all with all gives', () => {
    const figure = fc.oneof(fc.constant(null), fc.integer({ min: 0, max: 30 }));
    holds(
      fc.property(fc.array(fc.tuple(fc.integer({ min: 1, max: 20 }), figure), { maxLength: 40 }), (pairs) => {
        const all = pairs.map(([bytes, snrDb]) => cell(bytes, snrDb));
        const front = paretoOf(all, 'unwantedDb');
        const good = all.filter(({ unwantedDb }) => unwantedDb !== null);
        const value = ({ unwantedDb }: SizeCell) => -Number(unwantedDb);
        const unbeaten = good.filter(
          (one) =>
            !good.some(
              (other) =>
                (other.tableBytes < one.tableBytes && value(other) >= value(one)) ||
                (other.tableBytes === one.tableBytes && value(other) > value(one)),
            ),
        );
        const told = (list: SizeCell[]) =>
          [...new Set(list.map(({ tableBytes, unwantedDb }) => `${tableBytes} ${unwantedDb}`))].sort();
        expect(told(front)).toEqual(told(unbeaten));
        expect(front.map(({ tableBytes }) => tableBytes)).toEqual(
          [...new Set(front.map(({ tableBytes }) => tableBytes))].sort((a, b) => a - b),
        );
      }),
    );
  });

  it('the smallest that meets limits keeps all of them', () => {
    expect(smallestThatMeets(cells, { snrDb: 40 })).toMatchObject({ tableBytes: 64 });
    expect(smallestThatMeets(cells, { snrDb: 41 })).toMatchObject({ tableBytes: 512 });
    expect(smallestThatMeets(cells, { snrDb: 61 })).toMatchObject({ tableBytes: 1024, exact: true });
    expect(smallestThatMeets(cells, { unwantedDb: -46 })).toMatchObject({ tableBytes: 512 });
    expect(smallestThatMeets(cells, { snrDb: 41, tableBytes: 500 })).toBeNull();
    expect(smallestThatMeets(cells, {})).toMatchObject({ tableBytes: 16 });
    expect(smallestThatMeets(cells, { snrDb: -100 })).toMatchObject({ tableBytes: 32, bits: 4 });
    expect(smallestThatMeets([], {})).toBeNull();
  });

  it('of a sine, the smallest with 49 dB takes 8 bits, as 6.02·b + 1.76 dB has it (Bennett 1948)', () => {
    const found = [...sizeSearch(parseDefinition(waveOf({ table: { startPhaseDeg: 10 } })))];
    expect(smallestThatMeets(found, { snrDb: 49 })?.bits).toBe(8);
  });

  it('a heat map has a row a length and a column a depth, and holes where nothing is known', () => {
    const axes = { lengths: [32, 64], bits: [4, 8] };
    const map = sizeMapOf(
      [
        cell(32, 31, { tableLength: 32, bits: 4 }),
        cell(64, null, { tableLength: 64, bits: 8, exact: true }),
        cell(64, null, { tableLength: 64, bits: 4, problem, tableBytes: 0 }),
        cell(99, 1, { tableLength: 99 }),
      ],
      axes,
    );
    expect(map).toEqual({
      ...axes,
      snrDb: Float64Array.of(31, NaN, NaN, Infinity),
      unwantedDb: Float64Array.of(-36, NaN, NaN, -Infinity),
      tableBytes: Float64Array.of(32, NaN, NaN, 64),
    });
    expect(usualAxes.lengths).toEqual([16, 32, 64, 128, 256, 512, 1024, 2048, 4096, 8192]);
  });
});
