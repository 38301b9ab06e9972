import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { linesOf } from '../../shared/dft/index.ts';
import { valuesOf } from '../engine/support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

const length = 65_536;
const bits = 8;
const top = 2 ** bits - 1;

/** Signals in code positions, two codes away from either end, so that nothing clips. */
const signals: Record<string, (k: number) => number> = {
  'a full sine': (k) => top / 2 + (top / 2 - 2) * Math.sin((2 * Math.PI * 7 * k) / length),
  'a sine of 0.7 LSB': (k) => 100.3 + 0.7 * Math.sin((2 * Math.PI * 31 * k) / length),
  'a ramp': (k) => 2 + ((top - 4) * k) / (length - 1),
  'a level on a code': () => 77,
  'a level between two codes': () => 77.5,
  'a level a quarter above a code': () => 77.25,
};
const tableOf = (position: (k: number) => number, table: Table) =>
  buildTable(
    valuesOf(
      Array.from({ length }, (_, k) => position(k) / top),
      { bits, range: 'unipolar', ...table },
    ),
  );
const powerOf = (position: (k: number) => number, table: Table) =>
  tableOf(position, table).report.rmsErrorLsb ** 2;

// Source: S. P. Lipshitz, R. A. Wannamaker & J. Vanderkooy, "Quantization and dither: a theoretical survey", J. Audio
// Eng. Soc. 40 (1992): with triangular dither of two LSB the total error has the power LSB²/4 whatever the signal;
// with rectangular dither of one LSB it is f·(1 − f)·LSB², f the signal's place between two codes: LSB²/6 on average.
// Bounds are five standard errors of the mean of 65,536 squares.
describe('dither (Lipshitz, Wannamaker & Vanderkooy 1992)', () => {
  it.each(Object.keys(signals))('triangular: %s has a total error of LSB²/4', (name) => {
    for (const seed of [1, 2026]) {
      const { report } = tableOf(signals[name], { dither: 'triangular', seed });
      expect(report.clippedCodes).toBe(0);
      expect(Math.abs(report.rmsErrorLsb ** 2 - 1 / 4)).toBeLessThan((5 * 0.36) / Math.sqrt(length));
      expect(Math.abs(report.meanErrorLsb)).toBeLessThan((5 * 0.5) / Math.sqrt(length));
    }
  });

  it('rectangular: the total error goes from 0 on a code to LSB²/4 between two', () => {
    for (let place = 0; place <= 1; place += 1 / 16) {
      const power = powerOf(() => 77 + place, { dither: 'rectangular', seed: 5 });
      expect(Math.abs(power - place * (1 - place))).toBeLessThan((5 * 0.25) / Math.sqrt(length));
    }
    expect(powerOf(() => 77, { dither: 'rectangular' })).toBe(0);
  });

  it.each(['a full sine', 'a ramp'])('rectangular: %s, which is at all places alike, has LSB²/6', (name) => {
    const power = powerOf(signals[name], { dither: 'rectangular', seed: 9 });
    // A sine lingers at its crests: it is at all places alike to about a hundredth.
    expect(Math.abs(power - 1 / 6)).toBeLessThan(0.004);
  });

  it('none: the same has LSB²/12', () => {
    expect(Math.abs(powerOf(signals['a ramp'], {}) - 1 / 12)).toBeLessThan(0.001);
  });
});

// Source: B. Hutchins, "Calculating the bit-saving achieved with noise-shaping", Electronotes Application Note 363
// (2006): with H(z) = (1 − z⁻¹)^L the error's density is multiplied by |2·sin(ω/2)|^(2L); up to π/R its power is about
// π^(2L)/((2L + 1)·R^(2L+1)) of the whole: −30.9 dB for L = 1, −47.3 dB for L = 2 at R = 16. R. Schreier & G. C. Temes,
// "Understanding Delta-Sigma Data Converters" (2005), have the same (remembered).
describe('noise shaping at an oversampling of 16', () => {
  const ratio = 16;
  const edge = Math.PI / ratio;
  /** The integral of |2·sin(ω/2)|^(2L) up to π/R, over π, as it is: 4·sin² is 2 − 2·cos. */
  const exactShare = {
    1: (2 * edge - 2 * Math.sin(edge)) / Math.PI,
    2: (6 * edge - 8 * Math.sin(edge) + Math.sin(2 * edge)) / Math.PI,
  };
  const inBandPower = (table: Table) => {
    const { values, cycle, report } = tableOf(
      (k) =>
        top / 2 +
        90 * Math.sin((2 * Math.PI * 331 * k) / length) +
        7 * Math.cos((2 * Math.PI * 53 * k) / length),
      table,
    );
    expect(report.clippedCodes).toBe(0);
    // Order 2 does not close at the loop's seam: Hann's window keeps what that adds out of the band.
    const windowed = values.map((q, k) => (q - cycle[k]) * top * (1 - Math.cos((2 * Math.PI * k) / length)));
    const { re, im } = linesOf(windowed);
    let power = 0;
    for (let k = 1; k <= length / 2 / ratio; k += 1) power += re[k] ** 2 + im[k] ** 2;
    // Both sides of the spectrum, and the window's own power of 3/2.
    return (2 * power) / (1.5 * length ** 2);
  };
  const decibels = (power: number) => 10 * Math.log10(power);

  it('the approximation of the note is near the integral', () => {
    for (const order of [1, 2] as const) {
      const told = Math.PI ** (2 * order) / ((2 * order + 1) * ratio ** (2 * order + 1));
      expect(decibels(exactShare[order]) - decibels(told)).toBeCloseTo(0, 1);
    }
    expect(decibels(exactShare[1])).toBeCloseTo(-30.9, 0);
    expect(decibels(exactShare[2])).toBeCloseTo(-47.3, 0);
  });

  // The power of what is shaped: the total error of each dither, as above.
  it.each([
    [1, 'none', 1 / 12],
    [1, 'rectangular', 1 / 6],
    [1, 'triangular', 1 / 4],
    [2, 'none', 1 / 12],
    [2, 'rectangular', 1 / 6],
    [2, 'triangular', 1 / 4],
  ] as const)('of order %i with dither %s leaves its share in the band', (shaping, dither, shaped) => {
    const level = decibels(inBandPower({ shaping, dither, seed: 3 }) / shaped);
    expect(Math.abs(level - decibels(exactShare[shaping]))).toBeLessThan(0.6);
  });

  it('without shaping, the band has its sixteenth', () => {
    const level = decibels(inBandPower({ dither: 'triangular', seed: 3 }) / (1 / 4));
    expect(Math.abs(level - decibels(1 / ratio))).toBeLessThan(0.6);
  });
});
