import { snapSteps } from './scaling.ts';
import type { Rounder } from './round.ts';

export interface ShapedCodes {
  readonly codes: Uint16Array;
  readonly clippedCodes: number;
  /** Whether a pass ended in the state it began with, so that the loop's seam shows no step. */
  readonly isClosed: boolean;
}

const passesAtMost = 8;

/**
 * Error feedback around the loop (§3.3): `u = v + feedback`, `p = round(u + dither)`, `e = p − u`, feedback
 * `−e₁` (order 1) or `−2e₁ + e₂` (order 2). All positions are whole multiples of 2⁻²⁴, so the states of two
 * passes can be compared exactly.
 */
export function shapeNoise(
  positions: Float64Array,
  dither: Float64Array | null,
  order: 1 | 2,
  round: Rounder,
  topCode: number,
): ShapedCodes {
  const wanted = closeTheSum(positions);
  const codes = new Uint16Array(positions.length);
  let e1 = 0;
  let e2 = 0;
  let clippedCodes = 0;
  let isClosed = false;
  for (let pass = 0; pass < passesAtMost && !isClosed; pass += 1) {
    const startE1 = e1;
    const startE2 = e2;
    clippedCodes = 0;
    for (let k = 0; k < wanted.length; k += 1) {
      const u = wanted[k] + (order === 1 ? -e1 : -2 * e1 + e2);
      const p = round(dither === null ? u : u + dither[k]);
      const code = Math.min(Math.max(p, 0), topCode);
      if (code !== p) clippedCodes += 1;
      codes[k] = code;
      e2 = e1;
      e1 = p - u;
    }
    isClosed = e1 === startE1 && (order === 1 || e2 === startE2);
  }
  return { codes, clippedCodes, isClosed };
}

/**
 * Makes the sum of all positions a whole number of codes, else order 1 could never end in its own starting
 * state: Δ units of 2⁻²⁴ are spread evenly, the remainder over the first entries. The sum is kept modulo 2²⁴,
 * as a long table of 16 bits would outgrow a double.
 */
function closeTheSum(positions: Float64Array): Float64Array {
  const count = positions.length;
  let rest = 0;
  for (let k = 0; k < count; k += 1) rest = (rest + positions[k] * snapSteps) % snapSteps;
  if (rest < 0) rest += snapSteps;
  const delta = rest < snapSteps / 2 ? -rest : snapSteps - rest;
  const each = Math.floor(delta / count);
  const oneMore = delta - each * count;
  return positions.map((position, k) => position + (each + (k < oneMore ? 1 : 0)) / snapSteps);
}
