import { transformOf } from '../dft/index.ts';
import { highestOf, type RoundLines } from './lines.ts';

/** Points of a grid that repeat past its end, so that eight neighbours can be read anywhere without a test. */
export const guardPoints = 8;
const pointsOfPeriod = 16;
const smallestGrid = 64;

/** One round of a wave on evenly spaced points: `size` of them (a power of two), then `guardPoints` of the next round. */
export interface RoundGrid {
  readonly grid: Float32Array<ArrayBuffer>;
  readonly size: number;
}

/** Points that `roundOnGrid` takes for a wave of so many lines. */
export function gridSizeFor(highest: number): number {
  let size = smallestGrid;
  while (size < pointsOfPeriod * highest) size *= 2;
  return size;
}

/**
 * One round on a power-of-two grid of at least 16 points to each period of the highest line, by an inverse FFT.
 *
 * Read by `readRound` at any place, the polynomial's remainder term is at most `ω⁸·(½·³⁄₂·⁵⁄₂·⁷⁄₂)²/8!` = 6·10⁻⁷ of a
 * line's amplitude, with ω = 2π/16 a grid step (−124 dB); the points are rounded to 24 bits, which is less.
 */
export function roundOnGrid(lines: RoundLines): RoundGrid {
  const highest = highestOf(lines);
  const size = gridSizeFor(highest);
  // The forward transform of the conjugate lines is the conjugate of the inverse transform: same real part.
  const { data, out, forward } = transformOf(size);
  data.fill(0);
  for (let m = 1; m <= highest; m += 1) {
    data[2 * m] = lines.re[m];
    data[2 * m + 1] = -lines.im[m];
  }
  forward(out, data);
  const grid = new Float32Array(size + guardPoints);
  for (let j = 0; j < grid.length; j += 1) grid[j] = out[2 * (j % size)];
  return { grid, size };
}

/**
 * The wave at a phase: Lagrange's polynomial through the eight points of the grid about it.
 *
 * @param phase 0 ≤ phase < 1, in rounds
 */
export function readRound(grid: Float32Array, size: number, phase: number): number {
  const position = phase * size;
  const before = Math.floor(position);
  // Read three points earlier, so that the position lies in the middle of the eight.
  const first = before < 3 ? before - 3 + size : before - 3;
  return lagrange8(grid, first, position - before + 3);
}

/** Value at `u` (3 ≤ u < 4) of the polynomial through `grid[first + 0 … 7]`. */
export function lagrange8(grid: Float32Array | Float64Array, first: number, u: number): number {
  const a = u;
  const b = u - 1;
  const c = u - 2;
  const d = u - 3;
  const e = u - 4;
  const f = u - 5;
  const g = u - 6;
  const h = u - 7;
  const ab = a * b;
  const cd = c * d;
  const ef = e * f;
  const gh = g * h;
  const abcd = ab * cd;
  const efgh = ef * gh;
  return (
    (b * cd * efgh * grid[first]) / -5040 +
    (a * cd * efgh * grid[first + 1]) / 720 +
    (ab * d * efgh * grid[first + 2]) / -240 +
    (ab * c * efgh * grid[first + 3]) / 144 +
    (abcd * f * gh * grid[first + 4]) / -144 +
    (abcd * e * gh * grid[first + 5]) / 240 +
    (abcd * ef * h * grid[first + 6]) / -720 +
    (abcd * ef * g * grid[first + 7]) / 5040
  );
}
