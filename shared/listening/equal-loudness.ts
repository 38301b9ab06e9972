import { predictedLines, rmsOfVoice } from './predicted-lines.ts';
import type { Drive, Voice } from './sound.ts';

/** Below this RMS, in full scales, a voice makes no sound that another could be brought to. */
const leastRms = 1e-9;
/** Lines that are weighed where a response follows. */
const linesWeighed = 4096;

export type Matched =
  | {
      readonly kind: 'matched';
      /** The two with their gains: the weaker one's is 1. */
      readonly a: Voice;
      readonly b: Voice;
      /** By how much each was turned down, in dB; one of them by 0. */
      readonly turnedDownDb: { readonly a: number; readonly b: number };
    }
  /** One of them does not swing, or nothing of it lies in the band that is played. */
  | { readonly kind: 'silent'; readonly which: 'a' | 'b' | 'both' };

/**
 * Brings two voices to one loudness by the RMS of what is heard: of their lines below half of the context's rate, mean
 * out. The stronger one is turned down, nothing is turned up.
 *
 * @param response linear gain at a frequency in Hz of where it is heard, if that is not straight
 */
export function equallyLoud(
  a: Voice,
  b: Voice,
  drive: Drive,
  contextRateHz: number,
  response?: (hz: number) => number,
): Matched {
  const [rmsA, rmsB] = [a, b].map((voice) => heardRms({ ...voice, gain: 1 }, drive, contextRateHz, response));
  const [isSilentA, isSilentB] = [rmsA < leastRms, rmsB < leastRms];
  if (isSilentA || isSilentB) {
    return { kind: 'silent', which: isSilentA && isSilentB ? 'both' : isSilentA ? 'a' : 'b' };
  }
  const rms = Math.min(rmsA, rmsB);
  return {
    kind: 'matched',
    a: { ...a, gain: rms / rmsA },
    b: { ...b, gain: rms / rmsB },
    turnedDownDb: { a: 20 * Math.log10(rmsA / rms), b: 20 * Math.log10(rmsB / rms) },
  };
}

function heardRms(
  voice: Voice,
  drive: Drive,
  contextRateHz: number,
  response?: (hz: number) => number,
): number {
  if (response === undefined) return rmsOfVoice(voice, drive, contextRateHz);
  let sum = 0;
  for (const { hz, amplitude } of predictedLines(voice, drive, contextRateHz, linesWeighed)) {
    sum += (amplitude * response(hz)) ** 2;
  }
  return Math.sqrt(sum / 2);
}
