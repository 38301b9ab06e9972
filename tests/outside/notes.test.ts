import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import {
  glideHzAt,
  noteHz,
  noteName,
  planGlide,
  planTone,
  type ToneDrive,
} from '../../shared/listening/index.ts';
import { centsBetween } from '../../shared/playback/index.ts';
import { askPython } from './numpy/python.ts';

// Sources: ISO 16:1975, A4 = 440 Hz; MIDI 1.0 Detailed Specification (MIDI Manufacturers Association), note numbers.
// Equal temperament, 2^(n/12) a semitone: common practice, no source.
const tunings = [440, 415, 442.5];
const accumulators = [
  { accumulatorBits: 16, sampleRateHz: 31_250, a4: 440 },
  { accumulatorBits: 24, sampleRateHz: 32_000, a4: 442.5 },
  { accumulatorBits: 32, sampleRateHz: 44_100, a4: 440 },
];
const timers = [
  { clockHz: 16_000_000, prescaler: 1, compareBits: 16, tableLength: 64, a4: 440 },
  { clockHz: 8_000_000, prescaler: 8, compareBits: 8, tableLength: 32, a4: 415 },
];
const glides = [
  { accumulatorBits: 16, sampleRateHz: 31_250, fromHz: 220, toHz: 1760, updates: 500, path: 'exponential' },
  { accumulatorBits: 16, sampleRateHz: 31_250, fromHz: 2000, toHz: 80, updates: 1000, path: 'linear' },
  { accumulatorBits: 24, sampleRateHz: 8_000, fromHz: 500, toHz: 499, updates: 2000, path: 'exponential' },
] as const;

const answer = askPython<{
  notes: [string, number][][];
  stepWords: [number, number | null][][];
  compares: [number, number][][];
  glides: { words: number[]; sure: boolean[] }[];
}>('notes.py', { tunings, stepWords: accumulators, compares: timers, glides });

/** What a drive makes of each note; `null` where it refuses. */
function tonesOf(drive: ToneDrive, a4: number) {
  return Array.from({ length: 128 }, (_, note) => {
    try {
      return planTone(drive, noteHz(note, a4));
    } catch (error) {
      if (error instanceof Refusal) return null;
      throw error;
    }
  });
}

describe('the 128 notes', () => {
  it.each(tunings.map((a4, i) => [a4, i] as const))('with A4 at %d Hz are those of fifty digits', (a4, i) => {
    expect(answer.notes[i]).toHaveLength(128);
    answer.notes[i].forEach(([name, hz], note) => {
      expect(noteName(note)).toBe(name);
      expect(Math.abs(centsBetween(noteHz(note, a4), hz))).toBeLessThan(1e-9);
    });
  });

  it('are those of printed tables (remembered values)', () => {
    for (const [note, hz] of [
      [0, 8.18],
      [21, 27.5],
      [40, 82.41],
      [60, 261.63],
      [72, 523.25],
      [108, 4186.01],
      [127, 12543.85],
    ])
      // prettier-ignore
      expect(noteHz(note)).toBeCloseTo(hz, 2);
  });
});

describe('what registers make of them', () => {
  it.each(accumulators.map((given, i) => [given.accumulatorBits, i] as const))(
    'step words of %i bits are the nearest by exact arithmetic (case %i)',
    (_bits, i) => {
      const { a4, ...given } = accumulators[i];
      let played = 0;
      tonesOf({ kind: 'accumulator', cycles: 1, ...given }, a4).forEach((tone, note) => {
        const [word, cents] = answer.stepWords[i][note];
        if (word === 0 || 2 * noteHz(note, a4) >= given.sampleRateHz) return expect(tone).toBeNull();
        played += 1;
        expect(tone?.word).toBe(word);
        expect(tone?.errorCents).toBeCloseTo(cents ?? Number.NaN, 6);
      });
      expect(played).toBe(128);
    },
  );

  it.each(timers.map((given, i) => [given.compareBits, i] as const))(
    'compare values of %i bits are the best of all (case %i)',
    (_bits, i) => {
      const { a4, ...given } = timers[i];
      let played = 0;
      tonesOf({ kind: 'timer', cycles: 1, ...given }, a4).forEach((tone, note) => {
        const [compare, cents] = answer.compares[i][note];
        // Beyond the register's end the error is more than half of its last step.
        if (tone === null) return expect(Math.abs(cents)).toBeGreaterThan(3);
        played += 1;
        expect(tone.word).toBe(compare);
        expect(tone.errorCents).toBeCloseTo(cents, 6);
      });
      expect(played).toBeGreaterThan(60);
    },
  );
});

describe('glides', () => {
  it.each(glides.map((given, i) => [given.path, given.fromHz, given.toHz, i] as const))(
    '%s from %d Hz to %d Hz go by the step words that NumPy finds (case %i)',
    (_path, _from, _to, i) => {
      const { accumulatorBits, sampleRateHz, updates, ...given } = glides[i];
      const drive: ToneDrive = { kind: 'accumulator', cycles: 1, accumulatorBits, sampleRateHz };
      const updateSeconds = 1 / 1024;
      const { steps } = planGlide(drive, { ...given, seconds: updates * updateSeconds, updateSeconds });
      const { words, sure } = answer.glides[i];
      expect(sure.filter((isSure) => !isSure).length).toBeLessThan(3);
      words.forEach((word, k) => {
        if (!sure[k]) return;
        const hz = glideHzAt(steps, (k + 0.5) * updateSeconds);
        expect(Math.round((hz * 2 ** accumulatorBits) / sampleRateHz)).toBe(word);
      });
      expect(steps).toHaveLength(new Set(words).size);
    },
  );
});
