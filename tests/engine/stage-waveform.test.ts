import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linesOf } from '../../shared/dft/index.ts';
import {
  filterGain,
  outputLines,
  stageGain,
  stageWaveform,
  type StageInput,
} from '../../shared/output-stage/index.ts';
import { holds, noise } from './support/seeded.ts';

const volts = Array.from({ length: 16 }, (_, code) => (5 * code) / 16);
const ohms = volts.map(() => 10_000);
type Stage = StageInput & { codes: number[] };
const stageOf = (fields: Partial<Stage> = {}): Stage => ({
  volts,
  outputOhms: ohms,
  codes: [0, 15, 7, 8, 3, 3, 12, 1],
  sampleRateHz: 8000,
  capacitanceF: 0,
  filter: { kind: 'none' },
  pointsPerHold: 8,
  ...fields,
});

const filters = [
  { kind: 'none' },
  { kind: 'rc', cutoffHz: 1500 },
  { kind: 'butterworth', cutoffHz: 1500 },
] as const;

const anyStage = fc
  .record({
    codes: fc.array(fc.integer({ min: 0, max: 15 }), { minLength: 2, maxLength: 12 }),
    capacitanceF: fc.constantFrom(0, 1e-10, 2e-9, 1e-8),
    opAmp: fc.option(
      fc.record({
        slewRateVPerS: fc.constantFrom(1e3, 2e4, 3e5, 1e8),
        gainBandwidthHz: fc.constantFrom(1 / (2 * Math.PI * 1e-4), 1e4, 1e6),
      }),
      { nil: undefined },
    ),
    filter: fc.constantFrom(...filters),
  })
  .map((fields) => stageOf(fields));

/** An op-amp that never comes to rest keeps where it began: such loops have no one steady state. */
const mostSlewing = 0.95;

