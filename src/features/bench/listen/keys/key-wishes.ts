import { z } from 'zod';
import { a4RangeHz, noteNumbers } from '../../../../../shared/listening/index.ts';
import { standardA4Hz } from '../../../../../shared/playback/index.ts';
import { createLive } from '../../../../live/index.ts';

/** Octaves that the lower course can begin with, and how many notes each has. */
export const octaves = { lowest: -1, highest: 9, notes: 12 } as const;

/** Ranges of the fields, in their units. */
export const portamentoMsAtMost = 1_000;

const wishesSchema = z.strictObject({
  a4Hz: z.number().min(a4RangeHz.min).max(a4RangeHz.max),
  octave: z.int().min(octaves.lowest).max(octaves.highest),
  portamentoMs: z.number().min(0).max(portamentoMsAtMost),
  /** By what notes are made; `bench`: as the bench plays the table. */
  by: z.enum(['bench', 'rate', 'timer', 'accumulator']),
  /** Tones as typed. */
  glideFrom: z.string(),
  glideTo: z.string(),
  glideMs: z.number(),
  updateMs: z.number(),
  path: z.enum(['exponential', 'linear']),
});

/** How one plays. It is no part of the wave, so undo leaves it alone. */
export type KeyWishes = z.infer<typeof wishesSchema>;

const atFirst: KeyWishes = {
  a4Hz: standardA4Hz,
  octave: 4,
  portamentoMs: 0,
  by: 'bench',
  glideFrom: 'A4',
  glideTo: 'A5',
  glideMs: 500,
  updateMs: 1,
  path: 'exponential',
};

const storageKey = 'stepwell.listen.keys';

function readKept(): KeyWishes {
  try {
    return wishesSchema.parse(JSON.parse(localStorage.getItem(storageKey) ?? 'null'));
  } catch {
    return atFirst;
  }
}

export const keyWishes = createLive<KeyWishes>(readKept());

export function wish(part: Partial<KeyWishes>): void {
  const next = { ...keyWishes.now(), ...part };
  keyWishes.set(next);
  try {
    localStorage.setItem(storageKey, JSON.stringify(next));
  } catch {
    // It then lasts as long as the page.
  }
}

/** Lowest note of an octave. */
export const firstNoteOf = (octave: number) => octaves.notes * (octave + 1);

/** Notes of so many octaves from one on, as far as there are numbers for them; one list an octave. */
export function coursesFrom(octave: number, count: number): number[][] {
  return Array.from({ length: count }, (_, course) =>
    Array.from({ length: octaves.notes }, (_, step) => firstNoteOf(octave + course) + step).filter(
      (note) => note <= noteNumbers.highest,
    ),
  ).filter((notes) => notes.length > 0);
}
