import { renderPass, type Pass } from './curve-pass.ts';
import { gridSizeFor, roundOnGrid } from './cycle.ts';
import { roundHzOf } from './drive.ts';
import {
  curveLines,
  highestBelow,
  noLines,
  staircaseLines,
  throughResponse,
  type RoundLines,
} from './lines.ts';
import type { PinProgram } from './pin-player.ts';
import type { RoundProgram } from './round-reader.ts';
import type { Drive, Voice } from './sound.ts';
import { stageResponse } from './stage-response.ts';
import { stepKernel } from './step-kernel.ts';

/** Points of a staircase's grid at most: lines up to 8192, rounds of a third of a second at 48 kHz, some 10 ms to make. */
const gridPointsAtMost = 2 ** 17;

/** How a voice is played: by `RoundReader`, by `PinPlayer`, or as frames made beforehand. Plain data. */
export type Program =
  | ({ readonly kind: 'round' } & RoundProgram)
  | ({ readonly kind: 'pin' } & PinProgram)
  | ({ readonly kind: 'pass' } & Pass);

/**
 * Which way a voice is played. A curve has no samples: it is a round under any drive but `once`. A staircase in a loop is
 * one as well, as long as its round is short enough for its lines; a longer one, an accumulator and a pass through the
 * table are played sample by sample.
 */
export function wayOf({ form, values }: Voice, drive: Drive, contextRateHz: number): Program['kind'] {
  if (form === 'curve') return drive.kind === 'once' ? 'pass' : 'round';
  if (drive.kind !== 'loop') return 'pin';
  const highest = highestBelow(contextRateHz, roundHzOf(drive, values.length));
  return gridSizeFor(highest) <= gridPointsAtMost ? 'round' : 'pin';
}

/**
 * Makes what is played of a voice: mean out, gain and stage in. Takes up to some 10 ms for a long round, less than 1 ms
 * for a common one.
 *
 * @param drive the sound's; the voice's own goes before it
 */
export function programOf(voice: Voice, drive: Drive, contextRateHz: number): Program {
  const own = voice.drive ?? drive;
  const way = wayOf(voice, own, contextRateHz);
  if (way === 'pass') {
    const response = voice.stage && stageResponse(voice.stage);
    return { kind: 'pass', ...renderPass(levelsOf(voice), own.sampleRateHz, contextRateHz, response) };
  }
  if (way === 'pin') {
    return {
      kind: 'pin',
      values: levelsOf(voice),
      drive: own,
      kernel: stepKernel(contextRateHz, voice.stage),
    };
  }
  const roundHz = roundHzOf(own, voice.values.length);
  return { kind: 'round', ...roundOnGrid(heardLines(voice, own, contextRateHz)), roundHz };
}

/** Lines of a round as they are heard, below half of the context's rate: form, stage and gain in. */
export function heardLines(voice: Voice, drive: Drive, contextRateHz: number, most = Infinity): RoundLines {
  const { values, form, stage, gain = 1 } = voice;
  const own = voice.drive ?? drive;
  const roundHz = roundHzOf(own, values.length);
  const highest = Math.min(highestBelow(contextRateHz, roundHz), most);
  if (highest < 1) return noLines(0);
  const plain = form === 'curve' ? curveLines(values, highest) : staircaseLines(values, highest);
  const lines = stage === undefined ? plain : throughResponse(plain, roundHz, stageResponse(stage));
  if (gain !== 1) {
    for (let m = 1; m < lines.re.length; m += 1) {
      lines.re[m] *= gain;
      lines.im[m] *= gain;
    }
  }
  return lines;
}

/** Values without their mean, times the voice's gain. */
function levelsOf({ values, gain = 1 }: Voice): Float64Array {
  let sum = 0;
  for (const value of values) sum += value;
  const mean = sum / values.length;
  return values.map((value) => (value - mean) * gain);
}
