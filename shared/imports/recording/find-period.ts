import { Refusal } from '../../contract/index.ts';
import { squareDifference } from './autocorrelation.ts';
import { valueAt } from './resample.ts';

export interface FoundPeriod {
  /** With its fraction. */
  readonly periodSamples: number;
  readonly frequencyHz: number;
  /** How alike the signal is after one period: 1 is a perfect repetition, noise is near 0. */
  readonly clarity: number;
}

export interface PeriodSearch {
  /** Default 20 Hz. */
  readonly lowestHz?: number;
  /** Default an eighth of the sample rate, at most 5 kHz. */
  readonly highestHz?: number;
}

/** A peak as high as this share of the highest counts as a repetition; the first of them is the period. */
const enough = 0.97;
/** Below this nothing repeats. */
const leastClarity = 0.5;
const fewestPeriods = 2;

/**
 * Finds the period of a steady tone by autocorrelation: the first high peak of the normalised square difference, then
 * the peaks after 2, 4, 8 … periods, which divide what a peak's place lacks in precision.
 *
 * @throws {Refusal} where nothing repeats, or the recording holds less than two periods
 */
export function findPeriod(
  samples: Float64Array,
  sampleRateHz: number,
  { lowestHz = 20, highestHz = Math.min(5_000, sampleRateHz / 8) }: PeriodSearch = {},
): FoundPeriod {
  const longest = Math.min(sampleRateHz / lowestHz, samples.length / fewestPeriods);
  const shortest = Math.max(2, sampleRateHz / highestHz);
  if (longest < shortest) refuse(`${samples.length} samples`, 'at least two periods of the tone');
  let lags = 1_024;
  while (lags < 2 * longest && lags < samples.length) lags *= 2;
  const curve = curveOf(squareDifference(withoutMean(samples), lags));
  const first = firstPeak(curve, Math.floor(shortest), Math.ceil(longest));
  if (first === undefined)
    refuse('a signal in which nothing repeats', 'a steady tone, or bounds set by hand');

  const reach = Math.min(lags, Math.floor(samples.length / 1.5)) - 2;
  let periodSamples = first.lag;
  for (let periods = 2; ; periods *= 2) {
    const count = Math.min(periods, Math.floor(reach / periodSamples));
    if (count < 2) break;
    const peak = peakNear(curve, count * periodSamples, periodSamples / 4);
    if (peak === undefined || peak.height < 0.8 * first.height) break;
    periodSamples = peak.lag / count;
    if (count < periods) break;
  }
  return { periodSamples, frequencyHz: sampleRateHz / periodSamples, clarity: Math.min(1, first.height) };
}

/** The square difference at whole lags, and mirrored about lag 0 for values between them. */
interface Curve {
  readonly at: Float64Array;
  readonly mirrored: Float64Array;
}

interface Peak {
  readonly lag: number;
  readonly height: number;
}

function curveOf(at: Float64Array): Curve {
  const mirrored = new Float64Array(2 * at.length - 1);
  for (let lag = 0; lag < at.length; lag += 1) {
    mirrored[at.length - 1 + lag] = at[lag];
    mirrored[at.length - 1 - lag] = at[lag];
  }
  return { at, mirrored };
}

function refuse(value: string, allowed: string): never {
  throw new Refusal({ path: 'recording', value, allowed });
}

function withoutMean(samples: Float64Array): Float64Array {
  let sum = 0;
  for (let i = 0; i < samples.length; i += 1) sum += samples[i];
  const mean = sum / samples.length;
  return samples.map((value) => value - mean);
}

/** Of each stretch above 0 the highest place; the first of those that is nearly as high as the highest. */
function firstPeak(curve: Curve, shortest: number, longest: number): Peak | undefined {
  const { at } = curve;
  const places: number[] = [];
  let lag = 1;
  while (lag < at.length && at[lag] > 0) lag += 1;
  let best = 0;
  for (; lag < at.length - 1 && lag <= longest + 1; lag += 1) {
    if (at[lag] <= 0) {
      if (best > 0) places.push(best);
      best = 0;
    } else if (lag >= shortest && (best === 0 || at[lag] > at[best])) best = lag;
  }
  if (best > 0 && best <= longest && at[best] >= at[best + 1]) places.push(best);
  const sampled = places.reduce((most, place) => Math.max(most, at[place]), 0);
  // A sharp peak between two lags shows less than its height at either: half of it is enough to be looked at closely.
  const peaks = places.filter((place) => at[place] >= sampled / 2).map((place) => topOf(curve, place));
  const highest = peaks.reduce((most, { height }) => Math.max(most, height), 0);
  if (highest < leastClarity) return undefined;
  return peaks.find(({ height }) => height >= enough * highest);
}

function peakNear(curve: Curve, middle: number, width: number): Peak | undefined {
  const { at } = curve;
  const from = Math.max(1, Math.ceil(middle - width));
  const to = Math.min(at.length - 2, Math.floor(middle + width));
  if (from > to) return undefined;
  let best = from;
  for (let lag = from + 1; lag <= to; lag += 1) if (at[lag] > at[best]) best = lag;
  return best === from || best === to ? undefined : topOf(curve, best);
}

/** The top of the band-limited curve within one lag of a peak, by ternary search. */
function topOf({ at, mirrored }: Curve, peak: number): Peak {
  const heightAt = (lag: number) => valueAt(mirrored, at.length - 1 + lag);
  let [from, to] = [peak - 1, peak + 1];
  for (let turn = 0; turn < 24; turn += 1) {
    const [left, right] = [from + (to - from) / 3, to - (to - from) / 3];
    if (heightAt(left) < heightAt(right)) from = left;
    else to = right;
  }
  const lag = (from + to) / 2;
  return { lag, height: heightAt(lag) };
}
