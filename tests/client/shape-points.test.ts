import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { checkDefinition, type PointsSource, type Source } from '../../shared/contract/index.ts';
import {
  addPoint,
  boundedX,
  canBePutInOrder,
  insertAfter,
  leastGap,
  movePoint,
  putPointsInOrder,
} from '../../src/features/bench/shape/points.ts';
import { pointsOverlay } from '../../src/features/bench/shape/points-overlay.ts';

const curve = (points: readonly (readonly [number, number])[]): PointsSource => ({
  kind: 'points',
  interpolation: 'linear',
  points: points.map(([x, y]) => ({ x, y })),
  bandlimit: false,
});

const isAllowed = (source: Source) => 'definition' in checkDefinition({ schema: 1, name: 'a', source });

/** Curves whose points stand anywhere in order, some of them closer than a drag's grid. */
const anyCurve = fc
  .uniqueArray(fc.double({ min: 0, max: 0.999_999, noNaN: true }), { minLength: 2, maxLength: 20 })
  .map((xs) =>
    curve(
      xs
        .map((x) => x + 0)
        .sort((one, other) => one - other)
        .map((x, i) => [x, i % 2]),
    ),
  );

describe('moving a point', () => {
  test('it stops just short of its neighbours', () => {
    const { points } = curve([
      [0, 0],
      [0.4, 1],
      [0.6, 0],
    ]);
    expect(boundedX(points, 1, 0.9)).toBe(0.599);
    expect(boundedX(points, 1, -3)).toBe(leastGap);
    expect(boundedX(points, 0, -1)).toBe(0);
    expect(boundedX(points, 2, 5)).toBe(0.999);
    expect(boundedX(points, 1, 0.512_34)).toBe(0.512);
    // One entry of a table of 65,536, as an arrow key moves it.
    expect(boundedX(points, 1, 0.4 + 1 / 65_536)).toBe(0.400_015);
  });

  test('heights keep three places of the curve’s own size', () => {
    const flat = (size: number) => curve([[0, 0], [0.5, size]]); // prettier-ignore
    expect(movePoint(flat(1), 0, 0, 0.123_456).points[0].y).toBe(0.123);
    expect(movePoint(flat(0.001), 0, 0, 0.000_123_456).points[0].y).toBe(0.000_123);
    expect(movePoint(flat(100), 0, 0, 12.3456).points[0].y).toBe(12.3);
  });

  test('wherever it is dragged to, the points keep their order and the wave stays allowed', () => {
    fc.assert(
      fc.property(
        anyCurve,
        fc.nat(),
        fc.double({ min: -2, max: 2, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (source, which, x, y) => {
          const index = which % source.points.length;
          const moved = movePoint(source, index, x, y);
          moved.points.forEach((point, i) => {
            if (i > 0) expect(point.x).toBeGreaterThan(moved.points[i - 1].x);
            if (i !== index) expect(point).toBe(source.points[i]);
          });
          expect(isAllowed(moved)).toBe(true);
        },
      ),
      { seed: 31, numRuns: 500 },
    );
  });
});

describe('adding a point', () => {
  test('it takes its place in order; on top of another it moves that one', () => {
    const source = curve([
      [0, 0],
      [0.5, 1],
    ]);
    expect(addPoint(source, 0.25, 0.2).points.map(({ x }) => x)).toEqual([0, 0.25, 0.5]);
    expect(addPoint(source, 0.9, 0.2).points.map(({ x }) => x)).toEqual([0, 0.5, 0.9]);
    expect(addPoint(source, 0.5, 0.2).points).toEqual([
      { x: 0, y: 0 },
      { x: 0.5, y: 0.2 },
    ]);
    expect(addPoint(source, 1.3, 0.2).points.at(-1)).toEqual({ x: 0.999, y: 0.2 });
  });

  test('between two it lies halfway on the line; after the last, halfway to the end of the cycle', () => {
    const source = curve([
      [0.2, 0],
      [0.6, 1],
    ]);
    expect(insertAfter(source, 0).points[1]).toEqual({ x: 0.4, y: 0.5 });
    // From (0.6, 1) the curve closes to (1.2, 0): it passes 0.8 at 2/3.
    expect(insertAfter(source, 1).points[2]).toEqual({ x: 0.8, y: 0.666667 });
  });

  test('wherever it is inserted the wave stays allowed', () => {
    fc.assert(
      fc.property(anyCurve, fc.nat(), (source, which) => {
        expect(isAllowed(insertAfter(source, which % source.points.length))).toBe(true);
      }),
      { seed: 32, numRuns: 300 },
    );
  });
});

describe('order', () => {
  test('is offered where sorting mends it, and not where two points share an x', () => {
    const mixed = curve([
      [0.5, 1],
      [0.2, 0],
    ]);
    expect(canBePutInOrder(mixed)).toBe(true);
    expect(isAllowed(putPointsInOrder(mixed))).toBe(true);
    expect(
      canBePutInOrder(
        curve([
          [0.5, 1],
          [0.5, 0],
        ]),
      ),
    ).toBe(false);
  });
});

describe('points on the drawing', () => {
  const source = curve([
    [0, 0],
    [0.5, 1],
    [0.8, 0],
  ]);
  const changes: { next: Source; coalesce: string | undefined }[] = [];
  const note = (next: Source, how?: { coalesce?: string }) => changes.push({ next, coalesce: how?.coalesce });

  test('other kinds have none', () => {
    expect(pointsOverlay({ kind: 'harmonics', offset: 0, partials: [] }, note)).toEqual({});
  });

  test('a drag goes through the scale of the drawing and names its step', () => {
    const overlay = pointsOverlay(source, note, { toPlot: (y) => y / 2, fromPlot: (y) => y * 2 });
    expect(overlay.points?.map(({ y }) => y)).toEqual([0, 0.5, 0]);
    overlay.onPointMove?.(1, 0.6, 0.25);
    expect(changes.pop()).toEqual({ next: movePoint(source, 1, 0.6, 0.5), coalesce: 'drag:point:1' });
  });

  test('the fewest points that a curve needs stay', () => {
    pointsOverlay(curve([[0, 0], [0.5, 1]]), note).onPointRemove?.(0); // prettier-ignore
    pointsOverlay({ ...source, interpolation: 'spline' }, note).onPointRemove?.(0);
    expect(changes).toHaveLength(0);
    pointsOverlay(source, note).onPointRemove?.(0);
    expect(changes.pop()?.next).toMatchObject({ points: [{ x: 0.5 }, { x: 0.8 }] });
  });
});
