import type { TableSettings } from '../contract/index.ts';
import { valuesOfLevels } from './measured-levels.ts';
import { valuesOfCodes } from './scaling.ts';

/** What codes stand for, q, in signal units (§3.5). */
export function valuesOf(codes: Uint16Array, table: TableSettings): Float64Array {
  return table.levels === undefined
    ? valuesOfCodes(codes, table)
    : valuesOfLevels(codes, table.levels, table.range);
}
