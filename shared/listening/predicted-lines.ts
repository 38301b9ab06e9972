import { holdGain } from '../output-stage/filter.ts';
import { strongestLines } from '../playback/strongest-lines.ts';
import { roundHzOf } from './drive.ts';
import { heardLines } from './program.ts';
import { rmsOfLines } from './rms.ts';
import type { Drive, Voice } from './sound.ts';
import { stageResponse } from './stage-response.ts';
import { bandGain } from './step-kernel.ts';

export interface PredictedLine {
  readonly hz: number;
  /** Peak amplitude; an amplitude-1 sine is 1. */
  readonly amplitude: number;
}

/** Lines of a round that are looked at, at most: beyond, the hold has taken all that matters. */
const roundLinesAtMost = 2 ** 18;
/** And of an accumulator, in 0…fs/2, where no more are asked for. */
const accumulatorLines = 2 ** 11;

/**
 * The strongest lines of what a voice gives, below half of the context's rate, in rising order; none of a `once`.
 *
 * A loop's and a curve's are the table's (§5). An accumulator's are those of its samples, each with its images at
 * k·fs ± f under the hold's `|sin(πx)/(πx)|`, x = f/fs, and under the low-pass with which edges are turned into frames.
 * Takes some ms at most.
 *
 * @param most how many, 1…4096
 */
export function predictedLines(
  voice: Voice,
  drive: Drive,
  contextRateHz: number,
  most = 512,
): PredictedLine[] {
  const own = voice.drive ?? drive;
  if (own.kind === 'once') return [];
  const lines: PredictedLine[] = [];
  const take = (hz: number, amplitude: number) => {
    if (amplitude > 0) lines.push({ hz, amplitude });
  };
  if (own.kind === 'accumulator' && voice.form === 'staircase') {
    // Of lines up to fs/2 only a share is heard where fs is far above the context's rate.
    const wanted = Math.ceil(most * Math.max(1, own.sampleRateHz / contextRateHz));
    eachAccumulatorLine(voice, own, contextRateHz, Math.max(most, Math.min(accumulatorLines, wanted)), take);
  } else {
    const roundHz = roundHzOf(own, voice.values.length);
    const { re, im } = heardLines(voice, own, contextRateHz, roundLinesAtMost);
    for (let m = 1; m < re.length; m += 1) take(m * roundHz, Math.hypot(re[m], im[m]));
  }
  const strongest =
    lines.length <= most ? lines : lines.sort((a, b) => b.amplitude - a.amplitude).slice(0, most);
  return strongest.sort((a, b) => a.hz - b.hz);
}

/**
 * RMS of what is heard of a voice, mean out, so that voices can be made equally loud before they are played: by Parseval's
 * theorem over all lines below half of the context's rate. Of an accumulator the 2048 strongest lines of its samples count
 * as they are; the power of all others, known by what is missing from the variance of its entries, counts as spread evenly
 * over 0…fs/2, as folding spreads it. A `once` counts as if it went on.
 */
export function rmsOfVoice(voice: Voice, drive: Drive, contextRateHz: number): number {
  const own = voice.drive ?? drive;
  if (own.kind !== 'accumulator' || voice.form === 'curve') {
    return rmsOfLines(heardLines(voice, own, contextRateHz, roundLinesAtMost));
  }
  let heard = 0;
  const listed = eachAccumulatorLine(voice, own, contextRateHz, accumulatorLines, (_, amplitude) => {
    heard += (amplitude * amplitude) / 2;
  });
  const others = Math.max(0, visitedVariance(voice.values, own) - listed);
  return Math.sqrt(heard + others * (voice.gain ?? 1) ** 2 * evenShare(voice, own, contextRateHz));
}

type AccumulatorDrive = Extract<Drive, { kind: 'accumulator' }>;

/**
 * Tells each heard line of the strongest lines of an accumulator's samples.
 *
 * @returns the power of those lines in the samples themselves
 */
function eachAccumulatorLine(
  voice: Voice,
  drive: AccumulatorDrive,
  contextRateHz: number,
  most: number,
  tell: (hz: number, amplitude: number) => void,
): number {
  const { sampleRateHz } = drive;
  const { bins, amplitudes, period } = strongestLines(voice.values, drive, most);
  const gain = gainOf(voice, sampleRateHz, contextRateHz);
  const top = contextRateHz / 2;
  let power = 0;
  for (let i = 0; i < bins.length; i += 1) {
    const hz = (bins[i] / period) * sampleRateHz;
    const isHalf = 2 * bins[i] === period;
    power += (amplitudes[i] * amplitudes[i]) / (isHalf ? 1 : 2);
    // The line at fs/2 meets its own image: of the sampled one half as much is told.
    const amplitude = amplitudes[i] * (voice.gain ?? 1) * (isHalf ? 2 : 1);
    for (let centre = 0; centre - hz < top; centre += sampleRateHz) {
      if (centre > 0 && !isHalf) tell(centre - hz, amplitude * gain(centre - hz));
      if (centre + hz < top) tell(centre + hz, amplitude * gain(centre + hz));
    }
  }
  return power;
}

/** What hold, stage and low-pass leave of a line of the samples, or of an image of one. */
function gainOf({ stage }: Voice, sampleRateHz: number, contextRateHz: number): (hz: number) => number {
  const response = stage && stageResponse(stage);
  const complex = new Float64Array(2);
  return (hz) => {
    const held = holdGain(hz, sampleRateHz) * bandGain(hz, contextRateHz);
    if (response === undefined) return held;
    response(hz, complex);
    return held * Math.hypot(complex[0], complex[1]);
  };
}

/** Variance of the entries that an accumulator comes by: all, or every 2^n-th. */
function visitedVariance(values: Float64Array, { accumulatorBits, stepWord }: AccumulatorDrive): number {
  let period = 2 ** accumulatorBits;
  for (let step = stepWord; step % 2 === 0; step /= 2) period /= 2;
  const stride = Math.max(1, values.length / period);
  const count = values.length / stride;
  let sum = 0;
  let squares = 0;
  for (let n = 0; n < values.length; n += stride) {
    sum += values[n];
    squares += values[n] * values[n];
  }
  return squares / count - (sum / count) ** 2;
}

const shareSteps = 512;

/** Share of power that is heard of lines spread evenly over 0…fs/2, each with its images: `2/fs·∫gain²` over what is heard. */
function evenShare(voice: Voice, { sampleRateHz }: AccumulatorDrive, contextRateHz: number): number {
  const gain = gainOf(voice, sampleRateHz, contextRateHz);
  const top = contextRateHz / 2;
  let sum = 0;
  for (let i = 0; i < shareSteps; i += 1) sum += gain(((i + 0.5) / shareSteps) * top) ** 2;
  return ((2 * top) / shareSteps / sampleRateHz) * sum;
}
