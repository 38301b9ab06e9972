import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { linesOf } from '../../shared/dft/index.ts';
import { planLoop } from '../../src/audio/loop-plan.ts';
import { renderLoop } from '../../src/audio/render-loop.ts';
import { sampleRateOfTone, toneOfSampleRate } from '../../src/audio/playback-rate.ts';

/** Amplitude of the sine that goes round `rounds` times in the frames, by the sum as it is written. */
function amplitudeAt(frames: Float32Array, rounds: number): number {
  let re = 0;
  let im = 0;
  for (let i = 0; i < frames.length; i += 1) {
    const angle = (2 * Math.PI * ((i * rounds) % frames.length)) / frames.length;
    re += frames[i] * Math.cos(angle);
    im += frames[i] * Math.sin(angle);
  }
  return (2 * Math.hypot(re, im)) / frames.length;
}

const power = (frames: Float32Array) => frames.reduce((sum, value) => sum + value * value, 0) / frames.length;

/** Signed entries from a linear congruence, so that a failing case can be written down. */
function roughTable(length: number, seed: number): Float64Array {
  let state = seed;
  return Float64Array.from({ length }, () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return state / 1_073_741_824 - 1;
  });
}

const wholeContexts = fc.constantFrom(44_100, 48_000, 96_000);

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

describe('plan of a loop', () => {
  test('the pitch is within 0.04 cent for every rate a browser plays at', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1 / 60, max: 20_000, noNaN: true }),
        wholeContexts,
        (loopHz, contextRateHz) => {
          const plan = planLoop(loopHz, contextRateHz);
          expect(Math.abs(1200 * Math.log2(plan.loopHz / loopHz))).toBeLessThan(0.04);
          expect(Number.isInteger(plan.frames) && Number.isInteger(plan.rounds)).toBe(true);
          // Below half of the rate, in whole numbers; the next line is not.
          expect(2 * plan.highestLine * plan.rounds).toBeLessThan(plan.frames);
          expect(2 * (plan.highestLine + 1) * plan.rounds).toBeGreaterThanOrEqual(plan.frames);
        },
      ),
      { seed: 21, numRuns: 500 },
    );
  });

  test('common tones are met exactly', () => {
    expect(planLoop(440, 48_000)).toEqual({ frames: 24_000, rounds: 220, loopHz: 440, highestLine: 54 });
    expect(planLoop(220, 44_100).loopHz).toBe(220);
  });
});

describe('rendering of a loop', () => {
  test.each([
    [96, 187.3, 48_000],
    [97, 187.3, 48_000],
    [256, 61.7, 44_100],
    [1_000, 1.37, 44_100],
    [2_048, 7.3, 96_000],
  ])(
    '%i entries, %f rounds a second at %i Hz: each frame is the sum of the table’s lines to 3·10⁻⁶',
    (length, loopHz, rate) => {
      const table = roughTable(length, 7);
      const lines = linesOf(table);
      const plan = planLoop(loopHz, rate);
      const loop = renderLoop(lines, length, plan);
      let worst = 0;
      for (let i = 0; i < plan.frames; i += 211) {
        const phase = ((i * plan.rounds) % plan.frames) / plan.frames;
        let sum = 0;
        for (let m = 1; m <= Math.min(Math.floor(length / 2), plan.highestLine); m += 1) {
          const weight = (2 * m === length ? 1 : 2) / length;
          sum +=
            weight *
            (lines.re[m] * Math.cos(2 * Math.PI * m * phase) -
              lines.im[m] * Math.sin(2 * Math.PI * m * phase));
        }
        worst = Math.max(worst, Math.abs(loop[i] - sum));
      }
      expect(worst).toBeLessThan(3e-6);
    },
  );

  test('a tone above half of the context’s rate is left out, the ones below keep their level', () => {
    // 16 entries at 4 kHz a round: lines at 4, 8, 12, 16, 20 kHz fit, 24 kHz and above do not.
    const table = roughTable(16, 3);
    const lines = linesOf(table);
    const plan = planLoop(4_000, 48_000);
    expect(plan.highestLine).toBe(5);
    const loop = renderLoop(lines, 16, plan);
    let kept = 0;
    for (let m = 1; m <= 5; m += 1) {
      const amplitude = Math.hypot(lines.re[m], lines.im[m]) / 8;
      expect(amplitudeAt(loop, m * plan.rounds)).toBeCloseTo(amplitude, 6);
      kept += amplitude ** 2 / 2;
    }
    expect(power(loop)).toBeCloseTo(kept, 6);
  });

  test('with every line kept it passes through the entries, less their mean', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 200 }), fc.integer({ min: 1, max: 1e6 }), (length, seed) => {
        const table = roughTable(length, seed);
        const mean = table.reduce((sum, value) => sum + value, 0) / length;
        // Four frames an entry: frame 4k is entry k.
        const plan = { frames: 4 * length, rounds: 1, loopHz: 1, highestLine: 2 * length - 1 };
        const loop = renderLoop(linesOf(table), length, plan);
        for (let k = 0; k < length; k += 1) expect(loop[4 * k]).toBeCloseTo(table[k] - mean, 5);
      }),
      { seed: 4, numRuns: 60 },
    );
  });

  test('the mean is gone and the end of the loop meets its start', () => {
    const table = Float64Array.from({ length: 256 }, (_, k) => 0.7 + 0.3 * Math.sin((2 * Math.PI * k) / 256));
    const plan = planLoop(311.13, 44_100);
    const loop = renderLoop(linesOf(table), 256, plan);
    const mean = loop.reduce((sum, value) => sum + value, 0) / loop.length;
    expect(Math.abs(mean)).toBeLessThan(1e-6);
    const largestStep = loop.reduce(
      (step, value, i) => Math.max(step, Math.abs(value - loop[(i + 1) % loop.length])),
      0,
    );
    expect(largestStep).toBeLessThan(0.3 * 2 * Math.PI * (311.13 / 44_100) * 1.001);
  });
});
