import { transformOf, type Lines } from '../../shared/dft/index.ts';
import type { LoopPlan } from './loop-plan.ts';

const taps = 8;
const pointsOfPeriod = 16;
const smallestGrid = 64;

/**
 * Renders a loop of a table, band-limited: the trigonometric polynomial through its N entries without its mean,
 *
 *     y(φ) = Σ_{1 ≤ m ≤ H} (2/N)·Re(X_m·e^(2πimφ)),   H = min(⌊N/2⌋, plan.highestLine),
 *
 * the line at N/2 with half that weight. With every line kept it passes through the entries themselves.
 *
 * Method: one round is laid on a grid of at least 16 points to each period of line H by an inverse FFT; frame i, at
 * phase `i·rounds/frames`, is read from the grid by Lagrange interpolation through 8 points. Error: with ω = 2π/16 a
 * grid step at most, the remainder term is at most `ω⁸·(½·³⁄₂·⁵⁄₂·⁷⁄₂)²/8!` = 6·10⁻⁷ of a line's amplitude (−124 dB).
 *
 * @param lines DFT of the entries, unscaled
 * @param tableLength N, the number of entries
 * @returns one loop of `plan.frames` frames; full scale of the table is 1
 */
export function renderLoop(lines: Lines, tableLength: number, plan: LoopPlan): Float32Array<ArrayBuffer> {
  const loop = new Float32Array(plan.frames);
  const highest = Math.min(Math.floor(tableLength / 2), plan.highestLine);
  if (highest === 0) return loop;
  readGrid(loop, roundOnGrid(lines, tableLength, highest), plan);
  return loop;
}

/** One round on a power-of-two grid, with `taps` entries repeated past its end for the interpolation. */
function roundOnGrid(lines: Lines, tableLength: number, highest: number): Float64Array {
  let size = smallestGrid;
  while (size < pointsOfPeriod * highest) size *= 2;
  // The forward transform of the conjugate lines is the conjugate of the inverse transform: same real part.
  const data = new Float64Array(2 * size);
  for (let m = 1; m <= highest; m += 1) {
    const weight = (2 * m === tableLength ? 1 : 2) / tableLength;
    data[2 * m] = weight * lines.re[m];
    data[2 * m + 1] = -weight * lines.im[m];
  }
  const out = new Float64Array(2 * size);
  transformOf(size).forward(out, data);
  const grid = new Float64Array(size + taps);
  for (let j = 0; j < grid.length; j += 1) grid[j] = out[2 * (j % size)];
  return grid;
}

function readGrid(loop: Float32Array, grid: Float64Array, { frames, rounds }: LoopPlan): void {
  const size = grid.length - taps;
  for (let i = 0; i < frames; i += 1) {
    // Whole numbers up to the division, so that the phase of the last frame is as good as that of the first.
    const position = (((i * rounds) % frames) / frames) * size;
    const before = Math.floor(position);
    // Read three points earlier, so that the position lies in the middle of the eight.
    const first = before < 3 ? before - 3 + size : before - 3;
    loop[i] = lagrange8(grid, first, position - before + 3);
  }
}

/** Value at `u` (3 ≤ u < 4) of the polynomial through `grid[first + 0 … 7]`. */
function lagrange8(grid: Float64Array, first: number, u: number): number {
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
