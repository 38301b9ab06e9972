import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../shared/contract/index.ts';
import {
  bentHz,
  createMidiReader,
  noteHz,
  noteName,
  noteNumber,
  planTone,
  pressNote,
  releaseNote,
  releaseNotesOf,
  soundingNote,
  toneReachHz,
  type HeldNotes,
  type ToneDrive,
} from '../../shared/listening/index.ts';
import { centsBetween, planRates, planStepWord } from '../../shared/playback/index.ts';
import { problemsOf } from './support/refusals.ts';
import { holds } from './support/seeded.ts';

const allNotes = Array.from({ length: 128 }, (_, note) => note);

describe('notes', () => {
  it('69 is A4 at 440 Hz (ISO 16:1975), 60 middle C, and octaves are exact doubles', () => {
    expect(noteHz(69)).toBe(440);
    expect(noteName(69)).toBe('A4');
    expect(noteName(60)).toBe('C4');
    expect(noteName(0)).toBe('C-1');
    expect(noteName(127)).toBe('G9');
    for (const note of allNotes.slice(12)) expect(noteHz(note)).toBe(2 * noteHz(note - 12));
  });

  it('each of the 128 comes back by its name', () => {
    for (const note of allNotes) expect(noteNumber(noteName(note))).toBe(note);
    expect(noteNumber('B♭3')).toBe(58);
    expect(noteNumber('Cb4')).toBe(59);
  });

  it('follow the tuning, and bend by semitones', () => {
    for (const note of allNotes) {
      expect(centsBetween(noteHz(note, 415), noteHz(note))).toBeCloseTo(1200 * Math.log2(415 / 440), 9);
    }
    expect(bentHz(440, 12)).toBe(880);
    expect(centsBetween(bentHz(440, -0.5), 440)).toBeCloseTo(-50, 9);
  });

  it.each([-1, 128, 60.5, Number.NaN])('note %s is refused with what is allowed', (note) => {
    expect(problemsOf(() => noteHz(note))).toEqual([
      { path: 'note', value: String(note), allowed: 'a whole number from 0 to 127' },
    ]);
  });

  it('tunings and names out of range are refused', () => {
    expect(problemsOf(() => noteHz(69, 399.9))).toMatchObject([{ path: 'a4Hz', allowed: '400 to 480 Hz' }]);
    expect(problemsOf(() => noteHz(69, 480.1))).toMatchObject([{ path: 'a4Hz', value: '480.1' }]);
    expect(problemsOf(() => noteNumber('A9'))).toMatchObject([
      { value: '"A9"', allowed: 'a pitch from C-1 to G9' },
    ]);
    expect(() => noteNumber('H4')).toThrow(Refusal);
  });
});

