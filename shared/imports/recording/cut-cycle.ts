import { limits, Refusal } from '../../contract/index.ts';
import { linesOf } from '../../dft/index.ts';
import type { HarmonicsSource, SamplesSource } from '../../contract/index.ts';
import { harmonicsFrom } from '../table/harmonics-from.ts';
import { seamOf, type Seam } from '../table/seam.ts';
import { valueAt } from './resample.ts';

/** Where one cycle lies in a recording, in samples with their fraction; it ends where the next one begins. */
export interface CycleBounds {
  readonly startSample: number;
  readonly endSample: number;
}

/**
 * How the ends are made to meet. `crossfade`: the last part of the cycle goes over into what stands before its
 * beginning. `harmonics`: this cycle and half of each neighbour under a triangle, folded into one cycle, kept as
 * its first harmonics.
 */
export type Join =
  | { readonly kind: 'none' }
  | { readonly kind: 'crossfade'; readonly share: number }
  | { readonly kind: 'harmonics'; readonly highest: number };

export interface CutCycle {
  readonly source: SamplesSource | HarmonicsSource;
  /** The cycle as it sounds, `length` values. */
  readonly values: Float64Array;
  readonly seam: Seam;
}

const shares = { min: 0.01, max: 0.5 };

/**
 * Cuts one cycle out of a recording and brings it to `length` values, its ends joined.
 *
 * @throws {Refusal} where the bounds do not lie in the recording, or the join does not fit there
 */
export function cutCycle(samples: Float64Array, bounds: CycleBounds, length: number, join: Join): CutCycle {
  const { startSample, endSample } = bounds;
  const period = endSample - startSample;
  checkBounds(samples, bounds);
  if (!Number.isInteger(length) || length < limits.samples.min || length > limits.samples.max) {
    refuse('length', length, `a whole number from ${limits.samples.min} to ${limits.samples.max}`);
  }
  const bandwidth = Math.min(1, length / period);
  const at = (phase: number) => valueAt(samples, startSample + phase * period, bandwidth);
  if (join.kind === 'harmonics') return cutHarmonics(samples, bounds, length, join.highest, at);

  const values = new Float64Array(length);
  for (let k = 0; k < length; k += 1) values[k] = at(k / length);
  if (join.kind === 'crossfade') crossfade(values, join.share, bounds, at);
  return {
    source: { kind: 'samples', values: Array.from(values), resampling: 'bandlimited' },
    values,
    seam: seamOf(values),
  };
}

function checkBounds(samples: Float64Array, { startSample, endSample }: CycleBounds): void {
  const last = samples.length - 1;
  if (!(startSample >= 0 && startSample <= last)) refuse('startSample', startSample, `0 to ${last}`);
  if (!(endSample >= startSample + 2 && endSample <= last)) {
    refuse('endSample', endSample, `${startSample + 2} to ${last}: at least 2 samples after the start`);
  }
}

function refuse(path: string, value: number, allowed: string): never {
  throw new Refusal({ path, value: String(value), allowed });
}

function crossfade(
  values: Float64Array,
  share: number,
  { startSample, endSample }: CycleBounds,
  at: (phase: number) => number,
): void {
  if (!(share >= shares.min && share <= shares.max)) {
    refuse('join.share', share, `a share of the cycle from ${shares.min} to ${shares.max}`);
  }
  if (startSample < share * (endSample - startSample)) {
    refuse('join.share', share, 'a fade no longer than what stands before the cycle; or a later cycle');
  }
  const length = values.length;
  for (let k = Math.ceil((1 - share) * length); k < length; k += 1) {
    const phase = k / length;
    // Raised cosine: what fades out and what fades in are alike, so their gains add up to 1.
    const gain = (1 - Math.cos((Math.PI * (phase - 1 + share)) / share)) / 2;
    values[k] += gain * (at(phase - 1) - values[k]);
  }
}

function cutHarmonics(
  samples: Float64Array,
  { startSample, endSample }: CycleBounds,
  length: number,
  highest: number,
  at: (phase: number) => number,
): CutCycle {
  const most = Math.min(limits.partials.max, Math.ceil(length / 2) - 1);
  if (!Number.isInteger(highest) || highest < 1 || highest > most) {
    refuse('join.highest', highest, `a whole number from 1 to ${most}`);
  }
  const half = (endSample - startSample) / 2;
  if (startSample < half || endSample + half > samples.length - 1) {
    refuse('startSample', startSample, 'a cycle with half a cycle of recording on each side; or a crossfade');
  }
  const folded = new Float64Array(length);
  for (let k = 0; k < length; k += 1) {
    const phase = k / length;
    const neighbour = phase < 0.5 ? phase + 1 : phase - 1;
    const weight = 1 - Math.abs(phase - 0.5);
    folded[k] = weight * at(phase) + (1 - weight) * at(neighbour);
  }
  const source = harmonicsFrom(linesOf(folded), length, (harmonic) => harmonic <= highest);
  const values = sumOf(source, length);
  return { source, values, seam: seamOf(values) };
}

/** The harmonics back as values, by the sum as it is written. */
function sumOf({ offset, partials }: HarmonicsSource, length: number): Float64Array {
  const values = new Float64Array(length).fill(offset);
  const sines = Float64Array.from({ length }, (_, k) => Math.sin((2 * Math.PI * k) / length));
  const cosines = Float64Array.from({ length }, (_, k) => Math.cos((2 * Math.PI * k) / length));
  for (const { harmonic, amplitude, phaseDeg } of partials) {
    const [c, s] = [
      amplitude * Math.cos((phaseDeg * Math.PI) / 180),
      amplitude * Math.sin((phaseDeg * Math.PI) / 180),
    ];
    for (let k = 0, turn = 0; k < length; k += 1, turn = (turn + harmonic) % length) {
      values[k] += c * sines[turn] + s * cosines[turn];
    }
  }
  return values;
}
