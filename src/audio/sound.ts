import { linesOf } from '../../shared/dft/index.ts';
import { longestPreviewSeconds, planLoop, type LoopPlan } from './loop-plan.ts';
import { renderLoop } from './render-loop.ts';
import { renderOnce } from './render-once.ts';

/** Which of the two voices is heard. */
export type Hearing = 'ideal' | 'table';

/** What is to be played. The arrays hold one value an entry and are read, never changed. */
export interface Sound {
  /** The levelled cycle before it was quantised. */
  readonly cycle: Float64Array;
  /** What the codes stand for, in the units of `cycle`. */
  readonly values: Float64Array;
  readonly range: 'bipolar' | 'unipolar';
  readonly mode: 'loop' | 'once';
  /** Rate at which the table is stepped through, in hertz. */
  readonly sampleRateHz: number;
}

/** Both voices as frames of the context, full scale ±1, in step with each other. */
export interface RenderedSound {
  readonly ideal: Float32Array<ArrayBuffer>;
  readonly table: Float32Array<ArrayBuffer>;
  /** Absent where the sound is one pass. */
  readonly plan?: LoopPlan;
}

/** Why a sound cannot be played, in words for the screen; `null` where it can. */
export function whyUnplayable(sound: Sound, contextRateHz: number): string | null {
  const { sampleRateHz, values, mode } = sound;
  if (!(sampleRateHz > 0 && Number.isFinite(sampleRateHz))) {
    return 'The sample rate must be a number of hertz above 0.';
  }
  const seconds = values.length / sampleRateHz;
  if (seconds > longestPreviewSeconds) {
    return `One ${mode === 'loop' ? 'round' : 'pass'} would last ${Math.round(seconds)} s; the preview plays up to ${longestPreviewSeconds} s.`;
  }
  if (mode === 'loop' && 2 * sampleRateHz >= contextRateHz * values.length) {
    return `Nothing of this wave lies below ${contextRateHz / 2000} kHz, half of the rate at which this browser plays.`;
  }
  return null;
}

/** Renders both voices for a context's rate. The sound must be playable. */
export function renderSound(sound: Sound, contextRateHz: number): RenderedSound {
  const { cycle, values, mode, sampleRateHz } = sound;
  // A unipolar table swings by half as much about its mean; doubled, its full scale is ±1 too.
  const gain = sound.range === 'unipolar' ? 2 : 1;
  if (mode === 'once') {
    return {
      ideal: scaled(renderOnce(cycle, sampleRateHz, contextRateHz), gain),
      table: scaled(renderOnce(values, sampleRateHz, contextRateHz), gain),
    };
  }
  const plan = planLoop(sampleRateHz / values.length, contextRateHz);
  return {
    ideal: scaled(renderLoop(linesOf(cycle), cycle.length, plan), gain),
    table: scaled(renderLoop(linesOf(values), values.length, plan), gain),
    plan,
  };
}

function scaled(frames: Float32Array<ArrayBuffer>, gain: number): Float32Array<ArrayBuffer> {
  if (gain !== 1) for (let i = 0; i < frames.length; i += 1) frames[i] *= gain;
  return frames;
}