describe('what a part makes of a tone', () => {
  const drives = {
    timer: (prescaler: number, compareBits: number, tableLength: number, cycles: number): ToneDrive => ({
      kind: 'timer',
      clockHz: 16e6,
      prescaler,
      compareBits,
      tableLength,
      cycles,
    }),
    accumulator: (accumulatorBits: number, sampleRateHz: number, cycles = 1): ToneDrive => ({
      kind: 'accumulator',
      accumulatorBits,
      sampleRateHz,
      cycles,
    }),
  };
  const someHz = fc.double({ min: Math.log(8), max: Math.log(13_000), noNaN: true }).map(Math.exp);

  it('a free rate is exact', () => {
    holds(
      fc.property(someHz, fc.integer({ min: 2, max: 4096 }), (hz, tableLength) => {
        const tone = planTone({ kind: 'rate', tableLength, cycles: 1 }, hz);
        expect(tone).toMatchObject({ playedHz: hz, errorCents: 0, word: null, setting: { toneHz: hz } });
        expect(tone.sampleRateHz).toBe(hz * tableLength);
      }),
    );
  });

  it('a timer takes the compare value that the rate plans find, and refuses what its register does not reach', () => {
    let reached = 0;
    holds(
      fc.property(
        someHz,
        fc.constantFrom(1, 8, 64),
        fc.constantFrom(8, 16),
        fc.constantFrom([32, 1], [100, 3], [256, 1], [1000, 7]),
        (hz, prescaler, compareBits, [tableLength, cycles]) => {
          const drive = drives.timer(prescaler, compareBits, tableLength, cycles);
          const [plan] = planRates(
            { clockHz: 16e6, prescalers: [prescaler], compareBits },
            { wantedHz: hz, lengths: [tableLength], cycles: [cycles], limit: 1 },
          );
          const [lowest, highest] = toneReachHz(drive);
          if (hz < lowest || hz >= highest) {
            expect(problemsOf(() => planTone(drive, hz))).toMatchObject([{ path: 'wantedHz' }]);
            return;
          }
          reached += 1;
          expect(planTone(drive, hz)).toEqual({
            wantedHz: hz,
            playedHz: plan.actualHz,
            errorCents: plan.errorCents,
            word: plan.compare,
            sampleRateHz: expect.closeTo(plan.sampleRateHz, 6),
            setting: { toneHz: plan.actualHz },
          });
        },
      ),
      400,
    );
    expect(reached).toBeGreaterThan(100);
  });

  it('an accumulator takes the step word that is planned for it', () => {
    holds(
      fc.property(
        someHz,
        fc.integer({ min: 10, max: 48 }),
        fc.constantFrom(8_000, 31_250, 48_000),
        (hz, bits, fs) => {
          const drive = drives.accumulator(bits, fs);
          const [lowest, highest] = toneReachHz(drive);
          if (hz < lowest || hz >= highest) {
            expect(() => planTone(drive, hz)).toThrow(Refusal);
            return;
          }
          const { stepWord, actualHz, errorCents } = planStepWord(
            { accumulatorBits: bits, sampleRateHz: fs },
            hz,
          );
          const tone = planTone(drive, hz);
          expect(tone).toMatchObject({ word: stepWord, setting: { stepWord }, sampleRateHz: fs });
          expect(tone.playedHz).toBeCloseTo(actualHz, 9);
          expect(tone.errorCents).toBeCloseTo(errorCents, 6);
        },
      ),
      300,
    );
  });

  it('of several cycles in the table the step word turns the table as much slower', () => {
    const tone = planTone(drives.accumulator(24, 32_000, 4), 440);
    expect(tone.word).toBe(Math.round((110 * 2 ** 24) / 32_000));
    expect(tone.playedHz).toBe((4 * (tone.word ?? 0) * 32_000) / 2 ** 24);
    expect(() => planTone(drives.accumulator(24, 32_000, 4), 16_000)).toThrow(Refusal);
  });

  it('every tone within reach is off by no more than half a step of its register', () => {
    const drive = drives.accumulator(16, 31_250);
    for (const note of allNotes) {
      const { playedHz, wantedHz } = planTone(drive, noteHz(note));
      expect(Math.abs(playedHz - wantedHz)).toBeLessThanOrEqual(31_250 / 65_536 / 2);
    }
  });
});

describe('held notes', () => {
  it('the last pressed sounds, and letting go brings back the last that is still held', () => {
    let held: HeldNotes = [];
    held = pressNote(held, 'a', 60);
    held = pressNote(held, 'b', 64);
    held = pressNote(held, 'c', 67);
    expect(soundingNote(held)).toBe(67);
    held = releaseNote(held, 'b');
    expect(soundingNote(held)).toBe(67);
    held = releaseNote(held, 'c');
    expect(soundingNote(held)).toBe(60);
    held = releaseNote(held, 'a');
    expect(soundingNote(held)).toBeNull();
  });

  it('a holder that goes over to another note holds that one alone', () => {
    let held = pressNote([], 'pointer 1', 60);
    held = pressNote(held, 'key', 72);
    held = pressNote(held, 'pointer 1', 61);
    expect(soundingNote(held)).toBe(61);
    expect(soundingNote(releaseNote(held, 'pointer 1'))).toBe(72);
  });

  it('one input lets go of its own', () => {
    let held = pressNote([], 'midi 1 0 60', 60);
    held = pressNote(held, 'key', 62);
    held = pressNote(held, 'midi 1 0 64', 64);
    expect(releaseNotesOf(held, 'midi 1 ')).toEqual([{ holder: 'key', note: 62 }]);
    expect(releaseNotesOf(held, 'midi 2 ')).toBe(held);
  });
});

