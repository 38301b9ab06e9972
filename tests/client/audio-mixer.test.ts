import { describe, expect, test } from 'vitest';
import {
  pinDelayFrames,
  renderSound,
  type Drive,
  type Sound,
  type Voice,
} from '../../shared/listening/index.ts';
import { prepareGrids, prepareSound } from '../../src/audio/prepare-sound.ts';
import { Mixed, quantum, rateHz, sineIn } from './support/mixed.ts';

const sine = (length: number, level = 1, cycles = 1) =>
  Float64Array.from({ length }, (_, k) => level * Math.sin((2 * Math.PI * cycles * k) / length));

const curve = (values: Float64Array, cycles = 1): Voice => ({ values, cycles, form: 'curve' });
const staircase = (values: Float64Array, cycles = 1): Voice => ({ values, cycles, form: 'staircase' });
const loop = (toneHz: number, length: number, cycles = 1): Drive => ({
  kind: 'loop',
  sampleRateHz: (toneHz * length) / cycles,
});

const largestStep = (frames: readonly number[]) => {
  let step = 0;
  for (let i = 1; i < frames.length; i += 1) step = Math.max(step, Math.abs(frames[i] - frames[i - 1]));
  return step;
};
const peakOf = (frames: readonly number[]) =>
  frames.reduce((peak, value) => Math.max(peak, Math.abs(value)), 0);
/** The lowest peak of successive blocks that each hold a period. */
const lowestPeak = (frames: readonly number[], block: number) => {
  let lowest = Infinity;
  for (let first = 0; first + block <= frames.length; first += block) {
    lowest = Math.min(lowest, peakOf(frames.slice(first, first + block)));
  }
  return lowest;
};

/** The steepest that a sine of full scale is, from frame to frame. */
const steepest = (hz: number) => (2 * Math.PI * hz) / rateHz;
/** What the gains of a crossfade of two waves add to that: full scale over half a period of a raised cosine. */
const fading = Math.PI / 2 / (0.012 * rateHz);

const accumulator = { kind: 'accumulator', sampleRateHz: 62_500, accumulatorBits: 24 } as const;
const stepWord = Math.round((220 * 2 ** 24) / 62_500);

describe('going over while it plays', () => {
  test.each([
    ['another shape', { voices: { it: curve(sine(100)) }, drive: loop(220, 100) }],
    ['twice the length', { voices: { it: curve(sine(128)) }, drive: loop(220, 128) }],
    ['three cycles in the table', { voices: { it: curve(sine(300, 1, 3), 3) }, drive: loop(220, 300, 3) }],
    ['an accumulator', { voices: { it: staircase(sine(4096)) }, drive: { ...accumulator, stepWord } }],
  ] satisfies [string, Sound][])('to %s there is no gap and no step', (_, next) => {
    const mixed = new Mixed();
    mixed.start({ voices: { it: curve(sine(64)) }, drive: loop(220, 64) }, 'it');
    mixed.run(40);
    mixed.change(next);
    const frames = mixed.run(100);
    // A period of 220 Hz is 218 frames. In phase, the sum is a sine of full scale all the time.
    expect(lowestPeak(frames, 220)).toBeGreaterThan(0.985);
    expect(peakOf(mixed.frames)).toBeLessThan(1.001);
    expect(largestStep(mixed.frames.slice(200))).toBeLessThan(1.02 * steepest(220));
    const [amplitude] = sineIn(mixed.frames, 40 * quantum, 9_600, 220);
    expect(amplitude).toBeCloseTo(1, 2);
  });

  test('changes faster than a crossfade go on from where they are', () => {
    const mixed = new Mixed();
    const sound = (level: number): Sound => ({
      voices: { it: curve(sine(64, level)) },
      drive: loop(220, 64),
    });
    mixed.start(sound(1), 'it');
    mixed.run(20);
    for (let i = 0; i < 30; i += 1) {
      mixed.change(sound(i % 2 === 0 ? 0.5 : 1));
      mixed.run(1 + (i % 3));
    }
    mixed.change(sound(1));
    mixed.run(40);
    expect(largestStep(mixed.frames.slice(200))).toBeLessThan(steepest(220) + fading);
    expect(sineIn(mixed.frames, mixed.frames.length - 3_000, 2_400, 220)[0]).toBeCloseTo(1, 3);
  });

  test('a pitch goes over without a gap as well', () => {
    const mixed = new Mixed();
    mixed.start({ voices: { it: curve(sine(64)) }, drive: loop(220, 64) }, 'it');
    mixed.run(40);
    mixed.change({ voices: { it: curve(sine(64)) }, drive: loop(233, 64) });
    mixed.run(100);
    expect(lowestPeak(mixed.frames.slice(200), 220)).toBeGreaterThan(0.95);
    expect(largestStep(mixed.frames.slice(200))).toBeLessThan(steepest(233) + fading);
    expect(sineIn(mixed.frames, 60 * quantum, 4_800, 233)[0]).toBeCloseTo(1, 2);
  });
});