describe('the waveform through the stage', () => {
  it('at the pin without capacitance is the staircase, and parts that are not there change nothing', () => {
    const { pin, buffer, output, timeS, isSteady } = stageWaveform(stageOf());
    expect(Array.from(pin)).toEqual(
      stageOf().codes.flatMap((code) => new Array<number>(8).fill(volts[code])),
    );
    expect(buffer).toEqual(pin);
    expect(output).toEqual(pin);
    expect(timeS[9]).toBeCloseTo(9 / 64_000, 15);
    expect(isSteady).toBe(true);
  });

  it('does not depend on how many points are drawn', () => {
    holds(
      fc.property(anyStage, (stage) => {
        const few = stageWaveform({ ...stage, pointsPerHold: 3 });
        const many = stageWaveform({ ...stage, pointsPerHold: 24 });
        return (['pin', 'buffer', 'output'] as const).every((part) =>
          few[part].every((value, i) => Math.abs(value - many[part][8 * i]) < 1e-9),
        );
      }),
      60,
    );
  });

  it('ends as it begins, and two loops in one are that loop twice', () => {
    holds(
      fc.property(anyStage, (stage) => {
        const once = stageWaveform(stage);
        if (once.slewingShare > mostSlewing) return true;
        const twice = stageWaveform({ ...stage, codes: [...stage.codes, ...stage.codes] });
        return (
          once.isSteady &&
          once.output.every(
            (value, i) =>
              Math.abs(value - twice.output[i]) < 1e-8 &&
              Math.abs(value - twice.output[i + once.output.length]) < 1e-8,
          )
        );
      }),
      60,
    );
  });

  it('never goes faster than the slew rate behind the op-amp, nor beyond what goes in', () => {
    holds(
      fc.property(anyStage, (stage) => {
        const { buffer, pin, slewingShare } = stageWaveform(stage);
        if (slewingShare > mostSlewing) return true;
        const step = 1 / (8 * stage.sampleRateHz);
        const slew = stage.opAmp?.slewRateVPerS ?? Infinity;
        const [low, high] = [Math.min(...stage.codes), Math.max(...stage.codes)].map((code) => volts[code]);
        return buffer.every(
          (value, i) =>
            Math.abs(value - buffer[(i + 1) % buffer.length]) <= slew * step * (1 + 1e-9) &&
            value >= low - 1e-9 &&
            value <= high + 1e-9 &&
            pin[i] >= low - 1e-12 &&
            pin[i] <= high + 1e-12,
        );
      }),
      60,
    );
  });

  it('is the exponential of the time constant at the pin', () => {
    // A step every 125 µs at τ = 50 µs, 10 kΩ and 5 nF; the other code's resistance is half.
    const unlike = ohms.map((value, code) => (code === 15 ? value / 2 : value));
    const { pin } = stageWaveform(stageOf({ codes: [0, 15], capacitanceF: 5e-9, outputOhms: unlike }));
    const top = volts[15];
    for (let i = 0; i < 8; i += 1) {
      const t = i / 64_000;
      expect(pin[i]).toBeCloseTo(pin[0] * Math.exp(-t / 50e-6), 12);
      expect(pin[8 + i]).toBeCloseTo(top + (pin[8] - top) * Math.exp(-t / 25e-6), 12);
    }
  });

  it('holds its mean where the capacitance is very large, and ends where it began with parts of any speed', () => {
    const codes = [0, 15, 7, 8];
    const mean = codes.reduce((sum, code) => sum + volts[code], 0) / codes.length;
    const { pin, output, isSteady } = stageWaveform(
      stageOf({ codes, capacitanceF: 1, filter: { kind: 'butterworth', cutoffHz: 1e9 } }),
    );
    expect(isSteady).toBe(true);
    for (const value of [...pin, ...output]) expect(Math.abs(value - mean)).toBeLessThan(1e-7);
    const slow = stageWaveform(
      stageOf({
        codes,
        opAmp: { slewRateVPerS: 1e9, gainBandwidthHz: 0.001 },
        filter: { kind: 'rc', cutoffHz: 1e10 },
      }),
    );
    expect(slow.isSteady).toBe(true);
    for (const value of slow.output) expect(Math.abs(value - mean)).toBeLessThan(1e-5);
  });

  it('slews in a straight line and then nears its end exponentially', () => {
    const rate = 2 * Math.PI * 50_000;
    const slew = 1e5;
    const { buffer, slewingShare } = stageWaveform(
      stageOf({
        codes: [0, 15],
        opAmp: { slewRateVPerS: slew, gainBandwidthHz: 50_000 },
        pointsPerHold: 1000,
      }),
    );
    const top = volts[15];
    const start = buffer[1000];
    const slewS = (top - start - slew / rate) / slew;
    expect(slewingShare).toBeCloseTo(slewS * 8000, 5);
    for (let i = 0; i < 1000; i += 50) {
      const t = i / 8e6;
      const wanted = t < slewS ? start + slew * t : top - (slew / rate) * Math.exp(-rate * (t - slewS));
      expect(buffer[1000 + i]).toBeCloseTo(wanted, 10);
    }
  });

  it.each(filters)('of small signals has the lines that the magnitudes say: %j', (filter) => {
    const codes = Array.from(noise(16, 5), (value) => Math.round(7.5 + 7.4 * value));
    const stage = stageOf({
      codes,
      filter,
      capacitanceF: 3e-9,
      opAmp: { slewRateVPerS: 1e9, gainBandwidthHz: 9000 },
      pointsPerHold: 256,
    });
    const { output } = stageWaveform(stage);
    const parts = { ...stage, outputOhms: 10_000 };
    const wanted = outputLines(
      Float64Array.from(codes, (code) => volts[code]),
      8000,
      24,
      (hz) => stageGain(parts, hz),
    );
    const { re, im } = linesOf(output);
    for (const { multiple, amplitude } of wanted) {
      const actual = (2 * Math.hypot(re[multiple], im[multiple])) / output.length;
      // Samples of a curve with kinks fold what lies beyond: a few parts in 10⁴ of the span.
      expect(Math.abs(actual - amplitude)).toBeLessThan(1e-3);
    }
    expect(wanted[15].amplitude).toBe(0);
    expect(filterGain(filter, 1500)).toBeCloseTo(filter.kind === 'none' ? 1 : Math.SQRT1_2, 12);
  });
});