// Source: MIDI 1.0 Detailed Specification, document version 4.2 (MIDI Manufacturers Association).
describe('MIDI messages', () => {
  const read = (...bytes: number[]) => createMidiReader()(bytes);
  const on = (note: number, velocity = 100, channel = 0) => ({ kind: 'on', channel, note, velocity });
  const off = (note: number, channel = 0) => ({ kind: 'off', channel, note });

  it('note on and off, with their channels', () => {
    expect(read(0x90, 69, 100)).toEqual([on(69)]);
    expect(read(0x9f, 0, 1, 0x8f, 0, 64)).toEqual([on(0, 1, 15), off(0, 15)]);
  });

  it('note on with velocity 0 is note off', () => {
    expect(read(0x93, 60, 0)).toEqual([off(60, 3)]);
  });

  it('running status: a status holds until the next', () => {
    expect(read(0x90, 60, 100, 64, 100, 60, 0, 64, 0)).toEqual([on(60), on(64), off(60), off(64)]);
    expect(read(0x90, 60, 100, 0xe0, 0, 64, 0, 64)).toHaveLength(3);
  });

  it('real-time bytes may stand anywhere and end no running status', () => {
    expect(read(0x90, 0xf8, 60, 0xfe, 100, 0xfa, 64, 0xf8, 100)).toEqual([on(60), on(64)]);
  });

  it('system messages end it, and their data is passed over', () => {
    expect(read(0x90, 60, 100, 0xf0, 0x7d, 60, 100, 0xf7, 61, 100, 0x90, 62, 100)).toEqual([on(60), on(62)]);
    expect(read(0x90, 60, 100, 0xf2, 1, 2, 61, 100)).toEqual([on(60)]);
  });

  it('messages of one data byte and others that concern no note are passed over', () => {
    expect(read(0xc0, 5, 6, 0xd0, 90, 0xa0, 60, 33, 0xb0, 7, 100, 0x90, 60, 1)).toEqual([on(60, 1)]);
  });

  it('pitch bend is 14 bits about 8192 and reaches both ends', () => {
    const bend = (low: number, high: number) => read(0xe0, low, high)[0];
    expect(bend(0, 64)).toEqual({ kind: 'bend', channel: 0, bend: 0 });
    expect(bend(0, 0)).toMatchObject({ bend: -1 });
    expect(bend(127, 127)).toMatchObject({ bend: 1 });
    expect(bend(0, 96)).toMatchObject({ bend: 4096 / 8191 });
    expect(read(0xb2, 121, 0)).toEqual([{ kind: 'bend', channel: 2, bend: 0 }]);
  });

  it('all sound off, all notes off, changes of mode and a reset let all go', () => {
    for (const controller of [120, 123, 124, 127]) {
      expect(read(0xb1, controller, 0)).toEqual([{ kind: 'all-off', channel: 1 }]);
    }
    expect(read(0x90, 60, 100, 0xff, 61, 100)).toEqual([on(60), { kind: 'all-off', channel: null }]);
  });

  it('a message may come in parts, and one that is cut off by a status is none', () => {
    const reader = createMidiReader();
    expect(reader([0x90, 60])).toEqual([]);
    expect(reader([100])).toEqual([on(60)]);
    expect(reader([61, 0x80, 60])).toEqual([]);
    expect(reader([0])).toEqual([off(60)]);
  });

  it('garbage gives nothing but events within their ranges', () => {
    expect(read(60, 100, 3)).toEqual([]);
    const bytes = fc.array(fc.integer({ min: 0, max: 255 }), { maxLength: 60 });
    holds(
      fc.property(bytes, (some) => {
        for (const event of read(...some)) {
          if (event.channel !== null) expect(event.channel & 0x0f).toBe(event.channel);
          if (event.kind === 'bend') expect(Math.abs(event.bend)).toBeLessThanOrEqual(1);
          if (event.kind === 'on') expect(event.velocity & 0x7f).toBeGreaterThan(0);
          if ('note' in event) expect(event.note & 0x7f).toBe(event.note);
        }
        // However it is cut into parts.
        const reader = createMidiReader();
        expect(some.flatMap((byte) => reader([byte]))).toEqual(read(...some));
      }),
      300,
    );
  });
});
