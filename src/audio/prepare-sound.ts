import {
  gridSizeFor,
  heardLines,
  highestBelow,
  pinRateHzAtMost,
  programOf,
  roundHzOf,
  roundOnGrid,
  wayOf,
  type Drive,
  type Score,
  type Sound,
  type Voice,
} from '../../shared/listening/index.ts';
import type { Pitch, PitchGrid, SoundProgram, VoicePart } from './player-messages.ts';

/** Highest line of a grid for a pitch far below the drive's own: its images end there. */
const mostLines = 8_192;
/** Pitches for which grids are made beforehand; between two of many more, the next higher serves. */
const mostPitches = 64;

/** Makes a sound ready for the audio thread: grids for its drive's pitch and those of a score, kernels, passes. */
export function prepareSound(sound: Sound, score: Score | null, contextRateHz: number): SoundProgram {
  const voices: Record<string, VoicePart> = {};
  for (const [name, voice] of Object.entries(sound.voices)) {
    voices[name] = { ...prepareVoice(voice, sound.drive, score, contextRateHz), cycles: voice.cycles };
  }
  const { drive } = sound;
  if (drive.kind !== 'once') return { voices };
  const seconds = Object.values(sound.voices).map(
    (voice) => voice.values.length / (voice.drive ?? drive).sampleRateHz,
  );
  return { voices, passSeconds: Math.max(...seconds) };
}

function prepareVoice(voice: Voice, drive: Drive, score: Score | null, contextRateHz: number) {
  const own = voice.drive ?? drive;
  const pitch = pitchOf(voice, own, drive);
  if (isRound(voice, own, pitch, score, contextRateHz)) {
    const scored = pitchesOf(pitch, score);
    const pitches = [roundHzOf(own, voice.values.length), ...scored];
    return { kind: 'round', pitch, grids: gridsOf(voice, pitches, contextRateHz) } as const;
  }
  const program = programOf(voice, own, contextRateHz);
  if (program.kind === 'pass') return { kind: 'pass', pass: program } as const;
  if (program.kind !== 'pin') throw new Error('A round is made of grids.');
  return { kind: 'pin', pitch, pin: program } as const;
}

/**
 * Grids of a score's pitches alone, by the names of the voices that need them.
 *
 * @returns `null` where a voice would have to be played in another way, so that the sound is to be prepared anew
 */
export function prepareGrids(
  sound: Sound,
  score: Score,
  contextRateHz: number,
): Record<string, PitchGrid[]> | null {
  const grids: Record<string, PitchGrid[]> = {};
  for (const [name, voice] of Object.entries(sound.voices)) {
    const own = voice.drive ?? sound.drive;
    const pitch = pitchOf(voice, own, sound.drive);
    if (isRound(voice, own, pitch, null, contextRateHz)) {
      grids[name] = gridsOf(voice, pitchesOf(pitch, score), contextRateHz);
    } else if (isRound(voice, own, pitch, score, contextRateHz)) return null;
  }
  return grids;
}

/** Points and entries that making it ready has to go through, some 0.1 µs each. */
export function workOf(sound: Sound, score: Score | null, contextRateHz: number): number {
  let work = 0;
  for (const voice of Object.values(sound.voices)) {
    const own = voice.drive ?? sound.drive;
    const { length } = voice.values;
    const pitch = pitchOf(voice, own, sound.drive);
    work += length;
    if (isRound(voice, own, pitch, score, contextRateHz)) {
      for (const hz of [roundHzOf(own, length), ...pitchesOf(pitch, score)]) {
        work += length + gridSizeFor(linesAt(voice, hz, contextRateHz));
      }
    } else if (voice.form === 'curve') {
      // 64 entries to each frame, or more frames to each entry.
      work += 10 * Math.max(length, (length / own.sampleRateHz) * contextRateHz);
    }
  }
  return work;
}

function pitchOf(voice: Voice, own: Drive, drive: Drive): Pitch {
  if (own.kind !== 'accumulator') {
    return { by: 'tone', loopHz: roundHzOf(own, voice.values.length), cycles: voice.cycles };
  }
  return {
    by: 'stepWord',
    stepWord: own.stepWord,
    highestWord: 2 ** own.accumulatorBits - 1,
    perScored: drive.kind === 'accumulator' ? own.stepWord / drive.stepWord : 1,
    hzPerStep: own.sampleRateHz / 2 ** own.accumulatorBits,
  };
}

/** Whether it is read from grids. A loop too long for that still is, where a score has it go faster than a pin can. */
function isRound(
  voice: Voice,
  own: Drive,
  pitch: Pitch,
  score: Score | null,
  contextRateHz: number,
): boolean {
  if (wayOf(voice, own, contextRateHz) === 'round') return true;
  if (own.kind !== 'loop') return false;
  return pitchesOf(pitch, score).some((hz) => hz * voice.values.length > pinRateHzAtMost);
}

/** Rounds a second that a score asks for, each once. */
function pitchesOf(pitch: Pitch, score: Score | null): number[] {
  const pitches = new Set<number>();
  for (const { toneHz, stepWord } of score?.events ?? []) {
    if (pitch.by === 'tone' && toneHz !== undefined) pitches.add(toneHz / pitch.cycles);
    if (pitch.by === 'stepWord' && stepWord !== undefined) {
      pitches.add(Math.max(1, Math.round(stepWord * pitch.perScored)) * pitch.hzPerStep);
    }
  }
  return thinned([...pitches].sort((a, b) => a - b));
}

/** Of very many pitches some at even distances, the highest among them. */
function thinned(rising: number[]): number[] {
  if (rising.length <= mostPitches) return rising;
  return Array.from(
    { length: mostPitches },
    (_, k) => rising[Math.round(((k + 1) * rising.length) / mostPitches) - 1],
  );
}

const linesAt = ({ form, values }: Voice, hz: number, contextRateHz: number) =>
  Math.min(
    highestBelow(contextRateHz, hz),
    mostLines,
    form === 'curve' ? Math.floor(values.length / 2) : Infinity,
  );

function gridsOf(voice: Voice, pitches: readonly number[], contextRateHz: number): PitchGrid[] {
  const grids: PitchGrid[] = [];
  const made = new Set<number>();
  for (const hz of pitches) {
    const highest = linesAt(voice, hz, contextRateHz);
    // With nothing behind the converter, a grid serves all pitches that its lines fit.
    const upToHz = voice.stage === undefined ? contextRateHz / 2 / Math.max(1, highest) : hz;
    if (made.has(upToHz)) continue;
    made.add(upToHz);
    const lines = heardLines(voice, loopAt(hz, voice.values.length), contextRateHz, highest);
    grids.push({ ...roundOnGrid(lines), upToHz });
  }
  return grids;
}

/** A loop's pitch whatever drives it: lines depend on that alone. */
function loopAt(loopHz: number, tableLength: number): Drive {
  return { kind: 'loop', sampleRateHz: loopHz * tableLength };
}
