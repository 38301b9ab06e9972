import { Refusal } from '../contract/index.ts';
import { mustBePositive, mustBeWhole } from './inputs.ts';
import { centsBetween } from './pitch.ts';

/** `W = (m·NUM + DEN/2)/DEN` in 64-bit whole numbers, m in millihertz (§5): what firmware computes at run time. */
export interface StepWordRule {
  /** NUM and DEN: `2^M·cyclesPerSample/(1000·fclk)`, reduced. */
  readonly numerator: bigint;
  readonly denominator: bigint;
  /** The largest m that may be asked for; with it nothing overflows. */
  readonly largestMilliHz: bigint;
}

export interface StepWordSettings {
  /** M, 1…48. */
  readonly accumulatorBits: number;
  /** Whole hertz, 1…10¹⁰. */
  readonly clockHz: number;
  /** Clock cycles between two samples, 1…2³². */
  readonly cyclesPerSample: number;
  /** The largest frequency that will be asked for, in whole millihertz; half the sample rate where none is named. */
  readonly largestMilliHz?: number;
}

const largestWord = 2n ** 64n - 1n;

/**
 * The rule's constants.
 *
 * @throws {Refusal} where `m·NUM + DEN/2` could overflow 64 bits for some m up to the largest.
 */
export function stepWordRule({
  accumulatorBits,
  clockHz,
  cyclesPerSample,
  largestMilliHz,
}: StepWordSettings): StepWordRule {
  mustBeWhole('accumulatorBits', accumulatorBits, 1, 48);
  mustBeWhole('clockHz', clockHz, 1, 1e10);
  mustBeWhole('cyclesPerSample', cyclesPerSample, 1, 2 ** 32);
  const milliClock = 1000n * BigInt(clockHz);
  const halfRate = milliClock / (2n * BigInt(cyclesPerSample));
  if (largestMilliHz !== undefined) mustBeWhole('largestMilliHz', largestMilliHz, 0, Number(halfRate));
  const largest = largestMilliHz === undefined ? halfRate : BigInt(largestMilliHz);

  const whole = 2n ** BigInt(accumulatorBits) * BigInt(cyclesPerSample);
  const divisor = greatestCommonDivisor(whole, milliClock);
  const numerator = whole / divisor;
  const denominator = milliClock / divisor;
  if (largest * numerator + denominator / 2n > largestWord) {
    const fits = (largestWord - denominator / 2n) / numerator;
    throw new Refusal({
      path: 'accumulatorBits',
      value: `${accumulatorBits} for frequencies up to ${largest} mHz`,
      allowed: `fewer bits, or frequencies up to ${fits} mHz, as the product must stay below 2^64`,
    });
  }
  return { numerator, denominator, largestMilliHz: largest };
}

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  return b === 0n ? a : greatestCommonDivisor(b, a % b);
}

/**
 * The step word of a frequency, as 64-bit firmware computes it; 0 below half the resolution.
 *
 * @throws {Refusal} where the frequency is no whole number of millihertz up to the rule's largest.
 */
export function stepWordFor(rule: StepWordRule, milliHz: number): number {
  const { numerator, denominator, largestMilliHz } = rule;
  mustBeWhole('milliHz', milliHz, 0, Number(largestMilliHz));
  return Number((BigInt(milliHz) * numerator + denominator / 2n) / denominator);
}

export interface StepWordPlan {
  readonly stepWord: number;
  readonly actualHz: number;
  readonly errorCents: number;
  readonly resolutionHz: number;
}

/**
 * The step word nearest to a wanted frequency, and what it gives.
 *
 * @throws {Refusal} where the frequency is below half the resolution or not below half the sample rate.
 */
export function planStepWord(
  { accumulatorBits, sampleRateHz }: { accumulatorBits: number; sampleRateHz: number },
  wantedHz: number,
): StepWordPlan {
  mustBeWhole('accumulatorBits', accumulatorBits, 1, 48);
  mustBePositive('sampleRateHz', sampleRateHz);
  mustBePositive('wantedHz', wantedHz);
  const resolutionHz = sampleRateHz / 2 ** accumulatorBits;
  const stepWord = Math.round(wantedHz / resolutionHz);
  if (stepWord < 1 || 2 * stepWord >= 2 ** accumulatorBits) {
    throw new Refusal({
      path: 'wantedHz',
      value: String(wantedHz),
      allowed: `a frequency from ${resolutionHz / 2} Hz up to, not including, ${sampleRateHz / 2} Hz`,
    });
  }
  const actualHz = stepWord * resolutionHz;
  return { stepWord, actualHz, errorCents: centsBetween(actualHz, wantedHz), resolutionHz };
}
