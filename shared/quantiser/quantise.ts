import type { TableSettings, Warning } from '../contract/index.ts';
import { ditherOf } from './dither.ts';
import { nearestLevels } from './measured-levels.ts';
import { rounderOf } from './round.ts';
import { levelsOf, positionsOf } from './scaling.ts';
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
  const topCode = levelsOf(table.bits) - 1;
  const positions = positionsOf(cycle, table);
  const dither = ditherOf(positions.length, table);
  const round = rounderOf(table.rounding);
  if (table.shaping === 0) return { ...roundEach(positions, dither, round, topCode), warnings: [] };

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

function roundEach(
  positions: Float64Array,
  dither: Float64Array | null,
  round: (position: number) => number,
  topCode: number,
): { codes: Uint16Array; clippedCodes: number } {
  const codes = new Uint16Array(positions.length);
  let clippedCodes = 0;
  for (let k = 0; k < positions.length; k += 1) {
    let code = round(dither === null ? positions[k] : positions[k] + dither[k]);
    if (code < 0 || code > topCode) {
      clippedCodes += 1;
      code = code < 0 ? 0 : topCode;
    }
    codes[k] = code;
  }
  return { codes, clippedCodes };
}
