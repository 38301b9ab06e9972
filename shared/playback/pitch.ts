import { Refusal, showValue } from '../contract/index.ts';

/** Standard tuning frequency: the A above middle C is 440 Hz (ISO 16:1975). */
export const standardA4Hz = 440;

/** 2^(n/12), n = 0…11, equal temperament (common practice, no source); written out, as powers differ in last bits. */
const semitones = [
  1, 1.0594630943592953, 1.122462048309373, 1.189207115002721, 1.2599210498948732, 1.3348398541700344,
  1.4142135623730951, 1.4983070768766815, 1.5874010519681994, 1.681792830507429, 1.7817974362806785,
  1.8877486253633868,
] as const;

const names = ['C', 'C#', 'D', 'D#', 'E', 'F', 'F#', 'G', 'G#', 'A', 'A#', 'B'] as const;
const naturals: Readonly<Record<string, number>> = { C: 0, D: 2, E: 4, F: 5, G: 7, A: 9, B: 11 };
const accidentals: Readonly<Record<string, number>> = { '': 0, '#': 1, '♯': 1, b: -1, '♭': -1 };

/** Semitones of A4 above C0, octaves counted from C (common practice, no source). */
const a4Index = 57;

/**
 * Frequency of a pitch in equal temperament, in Hz.
 *
 * @param name a letter A–G, a sharp or flat where there is one, and the octave −1…10: `A4`, `C#5`, `B♭2`
 * @throws {Refusal} where it names no pitch.
 */
export function pitchHz(name: string, a4Hz = standardA4Hz): number {
  const parts = /^\s*([A-Ga-g])([#♯b♭]?)(-1|\u22121|\d|10)\s*$/u.exec(name);
  if (parts === null) {
    throw new Refusal({
      path: 'pitch',
      value: showValue(name),
      allowed: 'a letter A to G, # or b where there is one, and an octave from -1 to 10, as C#5',
    });
  }
  const [, letter, accidental, octaveText] = parts;
  const octave = Number(octaveText.replace('\u2212', '-'));
  return indexHz(12 * octave + naturals[letter.toUpperCase()] + accidentals[accidental], a4Hz);
}

function indexHz(index: number, a4Hz: number): number {
  const steps = index - a4Index;
  const octaves = Math.floor(steps / 12);
  return a4Hz * semitones[steps - 12 * octaves] * 2 ** octaves;
}

export interface NearestPitch {
  /** With sharps: `C#5`. */
  readonly name: string;
  readonly hz: number;
  /** How far the frequency lies above the pitch, −50…50. */
  readonly cents: number;
}

/** The pitch of equal temperament nearest to a frequency above 0. */
export function nearestPitch(hz: number, a4Hz = standardA4Hz): NearestPitch {
  const pitch = pitchAt(a4Index + Math.round(12 * Math.log2(hz / a4Hz)), a4Hz);
  return { ...pitch, cents: centsBetween(hz, pitch.hz) };
}

/** The pitch of equal temperament that lies some whole number of semitones above C0, with its name in sharps. */
export function pitchAt(index: number, a4Hz = standardA4Hz): { readonly name: string; readonly hz: number } {
  const octave = Math.floor(index / 12);
  return { name: `${names[index - 12 * octave]}${octave}`, hz: indexHz(index, a4Hz) };
}

/** `1200·log2(f/f_wanted)`: how far one frequency lies above another. */
export function centsBetween(hz: number, wantedHz: number): number {
  return 1200 * Math.log2(hz / wantedHz);
}

/**
 * How far two frequencies lie apart, as a ratio ≥ 1: in the same order as the cents between them, and, made by one
 * division, the same on every machine.
 */
export function ratioApart(hz: number, wantedHz: number): number {
  return hz > wantedHz ? hz / wantedHz : wantedHz / hz;
}
