import { roundOnGrid } from './cycle.ts';
import { roundHzOf } from './drive.ts';
import { PinPlayer } from './pin-player.ts';
import { heardLines, programOf, wayOf, type Program } from './program.ts';
import { RoundReader } from './round-reader.ts';
import type { Drive, ScoreEvent, Voice } from './sound.ts';
import { pinDelayFrames } from './kernel-shape.ts';

/** One voice, frame after frame from its beginning, as a score has it. */
export interface VoiceSource {
  /** Frames by which it lags behind its own clock. */
  readonly delayFrames: number;
  /** Frames from its clock's beginning to its end; endless where it goes round. */
  readonly endFrame: number;
  /** Goes to a place in the round, 0 ≤ phase < 1; a pass stays at its beginning. */
  seek(phase: number): void;
  process(out: Float32Array, from: number, to: number): void;
  /** Another pitch: `toneHz` of a loop, `stepWord` of an accumulator; the rest of the event is not looked at. */
  perform(event: ScoreEvent): void;
}

/** Share of the highest pitch that a grid is made for, down to which it is read: its lines reach 20/24 of what can be. */
const gridServesDownTo = 20 / 24;

/**
 * @param drive the sound's; the voice's own goes before it
 * @throws {RangeError} where a pin's rate cannot be played
 */
export function sourceOf(voice: Voice, drive: Drive, rateHz: number): VoiceSource {
  const own = voice.drive ?? drive;
  switch (wayOf(voice, own, rateHz)) {
    case 'round':
      return roundSource(voice, own, drive, rateHz);
    case 'pin':
      return pinSource(voice, own, drive, rateHz);
    case 'pass':
      return passSource(voice, own, rateHz);
  }
}

function roundSource(voice: Voice, own: Drive, drive: Drive, rateHz: number): VoiceSource {
  const { drive: _none, ...plain } = voice;
  const reader = new RoundReader(rateHz);
  let madeForHz = 0;
  const go = (roundHz: number) => {
    if (roundHz <= madeForHz && roundHz >= gridServesDownTo * madeForHz) return reader.setRoundHz(roundHz);
    const loop: Drive = { kind: 'loop', sampleRateHz: roundHz * voice.values.length };
    reader.load({ ...roundOnGrid(heardLines(plain, loop, rateHz)), roundHz });
    madeForHz = roundHz;
  };
  go(roundHzOf(own, voice.values.length));
  return {
    delayFrames: pinDelayFrames,
    endFrame: Infinity,
    seek: (phase) => reader.seek(phase),
    process: (out, from, to) => reader.process(out, from, to),
    perform({ toneHz, stepWord }) {
      if (own.kind !== 'accumulator') {
        if (toneHz !== undefined) go(toneHz / voice.cycles);
      } else if (stepWord !== undefined) {
        go(roundHzOf({ ...own, stepWord: ownStepWord(own, drive, stepWord) }, voice.values.length));
      }
    },
  };
}

function pinSource(voice: Voice, own: Drive, drive: Drive, rateHz: number): VoiceSource {
  const player = new PinPlayer(rateHz);
  player.load(programOf(voice, drive, rateHz) as Extract<Program, { kind: 'pin' }>);
  const length = voice.values.length;
  return {
    delayFrames: pinDelayFrames,
    endFrame: own.kind === 'once' ? (length / own.sampleRateHz) * rateHz : Infinity,
    seek(phase) {
      if (own.kind !== 'once') player.seek(phase);
    },
    process: (out, from, to) => player.process(out, from, to),
    perform({ toneHz, stepWord }) {
      if (own.kind === 'accumulator') {
        if (stepWord !== undefined) player.setStepWord(ownStepWord(own, drive, stepWord));
      } else if (own.kind === 'loop' && toneHz !== undefined) {
        player.setSampleRate((toneHz / voice.cycles) * length);
      }
    },
  };
}

function passSource(voice: Voice, own: Drive, rateHz: number): VoiceSource {
  const { frames, firstEntryFrame } = programOf(voice, own, rateHz) as Extract<Program, { kind: 'pass' }>;
  let next = 0;
  return {
    delayFrames: firstEntryFrame,
    endFrame: (voice.values.length / own.sampleRateHz) * rateHz,
    seek: () => undefined,
    process(out, from, to) {
      for (let i = from; i < to; i += 1, next += 1) out[i] = next < frames.length ? frames[next] : 0;
    },
    perform: () => undefined,
  };
}

/** A score's step words are the sound's: those of a voice that is driven otherwise stand to them as its own does. */
function ownStepWord(own: Drive & { kind: 'accumulator' }, drive: Drive, scored: number): number {
  if (own === drive || drive.kind !== 'accumulator') return scored;
  const most = 2 ** own.accumulatorBits - 1;
  return Math.min(most, Math.max(1, Math.round((scored * own.stepWord) / drive.stepWord)));
}
