import { describe, expect, it } from 'vitest';
import { checkDefinition, type DefinitionInput, type SourceInput } from '../../shared/contract/index.ts';
import { sineSource, waveOf } from './support/waves.ts';

// Rules that look at several fields, and lists of the wrong length.

function pathsWrongIn(input: unknown): string[] {
  const checked = checkDefinition(input);
  if ('definition' in checked) return [];
  for (const { value, allowed } of checked.problems) expect([value, allowed]).not.toContain('');
  return checked.problems.map(({ path }) => path);
}

const partials = (count: number): SourceInput => ({
  kind: 'harmonics',
  partials: Array.from({ length: count }, (_, i) => ({ harmonic: i + 1, amplitude: 1, phaseDeg: 0 })),
});
const mixOf = (sources: SourceInput[]): SourceInput => ({
  kind: 'mix',
  operation: 'sum',
  parts: sources.map((source) => ({ gain: 1, source })),
});
const nested = (depth: number): SourceInput => (depth === 0 ? sineSource : mixOf([nested(depth - 1)]));

describe('lists', () => {
  const points = (count: number, interpolation: 'linear' | 'spline' = 'linear'): SourceInput => ({
    kind: 'points',
    interpolation,
    points: Array.from({ length: count }, (_, i) => ({ x: i / count, y: i % 2 })),
  });
  const samples = (count: number): SourceInput => ({
    kind: 'samples',
    resampling: 'hold',
    values: Array.from({ length: count }, (_, i) => i % 2),
  });
  it.each<[string, SourceInput, string[]]>([
    ['no partials', partials(0), ['source.partials']],
    ['4,096 partials', partials(4096), []],
    ['4,097 partials', partials(4097), ['source.partials']],
    ['5,000 partials', partials(5000), ['source.partials']],
    ['one point', points(1), ['source.points']],
    ['two points', points(2), []],
    ['two points for a spline', points(2, 'spline'), ['source.points']],
    ['three points for a spline', points(3, 'spline'), []],
    ['4,096 points', points(4096), []],
    ['4,097 points', points(4097), ['source.points']],
    ['one sample', samples(1), ['source.values']],
    ['65,536 samples', samples(65_536), []],
    ['65,537 samples', samples(65_537), ['source.values']],
    ['no parts', mixOf([]), ['source.parts']],
    ['16 parts', mixOf(Array.from({ length: 16 }, () => sineSource)), []],
    ['17 parts', mixOf(Array.from({ length: 17 }, () => sineSource)), ['source.parts']],
    ['mixes 4 deep', nested(4), []],
    ['mixes 5 deep', nested(5), ['source']],
    [
      '64 leaf sources',
      mixOf(Array.from({ length: 4 }, () => mixOf(Array.from({ length: 16 }, () => sineSource)))),
      [],
    ],
    [
      '65 leaf sources',
      mixOf([
        ...Array.from({ length: 4 }, () => mixOf(Array.from({ length: 16 }, () => sineSource))),
        sineSource,
      ]),
      ['source'],
    ],
    ['8,192 partials in all', mixOf([partials(4096), partials(4096)]), []],
    ['8,193 partials in all', mixOf([partials(4096), partials(4096), partials(1)]), ['source']],
  ])('%s', (_what, source, wrong) => {
    expect(pathsWrongIn(waveOf({ source, table: { length: 65_536 } }))).toEqual(wrong);
  });

  it.each([
    ['out of order', [0, 0.5, 0.4], ['source.points[2].x']],
    ['at one x', [0, 0.5, 0.5], ['source.points[2].x']],
    ['all in reverse', [0.9, 0.5, 0.1], ['source.points[1].x', 'source.points[2].x']],
  ])('points %s', (_what, places, wrong) => {
    const source = {
      kind: 'points' as const,
      interpolation: 'step' as const,
      points: places.map((x) => ({ x, y: x })),
    };
    expect(pathsWrongIn(waveOf({ source }))).toEqual(wrong);
  });
});

describe('fields that must agree', () => {
  type Table = NonNullable<DefinitionInput['table']>;
  const levels4 = [0, 1, 2, 3];
  const folded: Table = { fold: 'quarter', sampleAt: 'centre' };
  it.each<[string, Pick<DefinitionInput, 'table' | 'level'>, string[]]>([
    ['2K = N', { table: { length: 8, cycles: 4 } }, ['table.cycles']],
    ['2K > N', { table: { length: 7, cycles: 4 } }, ['table.cycles']],
    ['2K < N', { table: { length: 9, cycles: 4 } }, []],
    ['mid-tread, unipolar', { table: { scale: 'mid-tread', range: 'unipolar' } }, ['table.scale']],
    ['lightness, bipolar', { level: { transfer: 'cie-lightness' } }, ['level.transfer']],
    ['gamma, bipolar', { level: { transfer: { gamma: 2 } } }, ['level.transfer']],
    ['gamma, unipolar', { level: { transfer: { gamma: 2 } }, table: { range: 'unipolar' } }, []],
    ['a voltage a code', { table: { bits: 2, levels: levels4 } }, []],
    ['too few voltages', { table: { bits: 3, levels: levels4 } }, ['table.levels']],
    ['too many voltages', { table: { bits: 1, levels: levels4 } }, ['table.levels']],
    ['one voltage for all codes', { table: { bits: 2, levels: [2, 2, 2, 2] } }, ['table.levels']],
    [
      'voltages too far apart for a double',
      { table: { bits: 1, levels: [-1.7e308, 1.7e308] } },
      ['table.levels'],
    ],
    ['voltages too near for a double', { table: { bits: 1, levels: [0, 5e-324] } }, ['table.levels']],
    ['levels with dither', { table: { bits: 2, levels: levels4, dither: 'triangular' } }, ['table.dither']],
    ['levels with shaping', { table: { bits: 2, levels: levels4, shaping: 1 } }, ['table.shaping']],
    ['levels with mid-tread', { table: { bits: 2, levels: levels4, scale: 'mid-tread' } }, ['table.scale']],
    [
      'levels with half-even',
      { table: { bits: 2, levels: levels4, rounding: 'half-even' } },
      ['table.rounding'],
    ],
    ['levels with down', { table: { bits: 2, levels: levels4, rounding: 'down' } }, ['table.rounding']],
    ['a quarter, centred', { table: folded }, []],
    ['a quarter, half-even', { table: { ...folded, rounding: 'half-even' } }, []],
    ['a quarter from the start', { table: { fold: 'quarter' } }, ['table.sampleAt']],
    ['a quarter, mid-tread', { table: { ...folded, scale: 'mid-tread' } }, ['table.scale']],
    ['a quarter, down', { table: { ...folded, rounding: 'down' } }, ['table.rounding']],
    ['a quarter of two cycles', { table: { ...folded, cycles: 2 } }, ['table.cycles']],
    ['a quarter of 254', { table: { ...folded, length: 254 } }, ['table.length']],
  ])('%s', (_what, parts, wrong) => {
    expect(pathsWrongIn(waveOf(parts))).toEqual(wrong);
  });
});
