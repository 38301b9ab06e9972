import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { planTwoTones, twoToneSource } from '../../shared/playback/index.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

describe('a loop of two tones', () => {
  it('holds whole cycles of both, and no other loop is nearer', () => {
    holds(
      fc.property(
        fc.double({ min: 200, max: 3500, noNaN: true }),
        fc.double({ min: 200, max: 3500, noNaN: true }),
        fc.integer({ min: 40, max: 200 }),
        (first, second, largestLength) => {
          if (Math.abs(first - second) < 300) return;
          const tones = { sampleRateHz: 8000, tonesHz: [first, second], largestLength } as const;
          const { best, shortest } = planTwoTones({ ...tones, withinCents: 20 });
          // Every pair of cycles in every length, as it is written.
          let least = Infinity;
          let firstWithin: number | null = null;
          for (let length = 5; length <= largestLength; length += 1) {
            for (let a = 1; 2 * a < length; a += 1) {
              const apartA = Math.abs(1200 * Math.log2((a * 8000) / length / first));
              if (apartA > least && apartA > 20) continue;
              for (let b = 1; 2 * b < length; b += 1) {
                const apart = Math.max(apartA, Math.abs(1200 * Math.log2((b * 8000) / length / second)));
                if (a === b) continue;
                least = Math.min(least, apart);
                if (apart <= 20) firstWithin ??= length;
              }
            }
          }
          expect(best.worstCents).toBeCloseTo(least, 9);
          expect(shortest?.tableLength ?? null).toBe(firstWithin);
          best.cycles.forEach((cycles, i) => {
            expect(best.actualHz[i]).toBeCloseTo((cycles * 8000) / best.tableLength, 9);
          });
        },
      ),
      25,
    );
  });

  it('is a table whose only lines are the two', () => {
    const { best } = planTwoTones({
      sampleRateHz: 8000,
      tonesHz: [697, 1209],
      largestLength: 500,
      withinCents: 5,
    });
    const { spectrum } = buildTable(
      waveOf({ source: twoToneSource(best, [1, 0.5]), table: { length: best.tableLength, bits: 16 } }),
    );
    const strongest = Array.from(spectrum.amplitudes.keys()).sort(
      (a, b) => spectrum.amplitudes[b] - spectrum.amplitudes[a],
    );
    expect(strongest.slice(0, 2)).toEqual(Array.from(best.cycles));
    const [low, high] = best.cycles.map((k) => spectrum.amplitudes[k]);
    expect(low / high).toBeCloseTo(2, 3);
    expect(spectrum.amplitudes[strongest[2]]).toBeLessThan(1e-4);
  });

  it.each([
    [{ tonesHz: [440, 440] as const }, 'tonesHz'],
    [{ tonesHz: [440, 4000] as const }, 'tonesHz'],
    [{ tonesHz: [440, -1] as const }, 'tonesHz[1]'],
    [{ sampleRateHz: 0 }, 'sampleRateHz'],
    [{ withinCents: 0 }, 'withinCents'],
    [{ largestLength: 65_537 }, 'largestLength'],
  ])('is refused for %o', (change, path) => {
    const given = { sampleRateHz: 8000, tonesHz: [440, 1000] as const, largestLength: 100, withinCents: 10 };
    try {
      planTwoTones({ ...given, ...change });
    } catch (error) {
      expect(error).toBeInstanceOf(Refusal);
      expect((error as Refusal).problems[0].path).toBe(path);
      return;
    }
    throw new Error('taken');
  });
});
