import {
  pinRateHzAtMost,
  roundHzOf,
  type Drive,
  type Sound,
  type Voice,
} from '../../shared/listening/index.ts';

/** The longest pass that is played, in seconds: 60 s at 48 kHz are 12 MB. */
export const longestPassSeconds = 60;

/** Why a sound cannot be played, in words for the screen; `null` where it can. */
export function whyUnplayable({ voices, drive }: Sound, contextRateHz: number): string | null {
  for (const voice of Object.values(voices)) {
    const why = whyVoiceUnplayable(voice, voice.drive ?? drive, contextRateHz);
    if (why !== null) return why;
  }
  return null;
}

function whyVoiceUnplayable({ values, form }: Voice, drive: Drive, contextRateHz: number): string | null {
  const { sampleRateHz } = drive;
  if (!(sampleRateHz > 0 && Number.isFinite(sampleRateHz))) {
    return 'The sample rate must be a number of hertz above 0.';
  }
  if (form === 'staircase' && drive.kind !== 'loop' && sampleRateHz > pinRateHzAtMost) {
    const what = drive.kind === 'once' ? 'A pass' : 'An accumulator';
    return `${what} is played entry by entry, at a sample rate of up to ${pinRateHzAtMost / 1e6} MHz.`;
  }
  if (drive.kind === 'once') {
    const seconds = values.length / sampleRateHz;
    if (seconds <= longestPassSeconds) return null;
    return `One pass would last ${Math.round(seconds)} s; passes of up to ${longestPassSeconds} s are played.`;
  }
  if (drive.kind === 'accumulator') {
    const why = whyNotAccumulated(values.length, drive);
    if (why !== null) return why;
  }
  if (2 * roundHzOf(drive, values.length) >= contextRateHz) {
    return `Nothing of this wave lies below ${contextRateHz / 2000} kHz, half of the rate at which this browser plays.`;
  }
  return null;
}

function whyNotAccumulated(length: number, drive: Drive & { kind: 'accumulator' }): string | null {
  const { accumulatorBits, stepWord } = drive;
  if (!Number.isInteger(Math.log2(length)) || length > 2 ** accumulatorBits) {
    return `A phase accumulator of ${accumulatorBits} bits plays tables of 2, 4, 8 … 2^${accumulatorBits} entries; this one has ${length}.`;
  }
  const highest = 2 ** accumulatorBits - 1;
  if (Number.isInteger(stepWord) && stepWord >= 1 && stepWord <= highest) return null;
  return `The step word must be a whole number from 1 to ${highest}.`;
}
