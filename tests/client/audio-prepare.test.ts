import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Drive, Score, Sound, Voice } from '../../shared/listening/index.ts';
import { tableSound } from '../../src/audio/index.ts';
import type { SoundProgram } from '../../src/audio/player-messages.ts';
import { sampleRateOfTone, toneOfSampleRate } from '../../src/audio/playback-rate.ts';
import { Preparer } from '../../src/audio/preparer.ts';
import { prepareGrids, prepareSound, workOf } from '../../src/audio/prepare-sound.ts';
import { whyUnplayable } from '../../src/audio/why-unplayable.ts';

const table = (length: number): Voice => ({
  values: Float64Array.from({ length }, (_, k) => ((k * 7) % length) / length - 0.5),
  cycles: 1,
  form: 'staircase',
});
const sound = (voice: Voice, drive: Drive): Sound => ({ voices: { it: voice }, drive });

describe('tone and sample rate', () => {
  test('the tone of a loop is K·fs/N and each gives back the other', () => {
    expect(toneOfSampleRate(32_000, { tableLength: 256, tableCycles: 1 })).toBe(125);
    expect(toneOfSampleRate(8_000, { tableLength: 100, tableCycles: 3 })).toBe(240);
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 1e5, noNaN: true }),
        fc.integer({ min: 2, max: 65_536 }),
        fc.integer({ min: 1, max: 64 }),
        (toneHz, tableLength, tableCycles) => {
          const shape = { tableLength, tableCycles };
          expect(toneOfSampleRate(sampleRateOfTone(toneHz, shape), shape) / toneHz).toBeCloseTo(1, 12);
        },
      ),
    );
  });
});

test('the plain sound of a unipolar table swings as wide as a bipolar one’s', () => {
  const drive: Drive = { kind: 'loop', sampleRateHz: 8_000 };
  const values = Float64Array.of(0, 0.5, 1, 0.5);
  const { voices } = tableSound({ cycle: values, values, range: 'unipolar', tableCycles: 1, drive });
  expect([...voices.table.values]).toEqual([0, 1, 2, 1]);
  expect(
    tableSound({ cycle: values, values, range: 'bipolar', tableCycles: 1, drive }).voices.ideal.values,
  ).toBe(values);
});

describe('what cannot be played', () => {
  const why = (length: number, drive: Drive, form: Voice['form'] = 'staircase') =>
    whyUnplayable(sound({ ...table(length), form }, drive), 48_000);

  test('is said with what is allowed', () => {
    expect(why(256, { kind: 'loop', sampleRateHz: NaN })).toMatch(/above 0/);
    expect(why(2, { kind: 'loop', sampleRateHz: 48_000 })).toMatch(/below 24 kHz/);
    expect(why(256, { kind: 'once', sampleRateHz: 1 })).toBe(
      'One pass would last 256 s; passes of up to 60 s are played.',
    );
    expect(why(65_536, { kind: 'once', sampleRateHz: 4.1e6 })).toMatch(/A pass .* up to 4 MHz/);
    const accumulator = {
      kind: 'accumulator',
      sampleRateHz: 62_500,
      accumulatorBits: 16,
      stepWord: 100,
    } as const;
    expect(why(256, accumulator)).toBeNull();
    expect(why(256, { ...accumulator, sampleRateHz: 5e6 })).toMatch(/An accumulator .* up to 4 MHz/);
    expect(why(100, accumulator)).toMatch(/16 bits .* has 100/);
    expect(why(256, { ...accumulator, stepWord: 65_536 })).toMatch(/1 to 65535/);
    expect(why(256, { ...accumulator, stepWord: 1.5 })).toMatch(/whole number/);
  });

  test('a loop may last as long as it likes and go as fast as anything of it is heard', () => {
    expect(why(65_536, { kind: 'loop', sampleRateHz: 0.1 })).toBeNull();
    expect(why(65_536, { kind: 'loop', sampleRateHz: 100e6 })).toBeNull();
  });
});