describe('voices', () => {
  test.each([
    ['a loop', loop(220, 4096), 220],
    ['an accumulator', { ...accumulator, stepWord }, (stepWord * 62_500) / 2 ** 24],
  ] as const)('under %s are in step: one goes over to the other without a dip', (_, drive, hz) => {
    const mixed = new Mixed();
    const voices = { ideal: curve(sine(4096)), table: staircase(sine(4096)), other: staircase(sine(4096)) };
    mixed.start({ voices, drive }, 'ideal');
    mixed.run(40);
    const phases = ['table', 'other', 'ideal', 'table'].map((hearing) => {
      mixed.tell({ kind: 'hear', hearing });
      const first = mixed.frames.length;
      const frames = mixed.run(100);
      expect(lowestPeak(frames, 220)).toBeGreaterThan(0.985);
      expect(largestStep(frames)).toBeLessThan(1.02 * steepest(220) + 0.002);
      return sineIn(mixed.frames, first + 1_000, 4_800, hz)[1];
    });
    // Half an entry of the hold, and half a period of the samples, are all that lies between curve and staircase.
    for (const phase of phases) expect(Math.abs(phase - phases[2])).toBeLessThan(0.002);
  });

  test('a voice that is not there is not heard', () => {
    const mixed = new Mixed();
    mixed.start({ voices: { it: curve(sine(64)) }, drive: loop(220, 64) }, 'it');
    mixed.run(10);
    mixed.tell({ kind: 'hear', hearing: 'other' });
    expect(lowestPeak(mixed.run(50), 220)).toBeGreaterThan(0.985);
    mixed.change({ voices: { it: curve(sine(64)), other: curve(sine(64, 0.25)) }, drive: loop(220, 64) });
    mixed.run(20);
    expect(peakOf(mixed.run(20))).toBeCloseTo(0.25, 2);
  });

  test('driven otherwise than the sound keep their own pitch, and what they stand to it in a score', () => {
    const mixed = new Mixed();
    const drive: Drive = { ...accumulator, stepWord: 1 << 14 };
    const own: Drive = { ...accumulator, sampleRateHz: 31_250, stepWord: 1 << 15 };
    const toneHz = (2 ** 14 * 62_500) / 2 ** 24;
    const voices = { it: staircase(sine(256)), own: { ...staircase(sine(128)), drive: own } };
    mixed.start({ voices, drive }, 'own');
    mixed.run(150);
    expect(sineIn(mixed.frames, 4_800, 9_600, toneHz)[0]).toBeCloseTo(1, 2);
    mixed.tell({ kind: 'perform', score: { events: [{ atSeconds: 0, stepWord: 1 << 15 }] }, grids: {} });
    mixed.run(150);
    expect(sineIn(mixed.frames, 200 * quantum, 9_600, 2 * toneHz)[0]).toBeCloseTo(1, 2);
  });
});

