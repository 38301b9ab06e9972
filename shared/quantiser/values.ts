import type { TableSettings } from '../contract/index.ts';
import { valuesOfLevels } from './measured-levels.ts';
import { valuesInto } from './scaling.ts';

/** What codes stand for, q, in signal units (§3.5). */
export function valuesOf(codes: Uint16Array, table: TableSettings): Float64Array {
  if (table.levels !== undefined) return valuesOfLevels(codes, table.levels, table.range);
  const values = new Float64Array(codes.length);
  valuesInto(values, codes, table);
  return values;
}
