import { showValue, type Problem } from '../contract/index.ts';
import { transformOf } from '../dft/index.ts';

/** One point of a response curve: so many dB at a frequency. */
export interface ResponsePoint {
  readonly hz: number;
  readonly db: number;
}

/** What a curve may hold. Frequencies rise from point to point. */
export const responseLimits = {
  points: { min: 2, max: 256 },
  hz: { min: 1, max: 200_000 },
  /** Relative levels, or sound pressure levels as data sheets give them. */
  db: { min: -120, max: 160 },
} as const;

/** What is wrong with a curve, by point and field; an empty list where nothing is. */
export function curveProblems(points: readonly ResponsePoint[]): Problem[] {
  const { points: count, hz: range, db: levels } = responseLimits;
  if (points.length < count.min || points.length > count.max) {
    const allowed = `${count.min} to ${count.max} points`;
    return [{ path: 'points', value: `${points.length} points`, allowed }];
  }
  const problems: Problem[] = [];
  points.forEach(({ hz, db }, index) => {
    const before = index === 0 ? undefined : points[index - 1].hz;
    if (!(hz >= range.min && hz <= range.max)) {
      const allowed = `a number of hertz from ${range.min} to ${range.max}`;
      problems.push({ path: `points[${index}].hz`, value: showValue(hz), allowed });
    } else if (before !== undefined && !(hz > before)) {
      const allowed = `more than the ${before} Hz of the point before it`;
      problems.push({ path: `points[${index}].hz`, value: showValue(hz), allowed });
    }
    if (!(db >= levels.min && db <= levels.max)) {
      const allowed = `a number of dB from ${levels.min} to ${levels.max}`;
      problems.push({ path: `points[${index}].db`, value: showValue(db), allowed });
    }
  });
  return problems;
}

/**
 * Level of a curve at a frequency, in dB: straight between points over the logarithm of the frequency, and that of the
 * first or the last point beyond them, as nothing is known there.
 *
 * @param points without problems
 * @param hz 0 or more
 */
export function levelAt(points: readonly ResponsePoint[], hz: number): number {
  const last = points.length - 1;
  if (hz <= points[0].hz) return points[0].db;
  if (hz >= points[last].hz) return points[last].db;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (points[middle].hz <= hz) low = middle;
    else high = middle;
  }
  const [left, right] = [points[low], points[high]];
  const share = Math.log(hz / left.hz) / Math.log(right.hz / left.hz);
  return left.db + share * (right.db - left.db);
}

/**
 * Linear gain over frequency. The strongest point has gain 1: no line is louder through a device than without it.
 *
 * @param points without problems
 */
export function gainOf(points: readonly ResponsePoint[]): (hz: number) => number {
  const top = strongestDb(points);
  return (hz) => 10 ** ((levelAt(points, hz) - top) / 20);
}

const strongestDb = (points: readonly ResponsePoint[]): number =>
  points.reduce((most, { db }) => Math.max(most, db), -Infinity);

/** Taps at 48 kHz: 171 ms, which tells frequencies 6 Hz apart. Higher rates take as long and so more of them. */
const tapsAt48k = 8_192;
/** Points of the transform for each tap: the cepstrum folds over less the more there are. */
const pointsPerTap = 4;

/** Length of the impulse response for a rate, in frames: a power of two. */
export const impulseTaps = (rateHz: number): number =>
  tapsAt48k * 2 ** Math.max(0, Math.ceil(Math.log2(rateHz / 48_000)));

/**
 * The curve as a filter: the minimum-phase impulse response whose magnitude is `gainOf`, by folding the real cepstrum
 * (A. V. Oppenheim and R. W. Schafer, Discrete-Time Signal Processing, the chapter on the complex cepstrum; from
 * memory). Its last quarter fades out, so that cutting it short makes no step. From 50 Hz to 20 kHz and below half
 * the rate, its lines lie within 0.25 dB of a curve of 60 dB that changes by no more than 24 dB an octave.
 *
 * @param points without problems
 * @param rateHz of the frames, in hertz
 * @returns `impulseTaps(rateHz)` frames, to be convolved with
 */
export function minimumPhaseImpulse(
  points: readonly ResponsePoint[],
  rateHz: number,
): Float32Array<ArrayBuffer> {
  const taps = impulseTaps(rateHz);
  const size = taps * pointsPerTap;
  const half = size / 2;
  const { data, out, forward } = transformOf(size);

  // The logarithm of the magnitude is real and even, and so is its transform: forward serves as inverse.
  const top = strongestDb(points);
  data.fill(0);
  for (let k = 0; k <= half; k += 1) {
    const logGain = ((levelAt(points, (k * rateHz) / size) - top) * Math.LN10) / 20;
    data[2 * k] = logGain;
    if (k > 0 && k < half) data[2 * (size - k)] = logGain;
  }
  forward(out, data);

  // Folded: what lies before time 0 is added to what lies after it.
  data.fill(0);
  data[0] = out[0] / size;
  for (let n = 1; n < half; n += 1) data[2 * n] = (2 * out[2 * n]) / size;
  data[size] = out[size] / size;
  forward(out, data);

  // e^C, conjugated, so that forward is the inverse again; the response is real.
  for (let k = 0; k < size; k += 1) {
    const gain = Math.exp(out[2 * k]);
    data[2 * k] = gain * Math.cos(out[2 * k + 1]);
    data[2 * k + 1] = -gain * Math.sin(out[2 * k + 1]);
  }
  forward(out, data);

  const impulse = new Float32Array(taps);
  const faded = taps / 4;
  for (let n = 0; n < taps; n += 1) {
    const left = taps - n;
    const fade = left >= faded ? 1 : 0.5 - 0.5 * Math.cos((Math.PI * left) / faded);
    impulse[n] = (out[2 * n] / size) * fade;
  }
  return impulse;
}
