import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { analyseAccumulator } from '../../shared/playback/index.ts';
import { examplesOf } from '../engine/support/seeded.ts';
import { waveOf } from '../engine/support/waves.ts';
import { askPython } from './numpy/python.ts';
import { commitSeed } from './numpy/seed.ts';

const sineValues = (length: number, bits: number) => buildTable(waveOf({ table: { length, bits } })).values;

interface RunFigures {
  period: number;
  carrierBin: number;
  worstOtherDbc: number;
  worstOtherBin: number;
  snrDb: number;
}

// Source: numpy/accumulator.py, which runs the accumulator for a whole round and transforms what comes out.
describe('NumPy', () => {
  it('hears 80 random accumulators as the closed form does', () => {
    const cases = examplesOf(
      fc
        .tuple(
          fc.integer({ min: 3, max: 10 }),
          fc.integer({ min: 0, max: 8 }),
          fc.nat(),
          fc.integer({ min: 4, max: 16 }),
          fc.integer({ min: 0, max: 9 }),
        )
        .map(([indexBits, moreBits, step, bits, twos]) => {
          const accumulatorBits = indexBits + moreBits;
          // Eight samples a round or more: a sine of four has one line alone.
          const evenBits = Math.min(twos, accumulatorBits - 3);
          return {
            // With a phase of its own no two lines are alike, and none is left out.
            values: buildTable(waveOf({ table: { length: 2 ** indexBits, bits, startPhaseDeg: 17 } })).values,
            accumulatorBits,
            stepWord: (1 + 2 * (step % 2 ** (accumulatorBits - 1 - evenBits))) * 2 ** evenBits,
          };
        }),
      80,
      commitSeed(),
    );
    const wanted = askPython<RunFigures[]>(
      'accumulator.py',
      cases.map(({ values, ...accumulator }) => ({ values: Array.from(values), ...accumulator })),
    );
    cases.forEach(({ values, ...accumulator }, i) => {
      const { period, carrierBin, worstOtherBin, worstOtherDbc, snrDb } = analyseAccumulator(
        values,
        accumulator,
      );
      const { worstOtherDbc: wantedDbc, snrDb: wantedSnr, ...bins } = wanted[i];
      expect({ period, carrierBin, worstOtherBin }, JSON.stringify(accumulator)).toEqual(bins);
      expect(worstOtherDbc).toBeCloseTo(wantedDbc, 6);
      expect(snrDb).toBeCloseTo(wantedSnr, 6);
    });
  });
});

// Source: H. T. Nicholas & H. Samueli, "An analysis of the output spectrum of direct digital frequency synthesizers
// in the presence of phase-accumulator truncation", Proc. 41st Annual Frequency Control Symposium (1987): the worst
// spur is 2^−p·x/sin(x), x = π·g/2^(M−p) with g = gcd(W, 2^(M−p)): −6.02·p dBc, at worst 3.92 dB higher, where
// g = 2^(M−p−1). It is stated for long tables: a short one is off by the share 1/N of its amplitude.
describe('a truncated phase (Nicholas & Samueli 1987)', () => {
  const tables = [4, 5, 6, 7, 8, 9, 10].map((indexBits) => ({
    indexBits,
    values: sineValues(2 ** indexBits, 16),
  }));

  it.each(tables)('of $indexBits index bits has its worst spur where they say', ({ indexBits, values }) => {
    const tolerance = 20 * Math.log10(1 / (1 - 2 / 2 ** indexBits));
    for (const truncated of [1, 2, 3, 8, 20, 48 - indexBits]) {
      const accumulatorBits = indexBits + truncated;
      for (let common = 0; common < truncated; common += 1) {
        for (const odd of [1, 3, 77, 1001]) {
          const stepWord = (odd * 2 ** common) % 2 ** (accumulatorBits - 1);
          if (stepWord === 0 || stepWord % 2 ** (common + 1) === 0) continue;
          const x = Math.PI * 2 ** (common - truncated);
          const wanted = 20 * Math.log10((2 ** -indexBits * x) / Math.sin(x));
          const { worstOtherDbc } = analyseAccumulator(values, { accumulatorBits, stepWord });
          expect(Math.abs(Number(worstOtherDbc) - wanted)).toBeLessThan(tolerance);
          expect(Number(worstOtherDbc)).toBeLessThan(-6.02 * indexBits + 3.92 + tolerance);
        }
      }
    }
  });

  it.each(tables)('of $indexBits index bits has none where 2^(M−p) divides W', ({ indexBits, values }) => {
    for (const truncated of [1, 8, 48 - indexBits]) {
      const accumulatorBits = indexBits + truncated;
      for (const odd of [1, 3, 5]) {
        const figures = analyseAccumulator(values, { accumulatorBits, stepWord: odd * 2 ** truncated });
        expect(figures).toMatchObject({ worstTruncationDbc: null, worstTruncationBin: null });
        // What is left is the 16-bit quantiser: 98 dB over all lines together (Bennett 1948).
        expect(figures.worstOtherDbc ?? -Infinity).toBeLessThan(-95);
      }
    }
  });
});
