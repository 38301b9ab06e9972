import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import {
  betterTable,
  definitionOfTable,
  oldTableOf,
  reportOldTable,
  type CodeArray,
} from '../../shared/imports/index.ts';
import { examplesOf, holds } from './support/seeded.ts';

const arrayOf = (values: readonly number[], { wordBits = 8, isSigned = false } = {}): CodeArray => ({
  name: 'fog',
  line: 1,
  typeName: '',
  wordBits,
  isSigned,
  values,
  notes: [],
});
const tableOf = (values: readonly number[], word?: { wordBits?: number; isSigned?: boolean }) =>
  oldTableOf(arrayOf(values, word));

/** Codes of a sum of sines over `period` entries, as somebody's script would round them. */
const waveOf = (length: number, bits: number, period: number, partials: readonly (readonly number[])[]) => {
  const cycle = Array.from({ length }, (_, k) =>
    partials.reduce(
      (sum, [a, phase], i) => sum + a * Math.sin((2 * Math.PI * (i + 1) * k) / period + phase),
      0,
    ),
  );
  const peak = cycle.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
  return cycle.map((x) => Math.floor(((x / peak + 1) / 2) * (2 ** bits - 1) + 0.5));
};

describe('an old table', () => {
  it('is given back word by word, signed or not, with its idle low bits aside', () => {
    holds(
      fc.property(
        fc.integer({ min: 1, max: 16 }).chain((bits) =>
          fc.record({
            values: fc.array(fc.integer({ min: 0, max: 2 ** bits - 1 }), { minLength: 2, maxLength: 300 }),
            isSigned: fc.boolean(),
            shift: fc.integer({ min: 0, max: 16 - bits }),
            bits: fc.constant(bits),
          }),
        ),
        ({ values, isSigned, shift, bits }) => {
          const words = values.map((value) => (value - (isSigned ? 2 ** (bits - 1) : 0)) * 2 ** shift);
          const table = tableOf(words, { wordBits: 16, isSigned });
          const { stored, codes } = buildTable(definitionOfTable('fog', table));
          expect(Array.from(stored, (word) => word * 2 ** table.idleLowBits)).toEqual(words);
          expect(Array.from(codes)).toEqual(Array.from(table.codes));
          expect(table.bits + table.idleLowBits).toBeLessThanOrEqual(bits + shift);
        },
      ),
    );
  });

  it('has its figures told from the entries alone', () => {
    expect(reportOldTable(tableOf([16, 32, 64, 32], { wordBits: 16 }))).toMatchObject({
      length: 4,
      bits: 3,
      wordBits: 16,
      idleLowBits: 4,
      minCode: 1,
      maxCode: 4,
      usedCodes: 3,
      lostCodes: 4,
      dcLsb: -1.25,
      seam: { step: -1, largestWithin: 2 },
    });
    expect(reportOldTable(tableOf([-4, 0, 3, 0], { isSigned: true }))).toMatchObject({
      bits: 3,
      minCode: 0,
      maxCode: 7,
    });
    expect(reportOldTable(tableOf([5, 5, 5, 5]))).toMatchObject({
      snrDb: null,
      harmonics: 0,
      seam: { stepShare: 0 },
    });
  });

  it.each([
    [[1], 'array: 1 entries is not allowed; allowed: 2 to 65536 entries'],
    [[1, 70_001], 'array: entries of 17 bits or more is not allowed; allowed: at most 16 bits'],
  ])('is refused where it is none: %j', (values, message) => {
    expect(() => tableOf(values, { wordBits: 32 })).toThrow(message);
  });

  const wave = fc.record({
    length: fc.constantFrom(32, 64, 100, 128),
    bits: fc.integer({ min: 8, max: 12 }),
    partials: fc.array(
      fc.tuple(fc.double({ min: 0.2, max: 1.2, noNaN: true }), fc.double({ min: 0, max: 6.28, noNaN: true })),
      {
        minLength: 1,
        maxLength: 4,
      },
    ),
  });

  it('whose last entry repeats its first is told from one that closes', () => {
    let missed = 0;
    for (const { length, bits, partials } of examplesOf(wave, 300)) {
      expect(
        reportOldTable(tableOf(waveOf(length, bits, length, partials), { wordBits: 16 })).repeatsFirst,
      ).toBe(false);
      if (!reportOldTable(tableOf(waveOf(length, bits, length - 1, partials), { wordBits: 16 })).repeatsFirst)
        missed += 1;
    }
    // Where the wave hardly moves at the seam, both readings fit: such tables are left alone.
    expect(missed).toBeLessThan(6);
  });

  it('is told by the harmonics that it was made of, rounding and one slip aside', () => {
    for (const { length, bits, partials } of examplesOf(wave, 100)) {
      const codes = waveOf(length, bits, length, partials);
      const { harmonics, snrDb } = reportOldTable(tableOf(codes, { wordBits: 16 }));
      expect(harmonics).toBeLessThanOrEqual(partials.length + 3);
      // At most what an even rounding error leaves of the strongest wave (Bennett 1948), and a few dB for crest.
      if (snrDb === null) throw new Error('nothing was left');
      expect(snrDb).toBeGreaterThan(6.02 * bits - 12);
      // A short table is told as well by more harmonics as by a slip.
      if (length < 64) continue;
      const slipped = codes.with(length >> 1, codes[length >> 1] ^ 8);
      expect(reportOldTable(tableOf(slipped, { wordBits: 16 })).snrDb).toBeLessThan(snrDb - 3);
    }
  });
});

