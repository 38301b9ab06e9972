import { expect } from 'vitest';
import { transformOf } from '../../../shared/dft/index.ts';
import {
  PinPlayer,
  type RoundReader,
  stepKernel,
  type Drive,
  type PinProgram,
  type RoundLines,
  type Voice,
} from '../../../shared/listening/index.ts';
import type { StageParts } from '../../../shared/output-stage/index.ts';

export const meanOf = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;
export const decibels = (ratio: number) => 20 * Math.log10(ratio);

/** The wave at a phase by adding up its partials: the reference for all that is faster. */
export function added({ re, im }: RoundLines, phase: number): number {
  let sum = 0;
  for (let m = 1; m < re.length; m += 1) {
    const angle = 2 * Math.PI * ((m * phase) % 1);
    sum += re[m] * Math.cos(angle) - im[m] * Math.sin(angle);
  }
  return sum;
}

export function furthest(a: RoundLines, b: RoundLines): number {
  expect(a.re.length).toBe(b.re.length);
  let worst = 0;
  for (let m = 0; m < a.re.length; m += 1) {
    worst = Math.max(worst, Math.hypot(a.re[m] - b.re[m], a.im[m] - b.im[m]));
  }
  return worst;
}

/** A pin's program of a voice, whichever way the voice would be played. */
export function pinOf({ values, stage }: Voice, drive: Drive, contextRateHz: number): PinProgram {
  const mean = meanOf(values);
  return { values: values.map((value) => value - mean), drive, kernel: stepKernel(contextRateHz, stage) };
}

export function playerOf(voice: Voice, drive: Drive, contextRateHz = 48_000): PinPlayer {
  const player = new PinPlayer(contextRateHz);
  player.load(pinOf(voice, drive, contextRateHz));
  return player;
}

/** Frames after so many have gone by; in blocks of an odd length, as no block must matter. */
export function framesOf(player: PinPlayer | RoundReader, count: number, before = 0): Float64Array {
  const out = new Float64Array(before + count);
  for (let at = 0; at < out.length; at += 171) player.process(out, at, Math.min(out.length, at + 171));
  return out.slice(before);
}

/** The largest difference of two lists of frames, as long as the first. */
export function furthestApart(a: Iterable<number>, b: ArrayLike<number>): number {
  let [worst, i] = [0, 0];
  for (const value of a) worst = Math.max(worst, Math.abs(value - b[i++]));
  return i > b.length ? Infinity : worst;
}

/** Amplitudes of bins 0…n/2 of frames that come round. */
export function amplitudesOf(frames: Float64Array): Float64Array {
  const count = frames.length;
  const data = new Float64Array(2 * count);
  const out = new Float64Array(2 * count);
  for (let i = 0; i < count; i += 1) data[2 * i] = frames[i];
  transformOf(count).forward(out, data);
  return Float64Array.from(
    { length: Math.floor(count / 2) },
    (_, k) => ((k === 0 ? 1 : 2) * Math.hypot(out[2 * k], out[2 * k + 1])) / count,
  );
}

export const staircase = (values: Float64Array, stage?: StageParts): Voice => ({
  values,
  cycles: 1,
  form: 'staircase',
  stage,
});

export const filtered: StageParts = {
  outputOhms: 10_000,
  capacitanceF: 1e-9,
  opAmp: { slewRateVPerS: 0.5e6, gainBandwidthHz: 1e6 },
  filter: { kind: 'butterworth', cutoffHz: 4000 },
};
export const slow: StageParts = { outputOhms: 0, capacitanceF: 0, filter: { kind: 'rc', cutoffHz: 50 } };
