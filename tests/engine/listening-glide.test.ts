import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  glideEvents,
  glideHzAt,
  glideSteps,
  planGlide,
  planTone,
  type GlideSettings,
  type GlideStep,
  type ToneDrive,
} from '../../shared/listening/index.ts';
import { centsBetween } from '../../shared/playback/index.ts';
import { problemsOf } from './support/refusals.ts';
import { holds } from './support/seeded.ts';

const free: ToneDrive = { kind: 'rate', tableLength: 256, cycles: 1 };
const timer: ToneDrive = {
  kind: 'timer',
  clockHz: 16e6,
  prescaler: 8,
  compareBits: 16,
  tableLength: 32,
  cycles: 1,
};
const accumulator = (accumulatorBits: number, sampleRateHz = 32_000, cycles = 1): ToneDrive => ({
  kind: 'accumulator',
  accumulatorBits,
  sampleRateHz,
  cycles,
});

const tone = fc.double({ min: Math.log(60), max: Math.log(7_000), noNaN: true }).map(Math.exp);
const glides = fc.record({
  fromHz: tone,
  toHz: tone,
  seconds: fc.double({ min: 0, max: 1, noNaN: true }),
  updateSeconds: fc.constantFrom(0.0005, 0.001, 0.004, 0.03),
  path: fc.constantFrom('exponential' as const, 'linear' as const),
});
const drives = fc.constantFrom(free, timer, accumulator(16), accumulator(24), accumulator(32, 31_250, 3));

/** The path itself, by powers of the ratio rather than as the engine goes. */
const pathAt = ({ fromHz, toHz, seconds, path }: GlideSettings, at: number) => {
  const share = seconds === 0 ? 1 : Math.min(1, at / seconds);
  return path === 'linear' ? fromHz * (1 - share) + toHz * share : fromHz * (toHz / fromHz) ** share;
};

const wordOf = (step: GlideStep) => ('stepWord' in step ? step.stepWord : step.toneHz);

