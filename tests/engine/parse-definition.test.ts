import { describe, expect, it } from 'vitest';
import { checkDefinition, parseDefinition, Refusal, type Problem } from '../../shared/contract/index.ts';
import { anyDefinition } from './support/definitions.ts';
import { examplesOf } from './support/seeded.ts';
import { sineSource, valuesOf, waveOf } from './support/waves.ts';

/** What is wrong with an input; a definition that is taken fails the test. */
function problemsWith(input: unknown): readonly Problem[] {
  const checked = checkDefinition(input);
  if ('definition' in checked) throw new Error(`taken: ${JSON.stringify(input).slice(0, 200)}`);
  return checked.problems;
}

/** The definition of a sine with one field set, by its path, to anything at all. */
function sineWith(path: string, value: unknown): unknown {
  const definition = structuredClone(waveOf({ level: {}, table: {} })) as Record<string, unknown>;
  const steps = path.split('.');
  const last = steps.pop() as string;
  const parent = steps.reduce((here, step) => here[step] as Record<string, unknown>, definition);
  parent[last] = value;
  return definition;
}

const partialWith = (field: string, value: unknown) => ({
  schema: 1,
  name: 'wave',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0, [field]: value }] },
});
const pointsWith = (points: unknown, interpolation: unknown = 'linear') => ({
  schema: 1,
  name: 'wave',
  source: { kind: 'points', interpolation, points },
});

describe('defaults', () => {
  it('fill in everything that §1 gives a default', () => {
    expect(parseDefinition({ schema: 1, name: 'wave', source: sineSource })).toEqual({
      schema: 1,
      name: 'wave',
      source: { ...sineSource, offset: 0 },
      level: { removeMean: false, normalise: 'peak', level: 1, transfer: 'none' },
      table: {
        length: 256,
        bits: 8,
        cycles: 1,
        startPhaseDeg: 0,
        sampleAt: 'start',
        range: 'bipolar',
        scale: 'full-span',
        rounding: 'half-up',
        dither: 'none',
        seed: 1,
        shaping: 0,
        coding: 'offset-binary',
        complement: false,
        fold: 'none',
      },
    });
  });

  it('leave what was given alone', () => {
    for (const input of examplesOf(anyDefinition, 100)) {
      const parsed = parseDefinition(input);
      expect(parsed).toMatchObject(input);
      expect(parseDefinition(parsed)).toEqual(parsed);
    }
  });

  it('do not change what was passed in', () => {
    const input = Object.freeze({ schema: 1, name: 'wave', source: Object.freeze({ ...sineSource }) });
    expect(parseDefinition(input)).not.toBe(input);
  });
});

describe('bounds that belong to the range', () => {
  it.each([
    ['table.length', 2],
    ['table.length', 65_536],
    ['table.bits', 1],
    ['table.bits', 16],
    ['table.cycles', 64],
    ['table.seed', 0],
    ['table.seed', 4_294_967_295],
    ['table.startPhaseDeg', 0],
    ['table.startPhaseDeg', 359.999],
    ['level.level', 0],
    ['level.level', 1],
    ['name', 'x'],
    ['name', 'x'.repeat(64)],
  ])('%s: %s is taken', (path, value) => {
    expect(checkDefinition(sineWith(path, value))).toHaveProperty('definition');
  });

  it('a cycle of two entries is the shortest table', () => {
    expect(parseDefinition(valuesOf([1, -1])).table).toMatchObject({ length: 2, cycles: 1 });
  });
});

const noNumbers = [NaN, Infinity, -Infinity, JSON.parse('1e999') as number, '8', null, true, [], {}];
const wholeNumber = (min: number, max: number) => `a whole number from ${min} to ${max}`;

