import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { linesOf } from '../../shared/dft/index.ts';
import { strongestLines } from '../../src/audio/strongest-lines.ts';

const frames = 16_384;
const rateHz = 48_000;
const binHz = rateHz / frames;

interface Tone {
  hz: number;
  amplitude: number;
  phase: number;
}

/** Levels as the Web Audio specification has AnalyserNode compute them: Blackman window, α = 0.16, magnitude over N. */
function analyserLevels(tones: readonly Tone[]): Float32Array {
  const wave = Float64Array.from({ length: frames }, (_, i) => {
    const turn = (2 * Math.PI * i) / frames;
    const window = 0.42 - 0.5 * Math.cos(turn) + 0.08 * Math.cos(2 * turn);
    return (
      window *
      tones.reduce(
        (sum, { hz, amplitude, phase }) =>
          sum + amplitude * Math.sin((2 * Math.PI * hz * i) / rateHz + phase),
        0,
      )
    );
  });
  const { re, im } = linesOf(wave);
  return Float32Array.from(
    { length: frames / 2 },
    (_, k) => 20 * Math.log10(Math.hypot(re[k], im[k]) / frames),
  );
}

describe('the strongest lines of what sounds', () => {
  test('five partials are found within 0.1 dB and 0.3 Hz, wherever they lie between two bins', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 60, max: 2_000, noNaN: true }),
        fc.array(fc.double({ min: 0.01, max: 0.3, noNaN: true }), { minLength: 5, maxLength: 5 }),
        (toneHz, amplitudes) => {
          const tones = amplitudes.map((amplitude, i) => ({ hz: (i + 1) * toneHz, amplitude, phase: i }));
          const found = strongestLines(analyserLevels(tones), binHz, 5, new Float64Array(frames / 2));
          const expected = [...tones].sort((a, b) => b.amplitude - a.amplitude);
          expect(found).toHaveLength(5);
          expected.forEach(({ amplitude, hz }, rank) => {
            expect(Math.abs(20 * Math.log10(found[rank].amplitude / amplitude))).toBeLessThan(0.1);
            const near = found.find((line) => Math.abs(line.hz - hz) < 0.3);
            expect(near).toBeDefined();
          });
        },
      ),
      { seed: 9, numRuns: 25 },
    );
  });

  test('a single sine is one line, not its window’s side lobes', () => {
    const levels = analyserLevels([{ hz: 997.3, amplitude: 0.126, phase: 1 }]);
    const found = strongestLines(levels, binHz, 5, new Float64Array(frames / 2));
    expect(found).toHaveLength(1);
    expect(found[0].hz).toBeCloseTo(997.3, 1);
  });

  test('silence has no lines', () => {
    const levels = new Float32Array(frames / 2).fill(-Infinity);
    expect(strongestLines(levels, binHz, 5, new Float64Array(frames / 2))).toEqual([]);
  });
});