describe('the same table, better', () => {
  it('uses every code, has no mean and no repeated entry, at the same length and depth', () => {
    const old = tableOf(
      waveOf(100, 7, 99, [
        [1, 0.3],
        [0.2, 1],
      ]).map((code) => code + 40),
    );
    const better = betterTable('fog', old);
    if (!better) throw new Error('nothing was proposed');
    const { before, after, definition, method } = better;
    expect(method).toBe('harmonics');
    expect([definition.table?.length, definition.table?.bits]).toEqual([100, before.bits]);
    expect([before.repeatsFirst, before.lostCodes > 0, Math.abs(before.dcLsb) > 10]).toEqual([
      true,
      true,
      true,
    ]);
    expect([after.repeatsFirst, after.lostCodes]).toEqual([false, 0]);
    expect(after.snrDb ?? 0).toBeGreaterThan(before.snrDb ?? 0);
    expect(buildTable(definition).codes).toHaveLength(100);
  });

  it('keeps the shape of a ramp, whose every line counts', () => {
    const old = tableOf(Array.from({ length: 128 }, (_, k) => k));
    const better = betterTable('ramp', old);
    expect(better?.method).toBe('samples');
    const { codes } = buildTable(better?.definition);
    expect(codes.every((code, k) => Math.abs(code - old.codes[k]) <= 1)).toBe(true);
  });

  it('smooths within half a code where samples are asked for', () => {
    holds(
      fc.property(fc.array(fc.integer({ min: 20, max: 90 }), { minLength: 8, maxLength: 80 }), (codes) => {
        const old = tableOf([...codes, 127]);
        const better = betterTable('any', old, 'samples');
        if (!better || better.before.repeatsFirst) return;
        const { source } = better.definition;
        if (source.kind !== 'samples') throw new Error('other source');
        source.values.forEach((value, k) => {
          const code = ((value + 1) * (2 ** old.bits - 1)) / 2;
          expect(Math.abs(code - old.codes[k])).toBeLessThanOrEqual(0.5 + 1e-9);
        });
      }),
      40,
    );
  });

  it('is not proposed for a table that does not move', () => {
    expect(betterTable('flat', tableOf([3, 3, 3]))).toBeUndefined();
  });
});
