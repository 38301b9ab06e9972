import type { TableSettings, Warning } from '../contract/index.ts';
import { ditherOf } from './dither.ts';
import { nearestLevels } from './measured-levels.ts';
import { rounderOf } from './round.ts';
import { levelsOf, positionsOf, snappedLine, snapSteps, valueLine } from './scaling.ts';
import { shapeNoise } from './shape-noise.ts';

export interface QuantisedCycle {
  /** One code an entry, 0…L−1. */
  readonly codes: Uint16Array;
  /** Codes that the last clip to 0…L−1 changed. */
  readonly clippedCodes: number;
  readonly warnings: readonly Warning[];
}

/** Codes of a levelled cycle (§3.2–§3.4). */
export function quantise(cycle: Float64Array, table: TableSettings): QuantisedCycle {
  if (table.levels !== undefined) {
    return { codes: nearestLevels(cycle, table.levels, table.range), clippedCodes: 0, warnings: [] };
  }
  const dither = ditherOf(cycle.length, table);
  if (table.shaping === 0) {
    const codes = new Uint16Array(cycle.length);
    return { codes, clippedCodes: roundInto(codes, cycle, table, dither), warnings: [] };
  }
  const topCode = levelsOf(table.bits) - 1;
  const positions = positionsOf(cycle, table);
  const round = rounderOf(table.rounding);
  const { codes, clippedCodes, isClosed } = shapeNoise(positions, dither, table.shaping, round, topCode);
  const warnings: Warning[] = [];
  if (table.shaping === 1 && !isClosed) {
    warnings.push({
      code: 'shaping-seam',
      path: 'table.shaping',
      message: 'The shaped loop does not end as it began: its seam adds a small step.',
    });
  }
  return { codes, clippedCodes, warnings };
}

/** Position, dither, rounding and clip in one pass: long tables are bound by memory. */
function roundInto(
  codes: Uint16Array,
  cycle: Float64Array,
  table: TableSettings,
  dither: Float64Array | null,
): number {
  const { gain, offset } = snappedLine(table);
  const topCode = levelsOf(table.bits) - 1;
  const round = rounderOf(table.rounding);
  const oneStep = 1 / snapSteps;
  let clippedCodes = 0;
  for (let k = 0; k < cycle.length; k += 1) {
    const position = Math.floor(cycle[k] * gain + offset) * oneStep;
    let code = round(dither === null ? position : position + dither[k]);
    if (code < 0 || code > topCode) {
      clippedCodes += 1;
      code = code < 0 ? 0 : topCode;
    }
    codes[k] = code;
  }
  return clippedCodes;
}

/**
 * Fills `error` with `e = q − r` of a levelled cycle without shaping or measured levels: what its codes' values are
 * off, to the last bit, without the codes. A search over many sizes asks for no more.
 *
 * @param dither one value an entry, in LSB, or null
 */
export function errorInto(
  error: Float64Array,
  cycle: Float64Array,
  table: TableSettings,
  dither: Float64Array | null,
): void {
  const { gain, offset } = snappedLine(table);
  const { multiplier, less, divisor, minus } = valueLine(table);
  const topCode = levelsOf(table.bits) - 1;
  const round = rounderOf(table.rounding);
  const oneStep = 1 / snapSteps;
  for (let k = 0; k < cycle.length; k += 1) {
    const r = cycle[k];
    const position = Math.floor(r * gain + offset) * oneStep;
    let code = round(dither === null ? position : position + dither[k]);
    if (code < 0) code = 0;
    else if (code > topCode) code = topCode;
    error[k] = (multiplier * code - less) / divisor - minus - r;
  }
}
