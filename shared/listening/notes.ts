import { Refusal, showValue } from '../contract/index.ts';
import { centsBetween, pitchAt, pitchHz, standardA4Hz } from '../playback/index.ts';

/**
 * Note numbers of the MIDI 1.0 Detailed Specification (MIDI Manufacturers Association): 0…127, 60 is middle C and so 69
 * the A above it. That middle C is called C4 is common practice, no source.
 */
export const noteNumbers = { lowest: 0, highest: 127, a4: 69 } as const;

/** Tunings that are taken, in Hz; 440 is the standard one (ISO 16:1975). */
export const a4RangeHz = { min: 400, max: 480 } as const;

/** C0 is note 12. */
const c0 = 12;

/** Frequency of a note in equal temperament, in Hz. @throws {Refusal} where it is no note number or no tuning. */
export function noteHz(note: number, a4Hz: number = standardA4Hz): number {
  mustBeNote(note);
  mustBeTuning(a4Hz);
  return pitchAt(note - c0, a4Hz).hz;
}

/** Its name, with sharps: `A4` for 69, `C-1` for 0. @throws {Refusal} where it is no note number. */
export function noteName(note: number): string {
  mustBeNote(note);
  return pitchAt(note - c0).name;
}

/**
 * The note number of a pitch's name, as `pitchHz` reads it.
 *
 * @throws {Refusal} where it names no pitch, or one beyond 0…127.
 */
export function noteNumber(name: string): number {
  const note = noteNumbers.a4 + Math.round(centsBetween(pitchHz(name), standardA4Hz) / 100);
  if (note < noteNumbers.lowest || note > noteNumbers.highest) {
    throw new Refusal({ path: 'pitch', value: showValue(name), allowed: 'a pitch from C-1 to G9' });
  }
  return note;
}

/** A frequency bent by semitones, 2^(1/12) each; any number of them, up or down. */
export function bentHz(hz: number, semitones: number): number {
  return hz * 2 ** (semitones / 12);
}

function mustBeNote(note: number): void {
  if (Number.isInteger(note) && note >= noteNumbers.lowest && note <= noteNumbers.highest) return;
  throw new Refusal({ path: 'note', value: showValue(note), allowed: 'a whole number from 0 to 127' });
}

function mustBeTuning(a4Hz: number): void {
  if (a4Hz >= a4RangeHz.min && a4Hz <= a4RangeHz.max) return;
  throw new Refusal({
    path: 'a4Hz',
    value: showValue(a4Hz),
    allowed: `${a4RangeHz.min} to ${a4RangeHz.max} Hz`,
  });
}
