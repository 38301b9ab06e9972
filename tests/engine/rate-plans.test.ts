import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { planRates, type Timer } from '../../shared/playback/index.ts';
import { holds } from './support/seeded.ts';

const timer: Timer = { clockHz: 16_000_000, prescalers: [1, 8, 64, 256, 1024], compareBits: 8 };

describe('settings of a timer', () => {
  it('come with the least error first, each as §5 has it', () => {
    holds(
      fc.property(
        fc.double({ min: 20, max: 20_000, noNaN: true }),
        fc.uniqueArray(fc.integer({ min: 4, max: 512 }), { minLength: 1, maxLength: 5 }),
        fc.uniqueArray(fc.integer({ min: 1, max: 8 }), { minLength: 1, maxLength: 4 }),
        (wantedHz, lengths, cycles) => {
          const plans = planRates(timer, { wantedHz, lengths, cycles });
          let before = 0;
          for (const plan of plans) {
            expect(plan.sampleRateHz).toBeCloseTo(16e6 / (plan.prescaler * (plan.compare + 1)), 6);
            expect(plan.actualHz).toBeCloseTo((plan.cycles * plan.sampleRateHz) / plan.tableLength, 6);
            expect(plan.errorCents).toBeCloseTo(1200 * Math.log2(plan.actualHz / wantedHz), 9);
            expect(plan.cyclesPerSample).toBe(plan.prescaler * (plan.compare + 1));
            expect(plan.compare).toBeLessThan(256);
            expect(plan.cycles === 1 || 2 * plan.cycles < plan.tableLength).toBe(true);
            expect(Math.abs(plan.errorCents)).toBeGreaterThanOrEqual(before - 1e-9);
            before = Math.abs(plan.errorCents);
          }
        },
      ),
    );
  });

  it('begin with the best there is', () => {
    holds(
      fc.property(
        // From tones slower than the slowest setting to ones faster than the fastest.
        fc.oneof(
          fc.double({ min: 0.1, max: 5000, noNaN: true }),
          fc.double({ min: 1e5, max: 1e8, noNaN: true }),
        ),
        fc.uniqueArray(fc.integer({ min: 8, max: 64 }), { minLength: 1, maxLength: 3 }),
        (wantedHz, lengths) => {
          let least = Infinity;
          for (const length of lengths) {
            for (const held of [1, 2, 3]) {
              for (const prescaler of timer.prescalers) {
                for (let compare = 0; compare < 256; compare += 1) {
                  const hz = (16e6 * held) / (prescaler * (compare + 1) * length);
                  least = Math.min(least, Math.abs(1200 * Math.log2(hz / wantedHz)));
                }
              }
            }
          }
          const [best] = planRates(timer, { wantedHz, lengths, cycles: [1, 2, 3] });
          expect(Math.abs(best.errorCents)).toBeCloseTo(least, 9);
        },
      ),
      40,
    );
  });

  it('prefer, of equal errors, the shortest table, then the lowest prescaler', () => {
    const plans = planRates(timer, { wantedHz: 1000, lengths: [250, 125, 500], limit: 100 });
    const exact = plans.filter(({ errorCents }) => errorCents === 0);
    expect(exact.map(({ tableLength, prescaler, compare }) => [tableLength, prescaler, compare])).toEqual([
      [125, 1, 127],
      [125, 8, 15],
      [125, 64, 1],
      [250, 1, 63],
      [250, 8, 7],
      [250, 64, 0],
      [500, 1, 31],
      [500, 8, 3],
    ]);
    expect(plans.slice(0, exact.length)).toEqual(exact);
  });

  it('say what the clock adds and whether the cost fits between two samples', () => {
    const wanted = { wantedHz: 440, lengths: [64, 256], costCycles: 200 };
    const plans = planRates({ ...timer, clockTolerancePpm: 10_000 }, wanted);
    for (const plan of plans) {
      expect(plan.toleranceCents).toBeCloseTo(17.226, 3);
      expect(plan.fits).toBe(200 <= plan.cyclesPerSample);
    }
    expect(new Set(plans.map(({ fits }) => fits))).toEqual(new Set([true, false]));
    expect(planRates(timer, { wantedHz: 440, lengths: [64] })[0]).toMatchObject({
      toleranceCents: null,
      fits: null,
    });
  });

  it('stop at the ends of the register, however far off that is', () => {
    const ends = { ...timer, prescalers: [1] };
    expect(planRates(ends, { wantedHz: 1, lengths: [16] })).toMatchObject([{ compare: 255 }]);
    expect(planRates(ends, { wantedHz: 1e9, lengths: [16] })).toMatchObject([{ compare: 0 }]);
  });

  it.each([
    [{ clockHz: 0 }, {}, 'clockHz'],
    [{ compareBits: 0 }, {}, 'compareBits'],
    [{ prescalers: [] }, {}, 'prescalers'],
    [{ prescalers: [1, 0.5] }, {}, 'prescalers[1]'],
    [{ clockTolerancePpm: -1 }, {}, 'clockTolerancePpm'],
    [{}, { wantedHz: Infinity }, 'wantedHz'],
    [{}, { lengths: [] }, 'lengths'],
    [{}, { lengths: [16, 1] }, 'lengths[1]'],
    [{}, { cycles: [0] }, 'cycles[0]'],
    [{}, { costCycles: NaN }, 'costCycles'],
  ])('refuse %o %o', (timerChange, wantedChange, path) => {
    const plan = () =>
      planRates({ ...timer, ...timerChange }, { wantedHz: 440, lengths: [64], ...wantedChange });
    try {
      plan();
    } catch (error) {
      expect(error).toBeInstanceOf(Refusal);
      expect((error as Refusal).problems[0].path).toBe(path);
      return;
    }
    throw new Error('taken');
  });
});
