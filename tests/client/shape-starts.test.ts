import { describe, expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { limits, parseDefinition, type Source } from '../../shared/contract/index.ts';
import { standardShapes, synthesise } from '../../shared/waveform/index.ts';
import { harmonicsOf, pointsAlong } from '../../src/features/bench/shape/convert.ts';
import { sayInWords } from '../../src/features/bench/shape/source-words.ts';
import {
  highestHeld,
  pointStarts,
  pointsStart,
  sameHarmonics,
  shapeSource,
  shapes,
} from '../../src/features/bench/shape/starts.ts';

const define = (source: Source, table: object = {}) =>
  parseDefinition({ schema: 1, name: 'a', source, level: { normalise: 'none' }, table });

describe('standard shapes', () => {
  test.each(shapes)('%s: allowed up to the most partials, without terms of nothing', (shape) => {
    for (const highest of [1, 15, 127, highestHeld(shape), 32_767]) {
      const source = shapeSource(shape, { highest, duty: 0.5 });
      expect(source.partials.length).toBeLessThanOrEqual(limits.partials.max);
      expect(source.partials.length).toBeGreaterThan(0);
      expect(source.partials.every(({ amplitude }) => Math.abs(amplitude) > 1e-12)).toBe(true);
      define(source);
    }
  });

  test('a pulse of half duty is the square', () => {
    const cycle = (source: Source) => synthesise(define(source)).cycle;
    const [pulse, square] = [
      cycle(shapeSource('pulse', { highest: 31, duty: 0.5 })),
      cycle(standardShapes.square(31)),
    ];
    pulse.forEach((value, k) => expect(value).toBeCloseTo(square[k], 12));
  });

  test('a wave is known again only while no partial has changed', () => {
    const saw = shapeSource('sawtooth', { highest: 9, duty: 0.5 });
    expect(sameHarmonics(saw, shapeSource('sawtooth', { highest: 9, duty: 0.1 }))).toBe(true);
    expect(sameHarmonics(saw, shapeSource('sawtooth', { highest: 10, duty: 0.5 }))).toBe(false);
    expect(sameHarmonics(saw, { ...saw, offset: 0.1 })).toBe(false);
    expect(
      sameHarmonics(saw, { ...saw, partials: saw.partials.with(2, { ...saw.partials[2], phaseDeg: 1 }) }),
    ).toBe(false);
  });
});

describe('curves to start from', () => {
  const frames = [
    { range: 'bipolar', tableLength: 256, cycles: 1 },
    { range: 'unipolar', tableLength: 180, cycles: 1 },
    { range: 'bipolar', tableLength: 4_096, cycles: 3 },
    { range: 'bipolar', tableLength: 5, cycles: 2 },
  ] as const;
  test.each(frames)(
    '$range, $tableLength entries, $cycles cycles: each is a wave over the whole range',
    (frame) => {
      for (const start of pointStarts) {
        const source = pointsStart(start, frame);
        const { codes, report } = buildTable({
          schema: 1,
          name: 'a',
          source,
          level: { normalise: 'none' },
          table: { length: frame.tableLength, cycles: frame.cycles, range: frame.range },
        });
        expect(codes).toHaveLength(frame.tableLength);
        // A handful of entries may miss a corner.
        if (frame.tableLength > 100) expect([report.minCode, report.maxCode], start).toEqual([0, 255]);
      }
    },
  );

  test('a ramp of one cycle rises from the lowest to the highest code, entry by entry', () => {
    const source = pointsStart('ramp', { range: 'unipolar', tableLength: 256, cycles: 1 });
    const { codes } = buildTable({
      schema: 1,
      name: 'a',
      source,
      level: { normalise: 'none' },
      table: { range: 'unipolar' },
    });
    expect([...codes]).toEqual(Array.from({ length: 256 }, (_, k) => k));
  });
});

describe('going over to the other kind', () => {
  test('points start on the wave of the harmonics', () => {
    const source = pointsAlong({
      kind: 'harmonics',
      offset: 0.1,
      partials: [{ harmonic: 1, amplitude: 0.8, phaseDeg: 30 }],
    });
    expect(source.points).toHaveLength(16);
    source.points.forEach(({ x, y }) =>
      expect(y).toBeCloseTo(0.1 + 0.8 * Math.sin(2 * Math.PI * x + Math.PI / 6), 3),
    );
    define(source);
  });

  test('harmonics start on the curve of the points: a spline through a sine is that sine', () => {
    const points = Array.from({ length: 16 }, (_, i) => ({
      x: i / 16,
      y: 0.7 * Math.sin((2 * Math.PI * i) / 16 + 1),
    }));
    const source = harmonicsOf({ kind: 'points', interpolation: 'spline', points, bandlimit: false }, 127);
    expect(source.partials[0]).toMatchObject({ harmonic: 1 });
    expect(source.partials[0].amplitude).toBeCloseTo(0.7, 2);
    expect(source.partials[0].phaseDeg).toBeCloseTo((180 / Math.PI) * 1, 0);
    expect(source.offset).toBeCloseTo(0, 3);
    expect(source.partials.slice(1).every(({ amplitude }) => amplitude < 0.01)).toBe(true);
  });

  test('a step curve gives the Fourier series of the square, as far as the table holds it', () => {
    const source = harmonicsOf({ kind: 'points', interpolation: 'step', points: [{ x: 0, y: 1 }, { x: 0.5, y: -1 }], bandlimit: false }, 7); // prettier-ignore
    expect(source.partials.map(({ harmonic }) => harmonic)).toEqual([1, 3, 5, 7]);
    source.partials.forEach(({ harmonic, amplitude }) =>
      expect(amplitude).toBeCloseTo(4 / (Math.PI * harmonic), 3),
    );
  });
});

test('a wave of any kind is told in words', () => {
  const tone: Source = {
    kind: 'harmonics',
    offset: 0,
    partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }],
  };
  const mix: Source = {
    kind: 'mix',
    operation: 'sum',
    parts: [
      { gain: 1, source: tone },
      { gain: 0.5, source: { kind: 'samples', values: [1, 2, 3], resampling: 'hold' } },
    ],
  };
  expect(sayInWords(mix)).toBe('the sum of 1 partial; 0.5 × 3 samples, resampled by holding each one');
});
