import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { holds, noise } from './support/seeded.ts';
import { valuesOf, waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

/** A signal well inside the range, so that no code clips and the loop's sums are free to close. */
const inside = (length: number, seed: number) => noise(length, seed).map((x) => 0.7 * x);

describe('noise shaping', () => {
  it('of order 1 closes on itself and moves the mean by less than half a code over the table', () => {
    holds(
      fc.property(
        fc.integer({ min: 2, max: 800 }),
        fc.integer({ min: 1, max: 16 }),
        fc.integer({ min: 1, max: 1e6 }),
        fc.constantFrom<Table['rounding']>('half-up', 'half-even', 'down'),
        (length, bits, seed, rounding) => {
          const { report, warnings } = buildTable(
            valuesOf(inside(length, seed), { bits, shaping: 1, rounding }),
          );
          expect(warnings).toEqual([]);
          // Codes sum to the rounded sum of the positions: Σe is what that rounding changed.
          if (report.clippedCodes === 0)
            expect(Math.abs(report.meanErrorLsb) * length).toBeLessThanOrEqual(0.5 + 1e-6 * length);
        },
      ),
      200,
    );
  });

  it('of order 1 keeps every partial sum within one code of what is wanted', () => {
    holds(
      fc.property(
        fc.integer({ min: 2, max: 500 }),
        fc.integer({ min: 2, max: 12 }),
        fc.integer({ min: 1, max: 1e6 }),
        (length, bits, seed) => {
          const { codes, cycle } = buildTable(valuesOf(inside(length, seed), { bits, shaping: 1 }));
          let ahead = 0;
          let [least, most] = [0, 0];
          codes.forEach((code, k) => {
            ahead += code - ((cycle[k] + 1) / 2) * (2 ** bits - 1);
            least = Math.min(least, ahead);
            most = Math.max(most, ahead);
          });
          expect(most - least).toBeLessThan(1.5);
        },
      ),
      100,
    );
  });

  it('follows the recurrence of §3.3 from its own final state', () => {
    holds(
      fc.property(
        fc.integer({ min: 2, max: 300 }),
        fc.integer({ min: 2, max: 12 }),
        fc.integer({ min: 1, max: 1e6 }),
        fc.constantFrom<1 | 2>(1, 2),
        (length, bits, seed, shaping) => {
          // At full scale, so that some codes clip.
          const { codes, cycle, report } = buildTable(valuesOf(noise(length, seed), { bits, shaping }));
          const unit = 2n ** 24n;
          const v = Array.from(cycle, (x) => BigInt(Math.round(((x + 1) / 2) * (2 ** bits - 1) * 2 ** 24)));
          const sum = v.reduce((total, each) => total + each, 0n);
          const delta = unit * ((sum + unit / 2n) / unit) - sum;
          const count = BigInt(length);
          const each = delta >= 0n ? delta / count : -((-delta + count - 1n) / count);
          const more = delta - each * count;
          const wanted = v.map((value, k) => value + each + (BigInt(k) < more ? 1n : 0n));
          const floor = (value: bigint) => (value >= 0n ? value / unit : -((-value + unit - 1n) / unit));
          let [e1, e2] = [0n, 0n];
          let told: number[] = [];
          let clipped = 0;
          for (let pass = 0; pass < 8; pass += 1) {
            const [start1, start2] = [e1, e2];
            clipped = 0;
            told = wanted.map((position) => {
              const u = position + (shaping === 1 ? -e1 : -2n * e1 + e2);
              const p = floor(u + unit / 2n);
              [e2, e1] = [e1, p * unit - u];
              const code = Math.min(Math.max(Number(p), 0), 2 ** bits - 1);
              if (code !== Number(p)) clipped += 1;
              return code;
            });
            if (e1 === start1 && (shaping === 1 || e2 === start2)) break;
          }
          expect(Array.from(codes)).toEqual(told);
          expect(report.clippedCodes).toBe(clipped);
        },
      ),
      100,
    );
  });

  it('moves the error from low lines to high ones, more with order 2', () => {
    const lowPower = (shaping: 0 | 1 | 2) => {
      const source = {
        kind: 'harmonics' as const,
        partials: [{ harmonic: 3, amplitude: 0.8, phaseDeg: 17 }],
      };
      const { spectrum } = buildTable(
        waveOf({ source, level: { normalise: 'none' }, table: { length: 4096, bits: 6, shaping } }),
      );
      return spectrum.added.slice(1, 65).reduce((sum, a) => sum + a * a, 0);
    };
    const [flat, first, second] = [lowPower(0), lowPower(1), lowPower(2)];
    expect(first).toBeLessThan(flat / 50);
    expect(second).toBeLessThan(first / 10);
  });

  it('counts what its last pass clipped', () => {
    const { report, codes } = buildTable(
      valuesOf(new Array(16).fill(1), { bits: 3, scale: 'mid-tread', shaping: 1 }),
    );
    expect(report.clippedCodes).toBe(16);
    expect(new Set(codes)).toEqual(new Set([7]));
  });

  it('of order 1 closes with dither too: a pass turns later states into later ones, so one stays where it is', () => {
    for (let seed = 0; seed < 40; seed += 1) {
      for (const dither of ['rectangular', 'triangular'] as const) {
        const { warnings } = buildTable(
          waveOf({ table: { length: 50 + seed, bits: 4, shaping: 1, dither, seed } }),
        );
        expect(warnings).toEqual([]);
      }
    }
  });
});
