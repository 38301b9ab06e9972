import type { Point, PointsSource } from '../contract/index.ts';

/** A curve through points that closes on itself at x = 1; takes phases 0 ≤ t < 1. */
export type ClosedCurve = (t: number) => number;

/** Hermite form of one piece: value and slope at both ends. */
interface CubicPieces {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly width: Float64Array;
  readonly slope: Float64Array;
}

/** The points with the first one again at `x₀ + 1`. */
function closed(points: readonly Point[]): { x: Float64Array; y: Float64Array; width: Float64Array } {
  const count = points.length;
  const x = new Float64Array(count + 1);
  const y = new Float64Array(count + 1);
  points.forEach((point, i) => {
    x[i] = point.x;
    y[i] = point.y;
  });
  x[count] = points[0].x + 1;
  y[count] = points[0].y;
  const width = new Float64Array(count);
  for (let i = 0; i < count; i += 1) width[i] = x[i + 1] - x[i];
  return { x, y, width };
}

/** Index of the piece that holds `t`, where `x[0] ≤ t < x[last]`. */
function pieceAt(x: Float64Array, t: number): number {
  let low = 0;
  let high = x.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (x[middle] <= t) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Curve through the points of a source in its own interpolation. */
export function closedCurve({
  points,
  interpolation,
}: Pick<PointsSource, 'points' | 'interpolation'>): ClosedCurve {
  const { x, y, width } = closed(points);
  const within = (t: number) => (t < x[0] ? t + 1 : t);
  switch (interpolation) {
    case 'step':
      return (t) => y[pieceAt(x, within(t))];
    case 'linear':
      return (t) => {
        const at = within(t);
        const i = pieceAt(x, at);
        return y[i] + ((y[i + 1] - y[i]) * (at - x[i])) / width[i];
      };
    case 'monotone': {
      const pieces = { x, y, width, slope: monotoneSlopes(y, width) };
      return (t) => cubicAt(pieces, within(t));
    }
    case 'spline': {
      const pieces = { x, y, width, slope: splineSlopes(y, width) };
      return (t) => cubicAt(pieces, within(t));
    }
  }
}

function cubicAt({ x, y, width, slope }: CubicPieces, t: number): number {
  const i = pieceAt(x, t);
  const h = width[i];
  const s = (t - x[i]) / h;
  const rise = (y[i + 1] - y[i]) / h;
  const start = slope[i];
  const end = slope[i + 1];
  return y[i] + h * s * (start + s * (3 * rise - 2 * start - end + s * (start + end - 2 * rise)));
}

/**
 * Slopes of the periodic PCHIP cubic: the weighted harmonic mean of the neighbouring rises, 0 where they
 * differ in sign or one is 0 (F. N. Fritsch & J. Butland, SIAM J. Sci. Stat. Comput. 5, 1984).
 */
function monotoneSlopes(y: Float64Array, width: Float64Array): Float64Array {
  const count = width.length;
  const slope = new Float64Array(count + 1);
  for (let i = 0; i < count; i += 1) {
    const before = (i + count - 1) % count;
    const hBefore = width[before];
    const h = width[i];
    const riseBefore = (y[before + 1] - y[before]) / hBefore;
    const rise = (y[i + 1] - y[i]) / h;
    // By sign, not by product, which is 0 for two small rises.
    if (Math.sign(riseBefore) === Math.sign(rise) && rise !== 0) {
      const w1 = 2 * h + hBefore;
      const w2 = h + 2 * hBefore;
      slope[i] = (w1 + w2) / (w1 / riseBefore + w2 / rise);
    }
  }
  slope[count] = slope[0];
  return slope;
}

/**
 * Slopes of the periodic cubic spline, C² across the seam. For each point
 * `s_{i−1}/h_{i−1} + 2·s_i·(1/h_{i−1} + 1/h_i) + s_{i+1}/h_i = 3·(d_{i−1}/h_{i−1} + d_i/h_i)`, d the rises:
 * a cyclic tridiagonal system, diagonally dominant, solved by Sherman and Morrison's correction of the
 * tridiagonal one.
 */
function splineSlopes(y: Float64Array, width: Float64Array): Float64Array {
  const count = width.length;
  const lower = new Float64Array(count);
  const diagonal = new Float64Array(count);
  const upper = new Float64Array(count);
  const right = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    const before = (i + count - 1) % count;
    lower[i] = 1 / width[before];
    upper[i] = 1 / width[i];
    diagonal[i] = 2 * (lower[i] + upper[i]);
    const riseBefore = (y[before + 1] - y[before]) / width[before];
    const rise = (y[i + 1] - y[i]) / width[i];
    right[i] = 3 * (riseBefore * lower[i] + rise * upper[i]);
  }
  // Corner entries: lower[0] couples the first row to the last point, upper[last] the last row to the first.
  const topRight = lower[0];
  const bottomLeft = upper[count - 1];
  const gamma = -diagonal[0];
  const cornered = Float64Array.from(diagonal);
  cornered[0] -= gamma;
  cornered[count - 1] -= (topRight * bottomLeft) / gamma;
  const corner = new Float64Array(count);
  corner[0] = gamma;
  corner[count - 1] = bottomLeft;

  const base = solveTridiagonal(lower, cornered, upper, right);
  const correction = solveTridiagonal(lower, cornered, upper, corner);
  const factor =
    (base[0] + (topRight * base[count - 1]) / gamma) /
    (1 + correction[0] + (topRight * correction[count - 1]) / gamma);

  const slope = new Float64Array(count + 1);
  for (let i = 0; i < count; i += 1) slope[i] = base[i] - factor * correction[i];
  slope[count] = slope[0];
  return slope;
}

/** Thomas's elimination; the corners `lower[0]` and `upper[last]` are not looked at. */
function solveTridiagonal(
  lower: Float64Array,
  diagonal: Float64Array,
  upper: Float64Array,
  right: Float64Array,
): Float64Array {
  const count = diagonal.length;
  const scaledUpper = new Float64Array(count);
  const solution = new Float64Array(count);
  let pivot = diagonal[0];
  solution[0] = right[0] / pivot;
  for (let i = 1; i < count; i += 1) {
    scaledUpper[i - 1] = upper[i - 1] / pivot;
    pivot = diagonal[i] - lower[i] * scaledUpper[i - 1];
    solution[i] = (right[i] - lower[i] * solution[i - 1]) / pivot;
  }
  for (let i = count - 2; i >= 0; i -= 1) solution[i] -= scaledUpper[i] * solution[i + 1];
  return solution;
}
