import { describe, expect, it } from 'vitest';
import { nearestPitch, pitchHz, planRates, planStepWord, planTwoTones } from '../../shared/playback/index.ts';
import { askPython } from './numpy/python.ts';

// Source: ITU-T Recommendation Q.23 (1988), "Technical features of push-button telephone sets": one tone of the low
// group and one of the high group at once.
const lowGroupHz = [697, 770, 852, 941];
const highGroupHz = [1209, 1336, 1477, 1633];
const tonesHz = [...lowGroupHz, ...highGroupHz];
const keys = lowGroupHz.flatMap((low) => highGroupHz.map((high) => [low, high] as const));
/** A remembered value: every receiver takes a tone that is off by no more than 1.5 %. */
const toleranceCents = 1200 * Math.log2(1 - 0.015);

const timers = [
  { clockHz: 16_000_000, prescalers: [1, 8, 64, 256, 1024], compareBits: 8 },
  { clockHz: 16_000_000, prescalers: [1, 8, 64, 256, 1024], compareBits: 16 },
];
const tables = [
  { lengths: [32], cycles: [1] },
  { lengths: [64, 100, 128, 256], cycles: [1, 2, 3, 5] },
];
const settings = timers.flatMap((timer) =>
  tables.flatMap((table) => tonesHz.map((wantedHz) => ({ timer, wanted: { ...table, wantedHz } }))),
);
const loops = keys.slice(0, 6).map((pair) => ({
  sampleRateHz: 16_000_000 / 2000,
  tonesHz: pair,
  largestLength: 260,
  withinCents: 12,
}));
const answer = askPython<{
  timers: number[];
  twoTones: { worstCents: number; tableLength: number; shortest: number | null }[];
  semitones: number[];
}>('rates.py', {
  timers: settings.map(({ timer, wanted }) => ({ ...timer, ...wanted })),
  twoTones: loops,
});

describe('telephone key tones (ITU-T Q.23) on a clock of 16 MHz', () => {
  it.each(settings.map((setting, i) => [setting.wanted.wantedHz, i] as const))(
    '%i Hz: no setting that NumPy tries is nearer (case %i)',
    (wantedHz, i) => {
      const { timer, wanted } = settings[i];
      const [best] = planRates(timer, wanted);
      expect(Math.abs(best.errorCents)).toBeCloseTo(answer.timers[i], 8);
      const exact = (timer.clockHz * best.cycles) / (best.prescaler * (best.compare + 1) * best.tableLength);
      expect(best.errorCents).toBeCloseTo(1200 * Math.log2(exact / wantedHz), 9);
    },
  );

  // The arithmetic itself, for one table and no prescaler: 16 MHz/(697 Hz·100) is 229.6, so 230, and so on.
  it.each([
    [697, 229, 16e6 / (230 * 100)],
    [770, 207, 16e6 / (208 * 100)],
    [852, 187, 16e6 / (188 * 100)],
    [941, 169, 16e6 / (170 * 100)],
    [1209, 131, 16e6 / (132 * 100)],
    [1336, 119, 16e6 / (120 * 100)],
    [1477, 107, 16e6 / (108 * 100)],
    [1633, 97, 16e6 / (98 * 100)],
  ])('%i Hz from 100 entries: compare %i', (wantedHz, compare, actualHz) => {
    const [best] = planRates({ ...timers[0], prescalers: [1] }, { wantedHz, lengths: [100] });
    expect(best).toMatchObject({ compare, actualHz });
    expect(Math.abs(best.errorCents)).toBeLessThan(-toleranceCents);
  });

  it('by step words of 16 bits at 31250 samples a second are all within half a step', () => {
    for (const hz of tonesHz) {
      const { stepWord, actualHz } = planStepWord({ accumulatorBits: 16, sampleRateHz: 31_250 }, hz);
      expect(stepWord).toBe(Math.round((hz * 65_536) / 31_250));
      expect(Math.abs(actualHz - hz)).toBeLessThan(31_250 / 65_536 / 2);
    }
  });

  it.each(loops.map((loop, i) => [loop.tonesHz, i] as const))(
    '%j Hz at once: no loop that NumPy tries is nearer',
    (_tones, i) => {
      const { best, shortest } = planTwoTones(loops[i]);
      const { worstCents, tableLength, shortest: shortestLength } = answer.twoTones[i];
      expect(best.worstCents).toBeCloseTo(worstCents, 8);
      expect(best.tableLength).toBe(tableLength);
      expect(shortest?.tableLength ?? null).toBe(shortestLength);
    },
  );

  it('at 8 kHz each of the sixteen keys has a loop of at most 260 entries within the tolerance', () => {
    for (const pair of keys) {
      const { best } = planTwoTones({ ...loops[0], tonesHz: pair });
      expect(best.worstCents).toBeLessThan(-toleranceCents);
    }
  });
});

// Source: ISO 16:1975, A4 = 440 Hz. Equal temperament, 2^(n/12) a semitone: common practice, no source.
describe('pitches', () => {
  it('of 128 semitones are those of NumPy', () => {
    answer.semitones.forEach((hz) => {
      const { name, cents } = nearestPitch(hz);
      expect(Math.abs(cents)).toBeLessThan(1e-9);
      if (/^[^-]*$/.test(name)) expect(pitchHz(name) / hz).toBeCloseTo(1, 13);
    });
    // Remembered values, as tables of pitches print them.
    expect(pitchHz('C4')).toBeCloseTo(261.63, 2);
    expect(pitchHz('E2')).toBeCloseTo(82.41, 2);
    expect(pitchHz('C8')).toBeCloseTo(4186.01, 2);
  });
});
