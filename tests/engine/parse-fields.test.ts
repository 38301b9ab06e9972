import { describe, expect, it } from 'vitest';
import { partialWith, pointsWith, problemsWith, sineWith } from './support/refusals.ts';
import { sineSource, waveOf } from './support/waves.ts';

// Each field of a definition with everything it does not take.

const noNumbers = [NaN, Infinity, -Infinity, JSON.parse('1e999') as number, '8', null, true, [], {}];
const wholeNumber = (min: number, max: number) => `a whole number from ${min} to ${max}`;

describe('one field at fault', () => {
  const faults: [path: string, input: (value: unknown) => unknown, values: unknown[], allowed: string][] = [
    ['schema', (v) => sineWith('schema', v), [0, 2, '1', null, 1e300], '1'],
    [
      'name',
      (v) => sineWith('name', v),
      ['', 'x'.repeat(65), 'x'.repeat(1_000_000), 7, null],
      '1 to 64 characters',
    ],
    [
      'name',
      (v) => sineWith('name', v),
      ['fog \ud83d', '\udf2b signal'],
      'whole characters, no half of a surrogate pair',
    ],
    [
      'table.length',
      (v) => sineWith('table.length', v),
      [1, 0, -5, 65_537, 1e300, -1e300, 2.5, ...noNumbers],
      wholeNumber(2, 65_536),
    ],
    [
      'table.bits',
      (v) => sineWith('table.bits', v),
      [0, 17, -1, 7.5, 1e18, ...noNumbers],
      wholeNumber(1, 16),
    ],
    ['table.cycles', (v) => sineWith('table.cycles', v), [0, 65, -1, 1.5, ...noNumbers], wholeNumber(1, 64)],
    [
      'table.seed',
      (v) => sineWith('table.seed', v),
      [-1, 2 ** 32, 0.5, ...noNumbers],
      wholeNumber(0, 4_294_967_295),
    ],
    [
      'table.startPhaseDeg',
      (v) => sineWith('table.startPhaseDeg', v),
      [360, -0.001, 1e300, ...noNumbers],
      'a number of degrees from 0 up to, not including, 360',
    ],
    [
      'level.level',
      (v) => sineWith('level.level', v),
      [1.001, -0.001, 1e300, ...noNumbers],
      'a number from 0 to 1',
    ],
    ['level.removeMean', (v) => sineWith('level.removeMean', v), [0, 'yes', null], 'true or false'],
    ['table.complement', (v) => sineWith('table.complement', v), [1, 'no', null], 'true or false'],
    [
      'level.normalise',
      (v) => sineWith('level.normalise', v),
      ['rms', 1, null],
      'one of "none", "peak", "span"',
    ],
    ['table.sampleAt', (v) => sineWith('table.sampleAt', v), ['end', 0], 'one of "start", "centre"'],
    ['table.range', (v) => sineWith('table.range', v), ['both', 0], 'one of "bipolar", "unipolar"'],
    ['table.scale', (v) => sineWith('table.scale', v), ['mid-rise', 0], 'one of "full-span", "mid-tread"'],
    [
      'table.rounding',
      (v) => sineWith('table.rounding', v),
      ['up', 0],
      'one of "half-up", "half-even", "down"',
    ],
    [
      'table.dither',
      (v) => sineWith('table.dither', v),
      ['white', true],
      'one of "none", "rectangular", "triangular"',
    ],
    [
      'table.shaping',
      (v) => sineWith('table.shaping', v),
      [3, -1, 0.5, '1', NaN],
      'error-feedback order 0, 1 or 2',
    ],
    [
      'table.coding',
      (v) => sineWith('table.coding', v),
      ['gray', 0],
      'one of "offset-binary", "twos-complement"',
    ],
    ['table.fold', (v) => sineWith('table.fold', v), ['half', true], 'one of "none", "quarter"'],
    [
      'level.transfer.gamma',
      (v) => ({ ...waveOf({ table: { range: 'unipolar' } }), level: { transfer: { gamma: v } } }),
      [0.09, 10.1, -1, 1e300],
      'a number from 0.1 to 10',
    ],
    [
      'source.partials[0].harmonic',
      (v) => partialWith('harmonic', v),
      [0, -1, 32_769, 1.5, ...noNumbers],
      wholeNumber(1, 32_768),
    ],
    ['source.partials[0].amplitude', (v) => partialWith('amplitude', v), noNumbers, 'a finite number'],
    ['source.partials[0].phaseDeg', (v) => partialWith('phaseDeg', v), noNumbers, 'a finite number'],
    [
      'source.offset',
      (v) => ({ ...waveOf(), source: { ...sineSource, offset: v } }),
      noNumbers,
      'a finite number',
    ],
    [
      'source.points[1].x',
      (v) =>
        pointsWith([
          { x: 0, y: 0 },
          { x: v, y: 1 },
        ]),
      [1, -0.1, 1e300, ...noNumbers],
      'a number from 0 up to, not including, 1',
    ],
    [
      'source.points[1].y',
      (v) =>
        pointsWith([
          { x: 0, y: 0 },
          { x: 0.5, y: v },
        ]),
      noNumbers,
      'a finite number',
    ],
    [
      'source.interpolation',
      (v) =>
        pointsWith(
          [
            { x: 0, y: 0 },
            { x: 0.5, y: 1 },
          ],
          v,
        ),
      ['cubic', null, 3],
      'one of "step", "linear", "monotone", "spline"',
    ],
    [
      'source.values[1]',
      (v) => ({ ...waveOf(), source: { kind: 'samples', resampling: 'hold', values: [0, v] } }),
      noNumbers,
      'a finite number',
    ],
    [
      'source.resampling',
      (v) => ({ ...waveOf(), source: { kind: 'samples', resampling: v, values: [0, 1] } }),
      ['cubic', null],
      'one of "bandlimited", "linear", "hold"',
    ],
    [
      'source.kind',
      (v) => ({ ...waveOf(), source: { kind: v } }),
      ['noise', undefined, 3, '__proto__'],
      'a source of kind "harmonics", "points", "samples" or "mix"',
    ],
    [
      'source.parts[0].gain',
      (v) => ({
        ...waveOf(),
        source: { kind: 'mix', operation: 'sum', parts: [{ gain: v, source: sineSource }] },
      }),
      noNumbers,
      'a finite number',
    ],
    [
      'source.operation',
      (v) => ({
        ...waveOf(),
        source: { kind: 'mix', operation: v, parts: [{ gain: 1, source: sineSource }] },
      }),
      ['max', null],
      'one of "sum", "product"',
    ],
    [
      'table.levels[1]',
      (v) => waveOf({ table: { bits: 1, levels: [0, v as number] } }),
      noNumbers,
      'a finite number',
    ],
  ];

  it.each(faults)('%s is named with its value and what is allowed', (path, input, values, allowed) => {
    for (const value of values) {
      const problems = problemsWith(input(value));
      expect(problems).toEqual([{ path, value: expect.any(String) as string, allowed }]);
      const [{ value: shown }] = problems;
      if (typeof value === 'number') expect(shown).toBe(String(value));
      expect(shown.length).toBeLessThan(80);
    }
  });
});