describe('a score', () => {
  const sound: Sound = { voices: { it: curve(sine(64)) }, drive: loop(440, 64) };

  test('opens and closes the gate to the frame, over and over', () => {
    const mixed = new Mixed();
    const score = {
      events: [
        { atSeconds: 0, gate: true },
        { atSeconds: 0.03, gate: false },
      ],
      repeatSeconds: 0.05,
    };
    mixed.start(sound, 'it', score);
    mixed.run(400);
    const ramp = 0.005 * rateHz;
    for (let round = 0; round < 20; round += 1) {
      const at = pinDelayFrames + round * 0.05 * rateHz;
      expect(peakOf(mixed.frames.slice(at + ramp, at + 0.03 * rateHz))).toBeGreaterThan(0.99);
      expect(peakOf(mixed.frames.slice(at + 0.03 * rateHz + ramp, at + 0.05 * rateHz))).toBe(0);
    }
    expect(largestStep(mixed.frames.slice(200))).toBeLessThan(steepest(440) + Math.PI / 2 / ramp);
  });

  test('that begins with a closed gate begins in silence, and given back it sounds as before', () => {
    const mixed = new Mixed();
    mixed.start(sound, 'it', { events: [{ atSeconds: 0, gate: false, toneHz: 880 }] });
    expect(peakOf(mixed.run(20))).toBe(0);
    mixed.tell({ kind: 'perform', score: null, grids: {} });
    mixed.run(100);
    expect(sineIn(mixed.frames, 30 * quantum, 4_800, 440)[0]).toBeCloseTo(1, 3);
  });

  test.each([
    ['tones of a loop', sound, (hz: number) => ({ toneHz: hz })],
    [
      'step words of an accumulator',
      { voices: { it: staircase(sine(1024)) }, drive: { ...accumulator, stepWord } },
      (hz: number) => ({ stepWord: Math.round((hz * 2 ** 24) / 62_500) }),
    ],
  ] satisfies [string, Sound, object][])(
    'has %s take over at its frames, phase going on',
    (_, played, pitch) => {
      const mixed = new Mixed();
      const set = pitch as (hz: number) => object;
      const score = { events: [1, 2, 3].map((n) => ({ atSeconds: n / 10, ...set(440 * (1 + n / 4)) })) };
      mixed.start(played, 'it', score);
      mixed.run(160);
      for (const n of [1, 2, 3]) {
        const hz = 440 * (1 + n / 4);
        expect(sineIn(mixed.frames, (n * rateHz) / 10, 4_800, hz)[0], `${hz} Hz`).toBeCloseTo(1, 2);
      }
      expect(lowestPeak(mixed.frames.slice(200), 120)).toBeGreaterThan(0.97);
      expect(largestStep(mixed.frames.slice(200))).toBeLessThan(1.03 * steepest(770) + 0.003);
    },
  );

  test.each(['curve', 'staircase'] as const)('is heard as it is kept in a file: %s', (form) => {
    const mixed = new Mixed();
    const voice: Voice = { values: sine(1024), cycles: 1, form };
    const drive = { ...accumulator, stepWord };
    const score = {
      events: [
        { atSeconds: 0, gate: true },
        { atSeconds: 0.051, stepWord: 2 * stepWord },
        { atSeconds: 0.08, gate: false },
        { atSeconds: 0.1, gate: true, stepWord },
        { atSeconds: 0.14, gate: false },
      ],
      repeatSeconds: 0.15,
    };
    mixed.start({ voices: { it: voice }, drive }, 'it', score);
    mixed.run(200);
    const frames = mixed.frames.length;
    const kept = renderSound({ voice, drive, rateHz, frames, score, isFaded: false });
    let furthest = 0;
    // What begins does so with the output's own fade, and in the file with the gate's.
    for (let i = 600; i < frames; i += 1) furthest = Math.max(furthest, Math.abs(kept[i] - mixed.frames[i]));
    expect(furthest).toBeLessThan(0.01);
    const open = [1_000, 2_000, 5_500, 9_000, 20_000];
    for (const i of open) expect(mixed.frames[i]).toBeCloseTo(kept[i], 5);
  });

  test('keeps both ways of playing in step through a glide', () => {
    const mixed = new Mixed();
    const drive = { ...accumulator, stepWord };
    const voices = { ideal: curve(sine(4096)), table: staircase(sine(4096)) };
    const events = Array.from({ length: 400 }, (_, k) => ({
      atSeconds: k / 1000,
      stepWord: stepWord + 200 * k,
    }));
    mixed.start({ voices, drive }, 'ideal', { events });
    mixed.run(200);
    const hz = ((stepWord + 200 * 399) * 62_500) / 2 ** 24;
    const phaseOf = (hearing: string) => {
      mixed.tell({ kind: 'hear', hearing });
      const first = mixed.frames.length;
      mixed.run(100);
      return sineIn(mixed.frames, first + 2_000, 9_600, hz)[1];
    };
    expect(Math.abs(phaseOf('table') - phaseOf('ideal'))).toBeLessThan(0.005);
  });

  test('reads no line above half of the rate, and none less than there is room for', () => {
    // Sharp teeth: each line is as good as its number.
    const teeth = Float64Array.from({ length: 64 }, (_, k) => (k === 0 ? 1 : 0));
    const played: Sound = { voices: { it: staircase(teeth) }, drive: loop(100, 64) };
    const score = { events: [100, 3_000, 700, 5_000].map((toneHz, n) => ({ atSeconds: n / 10, toneHz })) };
    const { it } = prepareSound(played, score, rateHz).voices;
    if (it.kind !== 'round') throw new Error(it.kind);
    for (const { toneHz } of score.events) {
      const fit = it.grids.filter(({ upToHz }) => upToHz >= toneHz).sort((a, b) => a.upToHz - b.upToHz)[0];
      const lines = Math.ceil(rateHz / 2 / toneHz) - 1;
      expect(fit.upToHz * lines).toBeCloseTo(rateHz / 2, 6);
    }
    const mixed = new Mixed();
    mixed.start(played, 'it');
    mixed.run(20);
    // Grids of new pitches come with the score.
    const grids = prepareGrids(played, score, rateHz);
    if (grids === null) throw new Error('no grids');
    mixed.tell({ kind: 'perform', score: { events: [{ atSeconds: 0, toneHz: 5_000 }] }, grids });
    mixed.run(100);
    const isFoldedIn = (first: number) =>
      [23_000, 18_000, 13_000, 8_000, 3_000].some((hz) => sineIn(mixed.frames, first, 4_800, hz)[0] > 1e-5);
    expect(isFoldedIn(40 * quantum)).toBe(false);
    // A sound that takes its place meanwhile begins with that pitch.
    mixed.change({ ...played, voices: { it: staircase(teeth.map((value) => -value)) } }, score);
    mixed.run(100);
    expect(isFoldedIn(140 * quantum)).toBe(false);
  });
});

