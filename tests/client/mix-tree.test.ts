import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { checkDefinition, limits, type Source } from '../../shared/contract/index.ts';
import { asMix } from '../../src/features/bench/shape/as-mix.ts';
import { sourceOfKind } from '../../src/features/bench/shape/convert-any.ts';
import {
  addPart,
  depthOf,
  duplicatePart,
  movePart,
  nearestPlace,
  noDepthFor,
  noRoomFor,
  pathOf,
  placesIn,
  removePart,
  setGain,
  setOperation,
  setSource,
  sourceAt,
  wrap,
} from '../../src/features/bench/shape/mix/mix-tree.ts';
import { problemsUnder } from '../../src/features/bench/shape/source-path.ts';
import { shapeSource } from '../../src/features/bench/shape/starts.ts';

const sine = shapeSource('sine', { highest: 1, duty: 0.5 });
const square = shapeSource('square', { highest: 9, duty: 0.5 });
const codesOf = (source: Source) => buildTable({ schema: 1, name: 'a', source }).codes;
const check = (source: Source) => checkDefinition({ schema: 1, name: 'a', source });

describe('a mix', () => {
  it('of one wave gives the same codes as the wave, and the part alone is that wave again', () => {
    const mix = asMix(square);
    expect(codesOf(mix)).toEqual(codesOf(square));
    expect(sourceAt(mix, [0])).toBe(square);
  });

  it('takes a part more, moves it, copies it and lets it go, others untouched', () => {
    const two = addPart(asMix(square), []);
    expect(placesIn(two)).toEqual([[0], [1]]);
    const moved = movePart(two, [1], -1);
    expect(sourceAt(moved, [1])).toBe(square);
    expect(movePart(moved, [0], -1)).toEqual(moved);
    const three = duplicatePart(moved, [1]);
    expect([sourceAt(three, [1]), sourceAt(three, [2])]).toEqual([square, square]);
    expect(removePart(removePart(three, [2]), [0])).toEqual(asMix(square));
  });

  it('changes deep inside without touching what stands beside', () => {
    let source: Source = wrap(addPart(asMix(square), []), [1]);
    source = addPart(source, [1]);
    source = setGain(source, [1, 1], 0.25);
    source = setOperation(source, [1], 'product');
    source = setSource(source, [1, 0], sine);
    expect(sourceAt(source, [0])).toBe(square);
    expect(sourceAt(source, [1])).toMatchObject({
      operation: 'product',
      parts: [{ source: sine }, { gain: 0.25 }],
    });
    expect(pathOf([1, 0])).toBe('source.parts[1].source.parts[0].source');
    expect(check(source)).toHaveProperty('definition');
  });

  it('says when it is full just where the definition would be refused', () => {
    let source: Source = asMix(sine);
    while (noRoomFor(source, []) === undefined) source = addPart(source, []);
    expect(source).toHaveProperty('parts.length', limits.mixParts.max);
    expect(check(source)).toHaveProperty('definition');
    expect(check(addPart(source, []))).toHaveProperty('problems');
  });

  it('says when it is too deep just where the definition would be refused', () => {
    let source: Source = asMix(sine);
    let place = [0];
    while (noDepthFor(source, place) === undefined) {
      source = wrap(source, place);
      place = [...place, 0];
    }
    expect(depthOf(source)).toBe(limits.mixDepth);
    expect(check(source)).toHaveProperty('definition');
    expect(check(wrap(source, place))).toHaveProperty('problems');
  });

  it('goes to the nearest part where undo took the chosen one away', () => {
    const source = addPart(asMix(square), []);
    expect(nearestPlace(source, [1, 3])).toEqual([1]);
    expect(nearestPlace(asMix(square), [4])).toEqual([0]);
    expect(nearestPlace(square, [4])).toEqual([]);
  });

  it('hands a part the problems of its own source, as if there were no other', () => {
    const problem = (path: string) => ({ path, value: '1', allowed: '2' });
    const all = [
      'source.parts[1].source.offset',
      'source.parts[10].source.offset',
      'source.parts[1].gain',
    ].map(problem);
    expect(problemsUnder(all, pathOf([1]))).toEqual([problem('source.offset')]);
    expect(problemsUnder(all, 'source')).toEqual(all);
  });
});

describe('going over to another kind', () => {
  const kinds = ['harmonics', 'points', 'samples', 'mix'] as const;
  const mix = addPart(asMix(square), []);
  const from = [
    square,
    sourceOfKind('points', square, 100, true),
    sourceOfKind('samples', square, 100, true),
    mix,
  ];
  it.each(kinds)('%s: is a source that builds, along the curve', (kind) => {
    for (const now of from) {
      const next = sourceOfKind(kind, now, 100, true);
      expect(next.kind).toBe(kind);
      const [was, is] = [codesOf(now), codesOf(next)];
      const off = was.reduce((sum, code, k) => sum + Math.abs(code - is[k]), 0) / was.length;
      expect(off).toBeLessThan(40);
    }
  });
});