describe('one field at fault', () => {
  const faults: [path: string, input: (value: unknown) => unknown, values: unknown[], allowed: string][] = [
    ['schema', (v) => sineWith('schema', v), [0, 2, '1', null, 1e300], '1'],
    ['name', (v) => sineWith('name', v), ['', 'x'.repeat(65), 'x'.repeat(1_000_000), 7, null], '1 to 64 characters'],
    ['name', (v) => sineWith('name', v), ['fog \ud83d', '\udf2b signal'], 'whole characters, no half of a surrogate pair'],
    [
      'table.length',
      (v) => sineWith('table.length', v),
      [1, 0, -5, 65_537, 1e300, -1e300, 2.5, ...noNumbers],
      wholeNumber(2, 65_536),
    ],
    ['table.bits', (v) => sineWith('table.bits', v), [0, 17, -1, 7.5, 1e18, ...noNumbers], wholeNumber(1, 16)],
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
    ['level.level', (v) => sineWith('level.level', v), [1.001, -0.001, 1e300, ...noNumbers], 'a number from 0 to 1'],
    ['level.removeMean', (v) => sineWith('level.removeMean', v), [0, 'yes', null], 'true or false'],
    ['table.complement', (v) => sineWith('table.complement', v), [1, 'no', null], 'true or false'],
    ['level.normalise', (v) => sineWith('level.normalise', v), ['rms', 1, null], 'one of "none", "peak", "span"'],
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
    ['table.shaping', (v) => sineWith('table.shaping', v), [3, -1, 0.5, '1', NaN], 'error-feedback order 0, 1 or 2'],
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
    ['source.partials[0].harmonic', (v) => partialWith('harmonic', v), [0, -1, 32_769, 1.5, ...noNumbers], wholeNumber(1, 32_768)],
    ['source.partials[0].amplitude', (v) => partialWith('amplitude', v), noNumbers, 'a finite number'],
    ['source.partials[0].phaseDeg', (v) => partialWith('phaseDeg', v), noNumbers, 'a finite number'],
    ['source.offset', (v) => ({ ...waveOf(), source: { ...sineSource, offset: v } }), noNumbers, 'a finite number'],
    [
      'source.points[1].x',
      (v) => pointsWith([{ x: 0, y: 0 }, { x: v, y: 1 }]),
      [1, -0.1, 1e300, ...noNumbers],
      'a number from 0 up to, not including, 1',
    ],
    ['source.points[1].y', (v) => pointsWith([{ x: 0, y: 0 }, { x: 0.5, y: v }]), noNumbers, 'a finite number'],
    [
      'source.interpolation',
      (v) => pointsWith([{ x: 0, y: 0 }, { x: 0.5, y: 1 }], v),
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
      (v) => ({ ...waveOf(), source: { kind: 'mix', operation: 'sum', parts: [{ gain: v, source: sineSource }] } }),
      noNumbers,
      'a finite number',
    ],
    [
      'source.operation',
      (v) => ({ ...waveOf(), source: { kind: 'mix', operation: v, parts: [{ gain: 1, source: sineSource }] } }),
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

  it('says all that is wrong at once, a line each', () => {
    const input = { schema: 1, name: '', source: sineSource, table: { bits: 17, length: 1 } };
    expect(() => parseDefinition(input)).toThrow(Refusal);
    expect(() => parseDefinition(input)).toThrow(
      'name: "" is not allowed; allowed: 1 to 64 characters\n' +
        'table.length: 1 is not allowed; allowed: a whole number from 2 to 65536\n' +
        'table.bits: 17 is not allowed; allowed: a whole number from 1 to 16',
    );
  });

  it.each([null, undefined, 7, 'wave', true, [], [waveOf()]])('%s is no definition', (input) => {
    expect(problemsWith(input)).toMatchObject([{ path: 'definition', allowed: 'an object' }]);
  });
});

describe('fields that are not there', () => {
  it('required ones are asked for', () => {
    expect(problemsWith({}).map(({ path, value }) => [path, value])).toEqual([
      ['schema', 'nothing'],
      ['name', 'nothing'],
      ['source', 'nothing'],
    ]);
    expect(problemsWith({ ...waveOf(), source: { kind: 'harmonics', partials: [{}] } }).map(({ path }) => path)).toEqual([
      'source.partials[0].harmonic',
      'source.partials[0].amplitude',
      'source.partials[0].phaseDeg',
    ]);
  });

  const mix = (part: object, own: object = {}) => ({
    ...waveOf(),
    source: { kind: 'mix', operation: 'sum', parts: [part], ...own },
  });
  it.each([
    ['colour', { ...waveOf(), colour: 'red' }],
    ['level.colour', sineWith('level.colour', 1)],
    ['level.transfer.colour', { ...waveOf({ table: { range: 'unipolar' } }), level: { transfer: { gamma: 2, colour: 1 } } }],
    ['table.colour', sineWith('table.colour', 1)],
    ['source.colour', { ...waveOf(), source: { ...sineSource, colour: 1 } }],
    ['source.partials[0].colour', partialWith('colour', 1)],
    ['source.points[0].colour', pointsWith([{ x: 0, y: 0, colour: 1 }, { x: 0.5, y: 1 }])],
    ['source.colour', { ...waveOf(), source: { kind: 'samples', resampling: 'hold', values: [0, 1], colour: 1 } }],
    ['source.colour', mix({ gain: 1, source: sineSource }, { colour: 1 })],
    ['source.parts[0].colour', mix({ gain: 1, source: sineSource, colour: 1 })],
    ['source.parts[0].source.colour', mix({ gain: 1, source: { ...sineSource, colour: 1 } })],
    ['source.values', { ...waveOf(), source: { ...sineSource, values: [1] } }],
    ['constructor', { ...waveOf(), constructor: 1 }],
    ['toString', { ...waveOf(), toString: 1 }],
    ['__proto__', JSON.parse(`{"__proto__":{"bits":4},${JSON.stringify(waveOf()).slice(1)}`)],
    ['table.__proto__', { ...waveOf(), table: JSON.parse('{"__proto__":{"bits":4}}') as object }],
    ['["a b\\n"]', { ...waveOf(), 'a b\n': 1 }],
  ])('unknown %s is refused', (path, input) => {
    expect(problemsWith(input)).toMatchObject([{ path, allowed: 'no such field' }]);
    expect(({} as { bits?: number }).bits).toBeUndefined();
  });
});
