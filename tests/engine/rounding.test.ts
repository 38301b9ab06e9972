import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { examplesOf, holds, noise } from './support/seeded.ts';
import { anyDefinition } from './support/definitions.ts';
import { valuesOf, waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

/** Codes of code positions v, sent in as the unipolar values v/(L−1). */
function codesOf(positions: number[], rounding: Table['rounding'], bits = 4): number[] {
  const top = 2 ** bits - 1;
  return Array.from(
    buildTable(
      valuesOf(
        positions.map((v) => v / top),
        { rounding, bits, range: 'unipolar' },
      ),
    ).codes,
  );
}

describe('rounding', () => {
  const positions = [0, 0.5, 1, 1.5, 2.5, 3.5, 6.4999, 6.5, 6.5001, 13.5, 14.5, 15];
  it.each<[Table['rounding'], number[]]>([
    ['half-up', [0, 1, 1, 2, 3, 4, 6, 7, 7, 14, 15, 15]],
    ['half-even', [0, 0, 1, 2, 2, 4, 6, 6, 7, 14, 14, 15]],
    ['down', [0, 0, 1, 1, 2, 3, 6, 6, 6, 13, 14, 15]],
  ])('%s at exact ties', (rounding, wanted) => {
    expect(codesOf(positions, rounding)).toEqual(wanted);
  });

  it('a tie that the last bits of arithmetic blur is still a tie', () => {
    for (const bits of [1, 4, 8, 12, 16]) {
      const tie = 2 ** (bits - 1) - 0.5;
      for (const blur of [-(2 ** -26), 0, 2 ** -26])
        expect(codesOf([tie + blur, 0], 'half-up', bits)[0]).toBe(2 ** (bits - 1));
    }
    expect(codesOf([7.5 - 2 ** -23, 0], 'half-up')[0]).toBe(7);
  });

  it('a sine starts on the upper of the two middle codes', () => {
    for (let bits = 1; bits <= 16; bits += 1) {
      const { codes } = buildTable(waveOf({ table: { bits, length: 64 } }));
      expect([codes[0], codes[32]]).toEqual([2 ** (bits - 1), 2 ** (bits - 1)]);
    }
  });

  it('keeps every value within its bound of the cycle', () => {
    const bounds = { 'half-up': [-0.5, 0.5], 'half-even': [-0.5, 0.5], down: [-1, 0] } as const;
    holds(
      fc.property(
        fc.integer({ min: 1, max: 16 }),
        fc.constantFrom<keyof typeof bounds>('half-up', 'half-even', 'down'),
        fc.constantFrom<Pick<Table, 'range' | 'scale'>>({}, { scale: 'mid-tread' }, { range: 'unipolar' }),
        fc.integer({ min: 1, max: 1e6 }),
        (bits, rounding, scaling, seed) => {
          const values = noise(200, seed).map((x) => (scaling.range === 'unipolar' ? Math.abs(x) : x));
          const table: Table = { bits, rounding, ...scaling };
          const { cycle, values: q, report } = buildTable(valuesOf(values, table));
          const lsb =
            scaling.range === 'unipolar'
              ? 1 / (2 ** bits - 1)
              : scaling.scale === 'mid-tread'
                ? 2 ** (1 - bits)
                : 2 / (2 ** bits - 1);
          const [least, most] = bounds[rounding];
          cycle.forEach((r, k) => {
            // Above the last mid-tread level there is no code to round up to.
            if (scaling.scale === 'mid-tread' && r > 1 - lsb) return;
            const error = (q[k] - r) / lsb;
            expect(error >= least - 1e-6 && error <= most + 1e-6).toBe(true);
          });
          if (scaling.scale !== 'mid-tread') expect(report.clippedCodes).toBe(0);
        },
      ),
    );
  });
});

describe('scaling', () => {
  it('full-span takes −1 to code 0 and +1 to the top code', () => {
    for (let bits = 1; bits <= 16; bits += 1) {
      expect(Array.from(buildTable(valuesOf([-1, 1], { bits })).codes)).toEqual([0, 2 ** bits - 1]);
      expect(Array.from(buildTable(valuesOf([0, 1], { bits, range: 'unipolar' })).codes)).toEqual([
        0,
        2 ** bits - 1,
      ]);
    }
  });

  it('mid-tread takes 0 to the middle code, −1 to code 0 and clips at +1', () => {
    for (let bits = 1; bits <= 16; bits += 1) {
      const { codes, values, report } = buildTable(valuesOf([-1, 0, 1, 0], { bits, scale: 'mid-tread' }));
      expect(Array.from(codes)).toEqual([0, 2 ** (bits - 1), 2 ** bits - 1, 2 ** (bits - 1)]);
      expect(Array.from(values)).toEqual([-1, 0, 1 - 2 ** (1 - bits), 0]);
      expect(report.clippedCodes).toBe(1);
    }
  });

  it('all 2^b codes can be reached', () => {
    for (const bits of [1, 5, 12]) {
      const values = Array.from({ length: 2 ** bits }, (_, code) => (2 * code) / (2 ** bits - 1) - 1);
      const { codes, report } = buildTable(valuesOf(values, { bits }));
      expect(Array.from(codes)).toEqual(values.map((_, code) => code));
      expect(report).toMatchObject({
        usedCodes: 2 ** bits,
        minCode: 0,
        maxCode: 2 ** bits - 1,
        exact: true,
        snrDb: null,
      });
    }
  });
});

describe('figures of the error', () => {
  it('are those of q − r in LSB', () => {
    for (const definition of examplesOf(anyDefinition, 100, 5)) {
      if (definition.table?.fold !== undefined) continue;
      const { cycle, values, codes, report, definition: parsed } = buildTable(definition);
      const { bits, range, scale } = parsed.table;
      const lsb =
        range === 'unipolar'
          ? 1 / (2 ** bits - 1)
          : scale === 'mid-tread'
            ? 2 / 2 ** bits
            : 2 / (2 ** bits - 1);
      const error = Array.from(values, (q, k) => (q - cycle[k]) / lsb);
      expect(report.meanErrorLsb).toBeCloseTo(error.reduce((sum, e) => sum + e, 0) / error.length, 9);
      expect(report.rmsErrorLsb).toBeCloseTo(
        Math.sqrt(error.reduce((sum, e) => sum + e * e, 0) / error.length),
        9,
      );
      expect(report.peakErrorLsb).toBeCloseTo(Math.max(...error.map(Math.abs)), 9);
      expect(report.mean).toBeCloseTo(values.reduce((sum, q) => sum + q, 0) / values.length, 12);
      const rms = Math.sqrt(values.reduce((sum, q) => sum + q * q, 0) / values.length);
      expect(report.rms).toBeCloseTo(rms, 12);
      expect(report.crestFactor ?? 0).toBeCloseTo(rms === 0 ? 0 : Math.max(...values.map(Math.abs)) / rms, 9);
      expect([report.minCode, report.maxCode, report.usedCodes]).toEqual([
        Math.min(...codes),
        Math.max(...codes),
        new Set(codes).size,
      ]);
    }
  });
});
