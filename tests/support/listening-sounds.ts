import { buildTable } from '../../shared/build-table.ts';
import { type Drive, type Voice } from '../../shared/listening/index.ts';
import type { StageParts } from '../../shared/output-stage/index.ts';
import { standardShapes } from '../../shared/waveform/index.ts';

/** Full scale of what is rendered at the volume that the player starts with: −18 dBFS. */
export const fullScale = 10 ** (-18 / 20);

// What the player is made to play in the tests that listen to it.

export const sawtooth = buildTable({
  schema: 1,
  name: 'Sawtooth',
  source: standardShapes.sawtooth(60),
  table: { length: 128, bits: 8 },
});
export const sine = (length: number, bits: number) =>
  buildTable({
    schema: 1,
    name: 'Sine',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 17 }] },
    table: { length, bits },
  }).values;

export const staircase = (values: Float64Array, over: Partial<Voice> = {}): Voice => ({
  values,
  cycles: 1,
  form: 'staircase',
  ...over,
});

/** 1 kΩ and 4.7 nF at the pin, an op-amp of 1 MHz, a Butterworth low-pass at 9 kHz. */
export const stage: StageParts = {
  outputOhms: 1_000,
  capacitanceF: 4.7e-9,
  opAmp: { gainBandwidthHz: 1e6, slewRateVPerS: 0.5e6 },
  filter: { kind: 'butterworth', cutoffHz: 9_000 },
};
export const stageAsked = { polesHz: [1 / (2 * Math.PI * 4.7e-6), 1e6], butterworthHz: 9_000 };

/** Repeats 20 times a second, so that its lines stand 20 Hz apart. */
export const shortAccumulator: Drive = {
  kind: 'accumulator',
  sampleRateHz: 20_480,
  accumulatorBits: 10,
  stepWord: 27,
};

export const loop = (sampleRateHz: number): Drive => ({ kind: 'loop', sampleRateHz });

export function largestStep(frames: ArrayLike<number>): number {
  let step = 0;
  for (let i = 1; i < frames.length; i += 1) step = Math.max(step, Math.abs(frames[i] - frames[i - 1]));
  return step;
}
