import { describe, expect, it } from 'vitest';
import { checkDefinition, parseDefinition, Refusal } from '../../shared/contract/index.ts';
import { anyDefinition } from './support/definitions.ts';
import { examplesOf } from './support/seeded.ts';
import { partialWith, pointsWith, problemsWith, sineWith } from './support/refusals.ts';
import { sineSource, valuesOf, waveOf } from './support/waves.ts';

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

describe('a refusal', () => {
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
    expect(
      problemsWith({ ...waveOf(), source: { kind: 'harmonics', partials: [{}] } }).map(({ path }) => path),
    ).toEqual(['source.partials[0].harmonic', 'source.partials[0].amplitude', 'source.partials[0].phaseDeg']);
  });

  const mix = (part: object, own: object = {}) => ({
    ...waveOf(),
    source: { kind: 'mix', operation: 'sum', parts: [part], ...own },
  });
  it.each([
    ['colour', { ...waveOf(), colour: 'red' }],
    ['level.colour', sineWith('level.colour', 1)],
    [
      'level.transfer.colour',
      { ...waveOf({ table: { range: 'unipolar' } }), level: { transfer: { gamma: 2, colour: 1 } } },
    ],
    ['table.colour', sineWith('table.colour', 1)],
    ['source.colour', { ...waveOf(), source: { ...sineSource, colour: 1 } }],
    ['source.partials[0].colour', partialWith('colour', 1)],
    [
      'source.points[0].colour',
      pointsWith([
        { x: 0, y: 0, colour: 1 },
        { x: 0.5, y: 1 },
      ]),
    ],
    [
      'source.colour',
      { ...waveOf(), source: { kind: 'samples', resampling: 'hold', values: [0, 1], colour: 1 } },
    ],
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
