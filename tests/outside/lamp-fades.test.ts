import { expect, it, describe } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { fade, lightnessOf } from '../../shared/fades/index.ts';
import { waveOf } from '../engine/support/waves.ts';
import { askPython } from './numpy/python.ts';

// Source: CIE 15:2004, "Colorimetry", 8.2.1, CIE 1976 lightness; its formula on NumPy, numpy/lightness.py. It has
// 24389/27 = 903.296… where the engine specification has the rounded 903.3 of older editions, and (24/116)³ where it
// has L* 8: the two part by less than 0.0001 of lightness.
describe('CIE 1976 lightness', () => {
  const length = 401;
  const luminance = [0, 0.001, 0.004, 0.008, 0.0088, 0.0089, 0.01, 0.02, 0.05, 0.1, 0.184, 0.3, 0.5, 0.8, 1];
  const lightness = Array.from({ length }, (_, k) => (100 * k) / (length - 1));
  const answer = askPython<Record<'lightness' | 'luminance', number[]>>('lightness.py', {
    luminance,
    lightness,
  });

  it.each(luminance.map((y, i) => [y, i] as const))('of luminance %d', (y, i) => {
    expect(Math.abs(lightnessOf(y) - answer.lightness[i])).toBeLessThan(1e-4);
  });

  it('makes a perceptual fade the luminances of even lightness, and its codes theirs', () => {
    const { source, level } = fade({ shape: 'perceptual', way: 'up', length });
    for (const bits of [8, 12]) {
      const { cycle, codes } = buildTable(
        waveOf({ source, level, table: { length, bits, range: 'unipolar' } }),
      );
      const top = 2 ** bits - 1;
      answer.luminance.forEach((y, k) => {
        expect(Math.abs(cycle[k] - y)).toBeLessThan(1e-6);
        expect(Math.abs(codes[k] - y * top)).toBeLessThan(0.5 + 1e-6 * top);
      });
    }
  });
});
