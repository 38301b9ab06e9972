import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { checkDefinition, Refusal, type DefinitionInput } from '../../shared/contract/index.ts';
import { analyseAccumulator, strongestLines } from '../../shared/playback/index.ts';
import { ditheredDefinition } from './support/definitions.ts';
import { examplesOf, holds } from './support/seeded.ts';

/** Values of tables of all kinds with 2^p entries; what cannot have that length is left out. */
const tables = examplesOf(
  fc.tuple(ditheredDefinition, fc.integer({ min: 1, max: 12 })).map(([definition, indexBits]) => ({
    definition: { ...definition, table: { ...definition.table, length: 2 ** indexBits } },
    indexBits,
  })),
  60,
).flatMap(({ definition, indexBits }) => {
  const values = valuesOf(definition);
  return values === null ? [] : [{ values, indexBits }];
});

function valuesOf(input: DefinitionInput): Float64Array | null {
  const checked = checkDefinition(input);
  if ('problems' in checked) return null;
  try {
    return tabulate(checked.definition).values;
  } catch (error) {
    if (error instanceof Refusal) return null;
    throw error;
  }
}

const isFigure = (figure: number | null) => figure === null || Number.isFinite(figure);

describe('any table through any accumulator', () => {
  it('gives finite figures or null, bins in range, and the same twice', () => {
    expect(tables.length).toBeGreaterThan(30);
    holds(
      fc.property(
        fc.constantFrom(...tables),
        fc.nat(48),
        fc.double({ min: 0, max: 1, noNaN: true, maxExcluded: true }),
        fc.integer({ min: 0, max: 47 }),
        ({ values, indexBits }, width, share, twos) => {
          const accumulatorBits = Math.max(indexBits, width, 1);
          const largest = 2 ** accumulatorBits - 1;
          // Odd words, and ones with any number of twos in them: from the longest period to the shortest.
          const shift = 2 ** (twos % accumulatorBits);
          const stepWord = Math.min(largest, shift * (1 + Math.floor((share * largest) / shift)));
          const accumulator = { accumulatorBits, stepWord };
          const figures = analyseAccumulator(values, accumulator);
          expect(Object.values(figures).every(isFigure)).toBe(true);
          const half = figures.period / 2;
          for (const bin of [figures.carrierBin, figures.worstOtherBin, figures.worstTruncationBin]) {
            expect(bin === null || (Number.isInteger(bin) && bin >= 1 && bin <= half)).toBe(true);
          }
          expect(figures.worstOtherDbc ?? 0).toBeLessThanOrEqual(1e-6);
          expect(analyseAccumulator(values, accumulator)).toEqual(figures);

          const { bins, amplitudes } = strongestLines(values, accumulator, 64);
          expect(bins.length).toBeLessThanOrEqual(64);
          expect(bins.every((bin, i) => bin >= 1 && bin <= half && (i === 0 || bin >= bins[i - 1]))).toBe(
            true,
          );
          expect(amplitudes.every((amplitude) => Number.isFinite(amplitude) && amplitude >= 0)).toBe(true);
          if (figures.carrierBin === null) return;
          expect(Math.max(...amplitudes)).toBeGreaterThanOrEqual(figures.carrierAmplitude - 1e-9);
          expect(Math.max(...amplitudes)).toBeLessThanOrEqual(figures.carrierAmplitude + 2e-9);
        },
      ),
      400,
    );
  });
});
