import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput, type SourceInput } from '../../shared/contract/index.ts';
import { anyDefinition } from './support/definitions.ts';
import { examplesOf, holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

const withTable = (definition: DefinitionInput, table: Table): DefinitionInput => ({
  ...definition,
  table: { ...definition.table, ...table },
});

describe('stored words', () => {
  it('read back by their coding are the codes, and figures do not change', () => {
    for (const definition of examplesOf(anyDefinition, 60)) {
      if (definition.table?.fold !== undefined) continue;
      const plain = buildTable(withTable(definition, { coding: 'offset-binary', complement: false }));
      const { bits } = plain.definition.table;
      expect(Array.from(plain.stored)).toEqual(Array.from(plain.codes));
      for (const coding of ['offset-binary', 'twos-complement'] as const) {
        for (const complement of [false, true]) {
          const coded = buildTable(withTable(definition, { coding, complement }));
          expect(coded.codes).toEqual(plain.codes);
          expect(coded.report).toEqual(plain.report);
          const shift = coding === 'twos-complement' ? 2 ** (bits - 1) : 0;
          const readBack = Array.from(coded.stored, (word) =>
            complement ? 2 ** bits - 1 - (word + shift) : word + shift,
          );
          expect(readBack).toEqual(Array.from(plain.codes));
        }
      }
    }
  });

  it("in two's complement are the code with its highest bit inverted", () => {
    holds(
      fc.property(fc.integer({ min: 1, max: 16 }), (bits) => {
        const { codes, stored } = buildTable(
          waveOf({ table: { bits, length: 97, coding: 'twos-complement' } }),
        );
        const mask = 2 ** bits - 1;
        codes.forEach((code, k) => expect(stored[k] & mask).toBe((code ^ (1 << (bits - 1))) & mask));
      }),
      16,
    );
  });
});

const odd = (parts: [harmonic: number, amplitude: number][]): SourceInput => ({
  kind: 'harmonics',
  partials: parts.map(([harmonic, amplitude]) => ({ harmonic, amplitude, phaseDeg: 0 })),
});
const quarter: Table = { fold: 'quarter', sampleAt: 'centre' };

describe('a quarter fold', () => {
  it('stores a quarter, from which the whole comes back', () => {
    holds(
      fc.property(
        fc.integer({ min: 1, max: 200 }),
        fc.integer({ min: 1, max: 16 }),
        fc.constantFrom<Table>(
          {},
          { complement: true },
          { coding: 'twos-complement' },
          { rounding: 'half-even' },
        ),
        (count, bits, words) => {
          const length = 4 * count;
          const source = odd([
            [1, 1],
            [3, 0.3],
            [5, -0.1],
          ]);
          const { codes, stored, report } = buildTable(
            waveOf({ source, table: { ...quarter, ...words, length, bits } }),
          );
          const top = 2 ** bits - 1;
          expect(stored.length).toBe(count);
          expect(report.tableBytes).toBe(count * (bits <= 8 ? 1 : 2));
          const shift = words.coding === 'twos-complement' ? 2 ** (bits - 1) : 0;
          const unfolded = Array.from({ length }, (_, k) => {
            const inHalf = k % (length / 2);
            const at = inHalf < count ? inHalf : length / 2 - 1 - inHalf;
            const code = words.complement === true ? top - (stored[at] + shift) : stored[at] + shift;
            return k < length / 2 ? code : top - code;
          });
          expect(unfolded).toEqual(Array.from(codes));
        },
      ),
    );
  });

  it.each<[string, SourceInput, Table]>([
    [
      'an even harmonic',
      odd([
        [1, 1],
        [2, 0.3],
      ]),
      {},
    ],
    ['a cosine', { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 90 }] }, {}],
    [
      'an offset',
      { kind: 'harmonics', offset: 0.2, partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
      {},
    ],
    ['a shaped error', odd([[1, 1]]), { shaping: 2, bits: 5 }],
  ])('is refused where it fails: %s', (_what, source, table) => {
    let refusal: unknown;
    try {
      buildTable(waveOf({ source, table: { ...quarter, ...table } }));
    } catch (error) {
      refusal = error;
    }
    expect(refusal).toBeInstanceOf(Refusal);
    const [problem] = (refusal as Refusal).problems;
    expect(problem.path).toBe('table.fold');
    // The entry it names does break the symmetry.
    const { codes } = buildTable(waveOf({ source, table: { sampleAt: 'centre', ...table } }));
    const entry = Number(/at entry (\d+)/.exec(problem.value)?.[1]);
    const half = codes.length / 2;
    const top = 2 ** (table.bits ?? 8) - 1;
    if (entry < half) expect(codes[entry]).not.toBe(codes[half - 1 - entry]);
    else expect(codes[entry]).not.toBe(top - codes[entry - half]);
    expect(problem.value).toContain(`code ${codes[entry]}`);
  });
});
