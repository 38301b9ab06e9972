import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { HarmonicsSource } from '../../shared/contract/index.ts';
import { standardShapes } from '../../shared/waveform/index.ts';
import { valuesOf, waveOf } from '../engine/support/waves.ts';
import { askPython } from './numpy/python.ts';

// Source: W. R. Bennett, "Spectra of quantized signals", Bell System Technical Journal 27 (1948): the error of a
// fine quantiser is uniform, LSB²/12, so a full-scale sine has 6.02·b + 1.76 dB. It asks for errors that do not
// repeat: the lengths are primes.
describe('a full-span sine (Bennett 1948)', () => {
  it.each([1009, 4093, 10_007, 65_521])(
    'of %i entries has 6.02·b + 1.76 dB within 0.5 dB, b = 4…16',
    (length) => {
      for (let bits = 4; bits <= 16; bits += 1) {
        const { report } = buildTable(waveOf({ table: { length, bits } }));
        expect(report.idealSnrDb).toBeCloseTo(6.02 * bits + 1.76, 12);
        expect(Math.abs(Number(report.snrDb) - (6.02 * bits + 1.76)), `${bits} bits`).toBeLessThan(0.5);
      }
    },
  );
});

// Source: CRC Standard Mathematical Tables, "Fourier series for common functions"; the coefficients themselves
// come from integrating the ideal shapes with SciPy's quad.
describe('standard shapes (CRC Standard Mathematical Tables)', () => {
  const harmonics = 40;
  const shapes: { shape: string; duty?: number; source: HarmonicsSource }[] = [
    { shape: 'triangle', source: standardShapes.triangle(harmonics) },
    { shape: 'sawtooth', source: standardShapes.sawtooth(harmonics) },
    { shape: 'square', source: standardShapes.square(harmonics) },
    ...[0.5, 0.25, 0.1, 1 / 3, 0.9].map((duty) => ({
      shape: 'pulse',
      duty,
      source: standardShapes.pulse(harmonics, duty),
    })),
  ];
  const integrals = askPython<{ mean: number; cosines: number[]; sines: number[] }[]>(
    'shapes.py',
    shapes.map(({ shape, duty }) => ({ shape, harmonics, duty })),
  );

  it.each(shapes.map(({ shape, duty }, i) => [shape, duty ?? '', i] as const))(
    '%s %s',
    (_shape, _duty, i) => {
      const { mean, cosines, sines } = integrals[i];
      const { offset = 0, partials } = shapes[i].source;
      expect(offset).toBeCloseTo(mean, 9);
      for (let n = 1; n <= harmonics; n += 1) {
        const partial = partials.find(({ harmonic }) => harmonic === n) ?? { amplitude: 0, phaseDeg: 0 };
        const phase = (partial.phaseDeg * Math.PI) / 180;
        expect(partial.amplitude * Math.sin(phase)).toBeCloseTo(cosines[n - 1], 8);
        expect(partial.amplitude * Math.cos(phase)).toBeCloseTo(sines[n - 1], 8);
      }
    },
  );
});

describe('scales of converters (common practice, no source)', () => {
  it('full-span takes −1 to code 0 and +1 to the top code', () => {
    for (let bits = 1; bits <= 16; bits += 1) {
      expect(Array.from(buildTable(valuesOf([-1, 1], { bits })).codes)).toEqual([0, 2 ** bits - 1]);
    }
  });

  it('a 1-bit sine sampled at the centres is a square wave', () => {
    for (const length of [3, 10, 97, 256, 1000]) {
      const { codes } = buildTable(waveOf({ table: { bits: 1, length, sampleAt: 'centre' } }));
      expect(Array.from(codes)).toEqual(Array.from({ length }, (_, k) => (2 * k + 1 <= length ? 1 : 0)));
    }
  });

  it('b bits make 2^b levels', () => {
    for (const bits of [1, 2, 8, 14]) {
      const ramp = Array.from({ length: 4 * 2 ** bits }, (_, k) => k / (4 * 2 ** bits - 1));
      const { report } = buildTable(valuesOf(ramp, { bits, range: 'unipolar' }));
      expect(report.usedCodes).toBe(2 ** bits);
    }
  });
});

describe('CIE 1976 lightness to luminance', () => {
  it.each([
    // Source: documentation of colour-science 0.4.3, `colour.colorimetry.luminance_CIE1976`, after CIE 15:2004.
    [41.527875844653451, 12.1972253],
    // Source: documentation of colour-science 0.3.11, `colour.colorimetry.lightness_CIE1976`.
    [37.985629, 10.08],
    // A remembered value: the mid grey of L* 50 reflects 18.42 %.
    [50, 18.4187],
    // CIE 15:2004, 8.2.1: Y/Yn = 1 is L* 100, 0 is 0.
    [100, 100],
    [0, 0],
  ])('L* %d is Y %d', (lightness, luminance) => {
    const values = [lightness / 100, 0, 1];
    const { cycle } = buildTable(
      valuesOf(values, { range: 'unipolar' }, { normalise: 'none', transfer: 'cie-lightness' }),
    );
    expect(100 * cycle[0]).toBeCloseTo(luminance, 4);
  });
});
