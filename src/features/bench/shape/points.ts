import type { Point, PointsSource } from '../../../../shared/contract/index.ts';

/** Grid of a drag, in cycles and in units of full scale; a dragged point keeps that far from its neighbours. */
export const leastGap = 0.001;
const dragDigits = 3;
/** A smaller move is meant to be small, like that of a key by one entry of a long table: it takes a finer grid. */
const smallMove = 0.0015;
const fineDigits = 6;

const round = (value: number, digits: number) => Number(value.toFixed(digits)) + 0;

/** A drawn height, to a thousandth of the curve's own size: three places where its highest point is 1. */
function tidyY(points: readonly Point[], y: number): number {
  const size = points.reduce((most, point) => Math.max(most, Math.abs(point.y)), 0);
  const digits = size > 0 ? dragDigits - Math.ceil(Math.log10(size)) : dragDigits;
  return round(y, Math.min(15, Math.max(0, digits)));
}

/**
 * Where a point may be moved to: it stops just short of its neighbours, and x stays in 0 ≤ x < 1. Neighbours that stand
 * closer than the grid leave it a place between them all the same.
 */
export function boundedX(points: readonly Point[], index: number, x: number): number {
  const isSmall = Math.abs(x - points[index].x) < smallMove;
  const digits = isSmall ? fineDigits : dragDigits;
  const gap = 10 ** -digits;
  const before = index > 0 ? points[index - 1].x : -Infinity;
  const after = index < points.length - 1 ? points[index + 1].x : 1;
  const least = index > 0 ? round(before + gap, digits) : 0;
  const most = round(after - gap, digits);
  const held = round(Math.min(most, Math.max(least, x)), digits);
  if (held > before && held < after && held >= 0) return held;
  const halfway = (Math.max(0, before) + after) / 2;
  return halfway > before && halfway < after ? halfway : points[index].x;
}

export function movePoint(source: PointsSource, index: number, x: number, y: number): PointsSource {
  const point = { x: boundedX(source.points, index, x), y: tidyY(source.points, y) };
  return { ...source, points: source.points.with(index, point) };
}

/** Adds a point where x falls; where a point stands there already it is moved to y instead. */
export function addPoint(source: PointsSource, x: number, y: number): PointsSource {
  const place = Math.min(1 - leastGap, Math.max(0, round(x, dragDigits)));
  const at = source.points.findIndex((point) => point.x >= place);
  if (at >= 0 && source.points[at].x === place) return setPoint(source, at, { y: tidyY(source.points, y) });
  return {
    ...source,
    points: source.points.toSpliced(at < 0 ? source.points.length : at, 0, {
      x: place,
      y: tidyY(source.points, y),
    }),
  };
}

/**
 * Adds a point halfway between a point and the next, on the straight line between the two; after the last one halfway
 * to the cycle's end, towards the first, where the curve closes. Two points with no number between them keep as close.
 */
export function insertAfter(source: PointsSource, index: number): PointsSource {
  const here = source.points[index];
  const next = source.points[index + 1] ?? endOfCycle(source);
  const isBetween = (x: number) => x > here.x && x < next.x;
  const x = [round((here.x + next.x) / 2, fineDigits), (here.x + next.x) / 2].find(isBetween);
  if (x === undefined) return source;
  return {
    ...source,
    points: source.points.toSpliced(index + 1, 0, { x, y: round((here.y + next.y) / 2, fineDigits) }),
  };
}

/** Where the straight line from the last point to the first one, a cycle on, passes x = 1. */
function endOfCycle({ points }: PointsSource): Point {
  const [first, last] = [points[0], points[points.length - 1]];
  return { x: 1, y: last.y + ((first.y - last.y) * (1 - last.x)) / (1 + first.x - last.x) };
}

export function removePoint(source: PointsSource, index: number): PointsSource {
  return { ...source, points: source.points.toSpliced(index, 1) };
}

export function setPoint(
  source: PointsSource,
  index: number,
  part: { x?: number; y?: number },
): PointsSource {
  return { ...source, points: source.points.with(index, { ...source.points[index], ...part }) };
}

/** Whether sorting would put the points right: some stand out of order and none on the same x. */
export function canBePutInOrder({ points }: PointsSource): boolean {
  const isOrdered = points.every(({ x }, index) => index === 0 || x > points[index - 1].x);
  return !isOrdered && new Set(points.map(({ x }) => x)).size === points.length;
}

export function putPointsInOrder(source: PointsSource): PointsSource {
  return { ...source, points: source.points.toSorted((one, other) => one.x - other.x) };
}
