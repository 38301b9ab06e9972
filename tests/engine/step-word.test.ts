import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import { planStepWord, stepWordFor, stepWordRule } from '../../shared/playback/index.ts';
import { holds } from './support/seeded.ts';

const problemsOf = (work: () => unknown) => {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems;
    throw error;
  }
  throw new Error('taken');
};

const settings = fc.record({
  accumulatorBits: fc.integer({ min: 1, max: 48 }),
  clockHz: fc.integer({ min: 1, max: 200_000_000 }),
  cyclesPerSample: fc.integer({ min: 1, max: 4096 }),
});

describe('the rule for step words', () => {
  it('is 2^M·cyclesPerSample/(1000·fclk), reduced', () => {
    // 2³²·256/(1000·16 MHz) = 2³²·2⁸/(2¹³·5⁹) = 2²⁷/5⁹.
    expect(stepWordRule({ accumulatorBits: 32, clockHz: 16_000_000, cyclesPerSample: 256 })).toEqual({
      numerator: 2n ** 27n,
      denominator: 5n ** 9n,
      largestMilliHz: 31_250_000n,
    });
  });

  it('gives the nearest word, as exact fractions have it, and never overflows 64 bits', () => {
    let taken = 0;
    holds(
      fc.property(settings, fc.double({ min: 0, max: 1, noNaN: true }), (given, share) => {
        let rule;
        try {
          rule = stepWordRule(given);
        } catch (error) {
          if (error instanceof Refusal) return;
          throw error;
        }
        taken += 1;
        const milliHz = Math.floor(share * Number(rule.largestMilliHz));
        const word = stepWordFor(rule, milliHz);
        // 2·|W·1000·fclk − m·2^M·cycles| ≤ 1000·fclk
        const unit = 1000n * BigInt(given.clockHz);
        const exact = BigInt(milliHz) * 2n ** BigInt(given.accumulatorBits) * BigInt(given.cyclesPerSample);
        const off = 2n * (BigInt(word) * unit - exact);
        expect(off <= unit && off >= -unit).toBe(true);
        for (const m of [BigInt(milliHz), rule.largestMilliHz]) {
          expect(BigInt.asUintN(64, m * rule.numerator + rule.denominator / 2n)).toBe(
            m * rule.numerator + rule.denominator / 2n,
          );
        }
      }),
      500,
    );
    expect(taken).toBeGreaterThan(300);
  });

  it('is refused where one more millihertz than it says would still overflow nothing, or this one does', () => {
    let refused = 0;
    holds(
      fc.property(settings, (given) => {
        try {
          stepWordRule(given);
        } catch (error) {
          if (!(error instanceof Refusal)) throw error;
          refused += 1;
          const [{ path, allowed }] = error.problems;
          expect(path).toBe('accumulatorBits');
          const fits = Number(/up to (\d+) mHz/.exec(allowed)?.[1]);
          const rule = stepWordRule({ ...given, largestMilliHz: fits });
          expect((BigInt(fits) + 1n) * rule.numerator + rule.denominator / 2n > 2n ** 64n - 1n).toBe(true);
          expect(() => stepWordRule({ ...given, largestMilliHz: fits + 1 })).toThrow(Refusal);
        }
      }),
      500,
    );
    expect(refused).toBeGreaterThan(20);
  });

  it.each([
    [{ accumulatorBits: 0 }, 'accumulatorBits'],
    [{ accumulatorBits: 49 }, 'accumulatorBits'],
    [{ clockHz: 1.5 }, 'clockHz'],
    [{ clockHz: 0 }, 'clockHz'],
    [{ cyclesPerSample: 0 }, 'cyclesPerSample'],
    [{ largestMilliHz: -1 }, 'largestMilliHz'],
    [{ largestMilliHz: 31_250_001 }, 'largestMilliHz'],
  ])('refuses %o', (change, path) => {
    const given = { accumulatorBits: 32, clockHz: 16_000_000, cyclesPerSample: 256, ...change };
    expect(problemsOf(() => stepWordRule(given))).toMatchObject([{ path }]);
  });

  it('refuses a frequency above its largest, or between two millihertz', () => {
    const rule = stepWordRule({
      accumulatorBits: 32,
      clockHz: 16_000_000,
      cyclesPerSample: 256,
      largestMilliHz: 20_000_000,
    });
    expect(stepWordFor(rule, 440_000)).toBe(Math.round((440 * 2 ** 32) / 62_500));
    expect(stepWordFor(rule, 0)).toBe(0);
    for (const milliHz of [20_000_001, 0.5, -1, NaN]) {
      expect(problemsOf(() => stepWordFor(rule, milliHz))).toMatchObject([{ path: 'milliHz' }]);
    }
  });
});

describe('the step word of a fixed tone', () => {
  it('is the nearest one, and its error never more than half the resolution', () => {
    holds(
      fc.property(
        fc.integer({ min: 8, max: 48 }),
        fc.double({ min: 1000, max: 1e6, noNaN: true }),
        fc.double({ min: 0.01, max: 0.49, noNaN: true }),
        (accumulatorBits, sampleRateHz, share) => {
          const wantedHz = share * sampleRateHz;
          const { stepWord, actualHz, resolutionHz, errorCents } = planStepWord(
            { accumulatorBits, sampleRateHz },
            wantedHz,
          );
          expect(Number.isInteger(stepWord)).toBe(true);
          expect(Math.abs(actualHz - wantedHz)).toBeLessThanOrEqual(0.500001 * resolutionHz);
          expect(actualHz).toBeCloseTo((stepWord * sampleRateHz) / 2 ** accumulatorBits, 6);
          expect(errorCents).toBeCloseTo(1200 * Math.log2(actualHz / wantedHz), 9);
        },
      ),
    );
  });

  it.each([31_250, 40_000, 0.0000001, 0, NaN])('refuses %d Hz at 62500 samples a second', (wantedHz) => {
    const plan = () => planStepWord({ accumulatorBits: 24, sampleRateHz: 62_500 }, wantedHz);
    expect(problemsOf(plan)).toMatchObject([{ path: 'wantedHz' }]);
  });
});
