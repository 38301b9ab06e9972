import { describe, expect, it } from 'vitest';
import { parseDefinition, type HarmonicsSource } from '../../shared/contract/index.ts';
import { standardShapes, synthesise } from '../../shared/waveform/index.ts';
import { waveOf } from './support/waves.ts';

const length = 20_000;

function cycleOf(source: HarmonicsSource): Float64Array {
  return synthesise(parseDefinition(waveOf({ source, table: { length, sampleAt: 'centre' } }))).cycle;
}

/** Root of the mean square between a series and its shape. */
function distance(source: HarmonicsSource, shape: (t: number) => number): number {
  const sum = cycleOf(source).reduce(
    (total, value, k) => total + (value - shape((k + 0.5) / length)) ** 2,
    0,
  );
  return Math.sqrt(sum / length);
}

const square = (t: number) => (t < 0.5 ? 1 : -1);
const sawtooth = (t: number) => (t < 0.5 ? 2 * t : 2 * t - 2);
const triangle = (t: number) => (t < 0.25 ? 4 * t : t < 0.75 ? 2 - 4 * t : 4 * t - 4);
const pulse = (duty: number) => (t: number) => (t < duty ? 1 : -1);

describe('standard shapes', () => {
  it.each<[string, (partials: number) => HarmonicsSource, (t: number) => number, number]>([
    ['triangle', standardShapes.triangle, triangle, 1.5],
    ['sawtooth', standardShapes.sawtooth, sawtooth, 0.5],
    ['square', standardShapes.square, square, 0.5],
    ['pulse of a tenth', (partials) => standardShapes.pulse(partials, 0.1), pulse(0.1), 0.5],
    ['pulse of two thirds', (partials) => standardShapes.pulse(partials, 2 / 3), pulse(2 / 3), 0.5],
  ])('%s converges to its shape', (_name, series, shape, order) => {
    // The rest of a series falls as P^−½ where the shape jumps, as P^−1½ where only its slope does.
    const [coarse, fine] = [distance(series(40), shape), distance(series(640), shape)];
    expect(coarse).toBeLessThan(0.2);
    expect(fine).toBeLessThan(1.3 * coarse * 16 ** -order);
  });

  it('sine is one partial', () => {
    expect(distance(standardShapes.sine(), (t) => Math.sin(2 * Math.PI * t))).toBeLessThan(1e-14);
  });

  it('hold partials up to the number asked for, each once', () => {
    for (const [name, source] of Object.entries({
      triangle: standardShapes.triangle(9),
      square: standardShapes.square(9),
      sawtooth: standardShapes.sawtooth(9),
      pulse: standardShapes.pulse(9, 0.3),
    })) {
      const harmonics = source.partials.map(({ harmonic }) => harmonic);
      expect(harmonics, name).toEqual(
        name === 'triangle' || name === 'square' ? [1, 3, 5, 7, 9] : [1, 2, 3, 4, 5, 6, 7, 8, 9],
      );
    }
  });

  it('a pulse of one half is a square', () => {
    const [a, b] = [cycleOf(standardShapes.pulse(31, 0.5)), cycleOf(standardShapes.square(31))];
    a.forEach((value, k) => Math.abs(value - b[k]) < 1e-12 || expect(value).toBe(b[k]));
  });
});