describe('a glide', () => {
  it('holds at each update what is nearest to the path there, among all that the register has', () => {
    holds(
      fc.property(drives, glides, (drive, settings) => {
        const { steps, heldHz } = planGlide(drive, settings);
        const last = (heldHz.length - 1) * settings.updateSeconds;
        expect(last).toBeGreaterThanOrEqual(settings.seconds - 1e-9);
        expect(last).toBeLessThan(settings.seconds + settings.updateSeconds);
        heldHz.forEach((hz, k) => {
          const wanted =
            k === heldHz.length - 1 ? settings.toHz : pathAt(settings, k * settings.updateSeconds);
          expect(glideHzAt(steps, (k + 0.5) * settings.updateSeconds)).toBe(hz);
          switch (drive.kind) {
            case 'rate':
              return expect(Math.abs(centsBetween(hz, wanted))).toBeLessThan(1e-9);
            case 'accumulator': {
              const stepHz = (drive.cycles * drive.sampleRateHz) / 2 ** drive.accumulatorBits;
              return expect(Math.abs(hz - wanted)).toBeLessThanOrEqual(stepHz * (0.5 + 1e-6));
            }
            case 'timer': {
              const period = 2e6 / 32 / hz;
              const off = Math.abs(centsBetween(hz, wanted));
              for (const other of [period - 1, period + 1])
                expect(off).toBeLessThanOrEqual(Math.abs(centsBetween(2e6 / 32 / other, wanted)) + 1e-9);
            }
          }
        });
      }),
      150,
    );
  });

  it('goes one way only, in whole words none of which comes twice in a row, and ends at its end’s nearest', () => {
    holds(
      fc.property(drives, glides, (drive, settings) => {
        const { steps, endErrorCents } = planGlide(drive, settings);
        const way = Math.sign(settings.toHz - settings.fromHz);
        steps.forEach((step, i) => {
          if (drive.kind === 'rate') expect(step.word).toBeNull();
          else expect(Number.isInteger(step.word)).toBe(true);
          expect(wordOf(step)).toBe(drive.kind === 'accumulator' ? step.word : step.hz);
          if (i === 0) return expect(step.atSeconds).toBe(0);
          expect(Math.sign(wordOf(step) - wordOf(steps[i - 1]))).toBe(way);
          expect(step.atSeconds).toBeGreaterThan(steps[i - 1].atSeconds);
        });
        const end = planTone(drive, settings.toHz);
        expect(steps.at(-1)).toMatchObject({ ...end.setting, hz: end.playedHz });
        expect(endErrorCents).toBe(end.errorCents);
        expect(steps.at(-1)?.atSeconds).toBeLessThan(settings.seconds + settings.updateSeconds);
      }),
      150,
    );
  });

  it('every tick on a step or between them: the first comes when the path has passed half a word', () => {
    // 440 Hz to 880 Hz in 1 s by words of 16 bits at 32 kHz: W from 901 to 1802, one word 0.488 Hz.
    const settings = {
      fromHz: 440,
      toHz: 880,
      seconds: 1,
      updateSeconds: 0.001,
      path: 'exponential',
    } as const;
    const steps = glideSteps(accumulator(16), settings);
    expect(steps[0]).toEqual({ atSeconds: 0, hz: (901 * 32_000) / 65_536, word: 901, stepWord: 901 });
    expect(steps.at(-1)).toEqual({ atSeconds: 1, hz: (1802 * 32_000) / 65_536, word: 1802, stepWord: 1802 });
    const passing = Math.log2((901.5 * 32_000) / 65_536 / 440);
    expect(steps[1].word).toBe(902);
    expect(steps[1].atSeconds).toBeCloseTo(Math.ceil(passing * 1000) / 1000, 12);
    // Near 440 Hz the path rises by 0.3 Hz a tick, less than a word: most words come, and none is passed over.
    const early = steps.filter(({ atSeconds }) => atSeconds < 0.5).map(wordOf);
    expect(early).toEqual(early.map((_, i) => 901 + i));
  });

  it('exponential: as many cents every second; linear: as many hertz', () => {
    const settings = { fromHz: 220, toHz: 880, seconds: 0.8, updateSeconds: 0.1 };
    const { heldHz: exponential } = planGlide(free, { ...settings, path: 'exponential' });
    const { heldHz: linear } = planGlide(free, { ...settings, path: 'linear' });
    expect(exponential).toHaveLength(9);
    for (let k = 1; k <= 8; k += 1) {
      expect(centsBetween(exponential[k], exponential[k - 1])).toBeCloseTo(300, 9);
      expect(linear[k] - linear[k - 1]).toBeCloseTo(82.5, 9);
    }
  });

  it('tells its largest step, and that a coarse register makes larger ones', () => {
    const settings = {
      fromHz: 100,
      toHz: 200,
      seconds: 1,
      updateSeconds: 0.001,
      path: 'exponential',
    } as const;
    const coarse = planGlide(accumulator(12), settings);
    // A word of 12 bits at 32 kHz is 7.8125 Hz: from 13 to 26, the first step the largest.
    expect(coarse.steps.map(wordOf)).toEqual([13, 14, 15, 16, 17, 18, 19, 20, 21, 22, 23, 24, 25, 26]);
    expect(coarse.largestStepCents).toBeCloseTo(1200 * Math.log2(14 / 13), 9);
    expect(coarse.endErrorCents).toBeCloseTo(1200 * Math.log2((26 * 7.8125) / 200), 9);
    expect(planGlide(free, settings).largestStepCents).toBeCloseTo(1.2, 9);
  });

  it('of no time, or to where it is, is one step', () => {
    const still = { fromHz: 440, toHz: 440, seconds: 1, updateSeconds: 0.001, path: 'linear' } as const;
    expect(glideSteps(accumulator(24), still)).toHaveLength(1);
    const atOnce = { ...still, toHz: 500, seconds: 0 };
    expect(glideSteps(free, atOnce)).toEqual([{ atSeconds: 0, hz: 500, word: null, toneHz: 500 }]);
  });

  it('becomes events of a score: gate open from the start, the glide after the wait', () => {
    const settings = { fromHz: 100, toHz: 120, seconds: 0.1, updateSeconds: 0.05, path: 'linear' } as const;
    const steps = glideSteps(free, settings);
    expect(glideEvents(steps)).toEqual([
      { atSeconds: 0, toneHz: 100, gate: true },
      { atSeconds: 0.05, toneHz: 110 },
      { atSeconds: 0.1, toneHz: 120 },
    ]);
    expect(glideEvents(steps, 0.5)).toEqual([
      { atSeconds: 0, toneHz: 100, gate: true },
      { atSeconds: 0.5, toneHz: 100 },
      { atSeconds: 0.55, toneHz: 110 },
      { atSeconds: 0.6, toneHz: 120 },
    ]);
  });

  it('is refused with what is allowed', () => {
    const good = { fromHz: 440, toHz: 880, seconds: 1, updateSeconds: 0.001, path: 'linear' } as const;
    const refused = (change: Partial<GlideSettings>) =>
      problemsOf(() => planGlide(accumulator(24), { ...good, ...change }));
    expect(refused({ toHz: 16_000 })).toMatchObject([{ path: 'wantedHz', value: '16000 Hz' }]);
    expect(refused({ fromHz: 0 })).toMatchObject([{ path: 'wantedHz' }]);
    expect(refused({ seconds: 10.5 })).toEqual([{ path: 'seconds', value: '10.5', allowed: '0 to 10 s' }]);
    expect(refused({ seconds: Number.NaN })).toMatchObject([{ path: 'seconds' }]);
    expect(refused({ updateSeconds: 0 })).toMatchObject([{ path: 'updateSeconds' }]);
    expect(refused({ seconds: 10, updateSeconds: 0.0002 })).toMatchObject([
      { path: 'updateSeconds', value: '50000 updates' },
    ]);
  });
});
