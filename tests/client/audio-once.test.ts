import { describe, expect, test } from 'vitest';
import { onceFadeSeconds, renderOnce } from '../../src/audio/render-once.ts';

/** Amplitude of a sine in the middle half of a pass, away from its fades, under a window of sin⁸: leakage below −120 dB. */
function amplitudeOf(frames: Float32Array, cyclesPerFrame: number): number {
  const first = Math.floor(frames.length / 4);
  const span = Math.floor(frames.length / 2);
  let [re, im, weight] = [0, 0, 0];
  for (let i = 0; i < span; i += 1) {
    const window = Math.sin((Math.PI * (i + 0.5)) / span) ** 8;
    re += window * frames[first + i] * Math.cos(2 * Math.PI * cyclesPerFrame * i);
    im += window * frames[first + i] * Math.sin(2 * Math.PI * cyclesPerFrame * i);
    weight += window;
  }
  return (2 * Math.hypot(re, im)) / weight;
}

const dB = (ratio: number) => 20 * Math.log10(ratio);

function sine(length: number, cyclesPerEntry: number): Float64Array {
  return Float64Array.from({ length }, (_, k) => Math.sin(2 * Math.PI * cyclesPerEntry * k + 0.3));
}

describe('one pass, converted to the context’s rate', () => {
  const upward = [
    [8_000, 48_000],
    [22_050, 44_100],
    [44_100, 48_000],
    [11_111, 48_000],
  ];
  test.each(upward)('%i Hz to %i Hz: flat to 0.44 of the lower rate, images 90 dB down', (from, to) => {
    for (const fraction of [0.01, 0.1, 0.25, 0.4, 0.44]) {
      const pass = renderOnce(sine(6_000, fraction), from, to);
      const wanted = amplitudeOf(pass, (fraction * from) / to);
      expect(Math.abs(dB(wanted)), `${fraction} of the rate`).toBeLessThan(0.01);
      const imageHz = (1 - fraction) * from;
      if (imageHz < to / 2) expect(dB(amplitudeOf(pass, imageHz / to))).toBeLessThan(-90);
    }
  });

  test('96 kHz to 48 kHz: what lies above half of the lower rate is not folded back', () => {
    for (const hz of [27_000, 30_000, 44_000]) {
      const pass = renderOnce(sine(12_000, hz / 96_000), 96_000, 48_000);
      expect(dB(amplitudeOf(pass, (48_000 - hz) / 48_000)), `${hz} Hz`).toBeLessThan(-90);
    }
    for (const hz of [100, 5_000, 20_000]) {
      const pass = renderOnce(sine(12_000, hz / 96_000), 96_000, 48_000);
      expect(Math.abs(dB(amplitudeOf(pass, hz / 48_000)))).toBeLessThan(0.01);
    }
  });

  test('a constant is silence, and the pass begins and ends in silence', () => {
    expect(
      renderOnce(new Float64Array(100).fill(0.8), 8_000, 48_000).every((value) => Math.abs(value) < 1e-7),
    ).toBe(true);
    const pass = renderOnce(sine(4_000, 0.05), 8_000, 48_000);
    for (const edge of [pass[0], pass[1], pass[pass.length - 1], pass[pass.length - 2]]) {
      expect(Math.abs(edge)).toBeLessThan(1e-3);
    }
  });

  test('the fade is 50 ms, or a tenth of a short pass', () => {
    expect(onceFadeSeconds(3)).toBe(0.05);
    expect(onceFadeSeconds(0.032)).toBeCloseTo(0.0032, 12);
  });
});
