import { describe, expect, it } from 'vitest';
import { linesOf } from '../../shared/dft/index.ts';
import {
  deviceKinds,
  minimumPhaseImpulse,
  renderSound,
  staircaseLines,
  wholeRounds,
  type Drive,
  type Voice,
} from '../../shared/listening/index.ts';
import { wavFile } from '../../shared/listening/wav-file.ts';
import { fullScaleCode } from '../../shared/listening/wav-scale.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);

describe('a sound that is kept', () => {
  const rateHz = 48_000;
  const values = Float64Array.from(
    { length: 64 },
    (_, k) => Math.round(7 * Math.sin((2 * Math.PI * k) / 64)) / 7,
  );
  const voice: Voice = { values, cycles: 1, form: 'staircase' };
  const loopAt = (toneHz: number): Drive => ({ kind: 'loop', sampleRateHz: 64 * toneHz });
  const plain = { voice, rateHz, isFaded: false } as const;

  it('in whole rounds has no line but the round’s, with a device or without', () => {
    const rounds = wholeRounds(437.123, rateHz, 0.5);
    expect(Math.abs(rounds.cents)).toBeLessThan(0.01);
    expect(Math.abs(rounds.frames / rateHz - 0.5)).toBeLessThan(0.012);
    const impulse = minimumPhaseImpulse(deviceKinds[0].points, rateHz);
    for (const response of [null, impulse]) {
      const drive = loopAt(rounds.roundHz);
      const frames = renderSound({ ...plain, drive, frames: rounds.frames, impulse: response });
      const { re, im } = linesOf(Float64Array.from(frames));
      const amplitudes = re.map((value, k) => (2 * Math.hypot(value, im[k])) / frames.length);
      const stray = amplitudes.filter((_, k) => k % rounds.rounds !== 0);
      expect(dB(Math.max(...stray))).toBeLessThan(-130);
      expect(amplitudes[rounds.rounds]).toBeGreaterThan(0.01);
    }
  });

  it('begins with the beginning of a round', () => {
    const frames = renderSound({ ...plain, drive: loopAt(440), frames: 4_800 });
    const found = linesOf(Float64Array.from(frames));
    const wanted = staircaseLines(values, 3);
    for (let m = 1; m <= 3; m += 1) {
      expect((2 * found.re[44 * m]) / 4_800).toBeCloseTo(wanted.re[m], 5);
      expect((2 * found.im[44 * m]) / 4_800).toBeCloseTo(wanted.im[m], 5);
    }
  });

  it('takes the wanted length where it fits, and a whole round where it is shorter', () => {
    expect(wholeRounds(440, rateHz, 1)).toEqual({ frames: 48_000, rounds: 440, roundHz: 440, cents: 0 });
    expect(wholeRounds(0.5, rateHz, 0.1)).toMatchObject({ frames: 96_000, rounds: 1 });
  });

  it('fades come and go from and to nothing', () => {
    const frames = renderSound({ ...plain, drive: loopAt(440), frames: 4_800, isFaded: true });
    const full = renderSound({ ...plain, drive: loopAt(440), frames: 4_800 });
    expect([frames[0], frames[4_799]].map(Math.abs)).toEqual([0, 0]);
    expect(frames.slice(240, 4_560)).toEqual(full.slice(240, 4_560));
    const step = full.reduce(
      (most, value, i) => Math.max(most, i === 0 ? 0 : Math.abs(value - full[i - 1])),
      0,
    );
    for (let i = 1; i < 240; i += 1) expect(Math.abs(frames[i] - frames[i - 1])).toBeLessThan(1.05 * step);
  });

  it('has a score’s gate and tone where they are due', () => {
    const score = {
      events: [
        { atSeconds: 0, gate: true, toneHz: 1_000 },
        { atSeconds: 0.05, gate: false },
        { atSeconds: 0.08, toneHz: 2_000 },
      ],
      repeatSeconds: 0.1,
    };
    const frames = renderSound({ ...plain, drive: loopAt(440), frames: 9_600, score });
    const strongest = (from: number, length: number) => {
      const { re, im } = linesOf(Float64Array.from(frames.subarray(from, from + length)));
      const powers = re.map((value, k) => Math.hypot(value, im[k]));
      return (powers.indexOf(Math.max(...powers)) * rateHz) / length;
    };
    expect(strongest(480, 1_920)).toBe(1_000);
    expect(strongest(4_800 + 480, 1_920)).toBe(1_000);
    const loud = (from: number, to: number) => Math.max(...frames.subarray(from, to).map(Math.abs));
    // The ramp takes 240 frames, and a pin is heard 39 frames late.
    expect(loud(2_400 + 39 + 240, 4_800)).toBe(0);
    expect(loud(2_400, 2_439)).toBeGreaterThan(0.5);
    expect(loud(4_800 + 39 + 240, 4_800 + 1_000)).toBeGreaterThan(0.9);
  });

  it('once through ends with its last entry', () => {
    const drive: Drive = { kind: 'once', sampleRateHz: 6_400 };
    for (const form of ['staircase', 'curve'] as const) {
      const frames = renderSound({
        ...plain,
        voice: { ...voice, form },
        drive,
        frames: 2_400,
        isFaded: true,
      });
      expect(Math.max(...frames.subarray(0, 480))).toBeGreaterThan(0.9);
      expect(frames.subarray(1_200).every((value) => value === 0)).toBe(true);
    }
  });

  it('follows the step words of a score, and those of a voice that is driven otherwise', () => {
    const drive: Drive = { kind: 'accumulator', sampleRateHz: 32_000, accumulatorBits: 16, stepWord: 2_048 };
    const own: Drive = { ...drive, stepWord: 4_096 };
    const score = { events: [{ atSeconds: 0.05, stepWord: 4_096 }] };
    const frames = (one: Voice) => renderSound({ ...plain, voice: one, drive, frames: 4_800, score });
    const strongest = (heard: Float32Array, from: number) => {
      const { re, im } = linesOf(Float64Array.from(heard.subarray(from, from + 1_920)));
      const powers = re.map((value, k) => Math.hypot(value, im[k]));
      return powers.indexOf(Math.max(...powers)) * (rateHz / 1_920);
    };
    for (const form of ['staircase', 'curve'] as const) {
      const plainly = frames({ ...voice, form });
      expect([strongest(plainly, 400), strongest(plainly, 2_800)], form).toEqual([1_000, 2_000]);
      const twice = frames({ ...voice, form, drive: own });
      expect([strongest(twice, 400), strongest(twice, 2_800)], form).toEqual([2_000, 4_000]);
    }
  });

  it('is never clipped, and dithered codes stay within', () => {
    const full = Float32Array.of(1, -1, 0.5);
    for (const depth of ['8', '16', '24'] as const) {
      expect(() => wavFile(Float32Array.of(1.0001), { rateHz, depth, ditherSeed: null })).toThrow(
        'full scale',
      );
      expect(fullScaleCode(depth, false)).toBe(2 ** (Number(depth) - 1) - 1);
      expect(wavFile(full, { rateHz, depth, ditherSeed: null }).length % 2).toBe(0);
    }
    const loud = Float32Array.from({ length: 20_000 }, (_, i) => (i % 2 === 0 ? 1 : -1));
    const bytes = wavFile(loud, { rateHz, depth: '8', ditherSeed: 3 }).subarray(44);
    const high = bytes.filter((_, i) => i % 2 === 0);
    expect([...new Set(high)].sort()).toEqual([128 + 125, 128 + 126, 128 + 127]);
    // Triangular noise, then rounding: an eighth of the draws go a step up.
    expect(high.filter((code) => code === 128 + 127).length / high.length).toBeCloseTo(0.125, 1);
    expect(wavFile(loud, { rateHz, depth: '8', ditherSeed: 3 }).subarray(44)).toEqual(bytes);
  });
});