describe('one pass', () => {
  const chirp = Float64Array.from({ length: 2_000 }, (_, k) => Math.sin(0.05 * k + 2e-5 * k * k));
  const sound: Sound = {
    voices: { ideal: curve(chirp), table: staircase(chirp) },
    drive: { kind: 'once', sampleRateHz: 8_000 },
  };

  test.each(['ideal', 'table'])('of the %s ends in silence and tells so', (hearing) => {
    const mixed = new Mixed();
    mixed.start(sound, hearing);
    mixed.run(120);
    expect(mixed.ended).toHaveLength(1);
    const [request, frame] = mixed.ended[0];
    expect(request).toBe(7);
    // A quarter of a second, and what is heard before its first and after its last entry.
    expect(frame / rateHz).toBeGreaterThan(0.25);
    expect(frame / rateHz).toBeLessThan(0.27);
    expect(peakOf(mixed.frames.slice(frame))).toBe(0);
    expect(peakOf(mixed.frames)).toBeCloseTo(1, 1);
    const last = mixed.frames.findLast((value) => value !== 0) ?? 1;
    expect(Math.abs(last)).toBeLessThan(1e-4);
  });

  test('is let go by a stop', () => {
    const mixed = new Mixed();
    mixed.start(sound, 'table');
    mixed.run(20);
    mixed.tell({ kind: 'stop' });
    expect(peakOf(mixed.run(200))).toBe(0);
    expect(mixed.ended).toEqual([]);
  });
});