describe('made ready', () => {
  test('common sounds at once, long ones in a worker', () => {
    const loop: Drive = { kind: 'loop', sampleRateHz: 440 * 256 };
    const common = sound(table(256), loop);
    const preparer = new Preparer(48_000);
    expect(preparer.prepare(common, null)).not.toBeInstanceOf(Promise);
    expect(workOf(common, null, 48_000)).toBeLessThan(5_000);
    expect(
      workOf(sound(table(65_536), { kind: 'loop', sampleRateHz: 4 * 65_536 }), null, 48_000),
    ).toBeGreaterThan(100_000);
  });

  test('grids are made of new pitches alone, and of those once', () => {
    const preparer = new Preparer(48_000);
    const played = sound(table(256), { kind: 'loop', sampleRateHz: 440 * 256 });
    const at = (...tones: number[]) => ({ events: tones.map((toneHz) => ({ atSeconds: 0, toneHz })) });
    preparer.prepare(played, at(500));
    expect(preparer.gridsFor(played, at(500))).toEqual({});
    expect(preparer.gridsFor(played, at(500, 700, 900))).toMatchObject({ it: [{}, {}] });
    expect(preparer.gridsFor(played, at(900, 700))).toEqual({});
    expect(preparer.gridsFor(played, null)).toEqual({});
  });

  test('a pitch that a score has set is made ready for changes until it is given back', () => {
    const preparer = new Preparer(48_000);
    const drive: Drive = { kind: 'loop', sampleRateHz: 440 * 256 };
    const gridsOf = (length: number, score: Score | null) => {
      const { it } = (preparer.prepare(sound(table(length), drive), score) as SoundProgram).voices;
      if (it.kind !== 'round') throw new Error(it.kind);
      return Math.max(...it.grids.map(({ upToHz }) => upToHz));
    };
    const first = sound(table(256), drive);
    preparer.prepare(first, null);
    preparer.gridsFor(first, { events: [{ atSeconds: 0, gate: true, toneHz: 5_000 }] });
    const silent: Score = { events: [{ atSeconds: 0, gate: false }] };
    preparer.gridsFor(first, silent);
    expect(gridsOf(256, silent)).toBeGreaterThan(5_000);
    const later: Score = { events: [{ atSeconds: 1, toneHz: 300 }] };
    preparer.gridsFor(first, later);
    expect(gridsOf(256, later)).toBeGreaterThan(5_000);
    expect(gridsOf(256, null)).toBeLessThan(500);
  });

  test('with a stage each pitch has a grid of its own', () => {
    const stage = { outputOhms: 1e3, capacitanceF: 1e-7, filter: { kind: 'none' } } as const;
    const voices = { plain: table(64), staged: { ...table(64), stage } };
    const played: Sound = { voices, drive: { kind: 'loop', sampleRateHz: 440 * 64 } };
    const score = { events: [441, 440.5].map((toneHz) => ({ atSeconds: 0, toneHz })) };
    const { plain, staged } = prepareSound(played, score, 48_000).voices;
    if (plain.kind !== 'round' || staged.kind !== 'round') throw new Error('no rounds');
    expect(plain.grids).toHaveLength(1);
    expect(staged.grids.map(({ upToHz }) => upToHz)).toEqual([440, 440.5, 441]);
  });

  test('of thousands of pitches the highest is among the grids', () => {
    const events = Array.from({ length: 5_000 }, (_, k) => ({ atSeconds: k, toneHz: 100 + k / 2 }));
    const { it } = prepareSound(
      sound(table(64), { kind: 'loop', sampleRateHz: 6_400 }),
      { events },
      48_000,
    ).voices;
    if (it.kind !== 'round') throw new Error(it.kind);
    expect(it.grids.length).toBeLessThan(70);
    const highest = Math.max(...it.grids.map(({ upToHz }) => upToHz));
    expect(highest).toBeGreaterThanOrEqual(100 + 4_999 / 2);
    expect(highest * 9).toBeCloseTo(24_000, 6);
  });

  test('a round too long for a grid is played entry by entry, unless a score has it go fast', () => {
    const long = sound(table(65_536), { kind: 'loop', sampleRateHz: 65_536 });
    const score = { events: [{ atSeconds: 0, toneHz: 440 }] };
    expect(prepareSound(long, null, 48_000).voices.it.kind).toBe('pin');
    expect(prepareSound(long, score, 48_000).voices.it.kind).toBe('round');
    expect(prepareGrids(long, score, 48_000)).toBeNull();
  });
});
