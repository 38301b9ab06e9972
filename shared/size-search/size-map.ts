import type { SizeAxes } from './axes.ts';
import type { SizeCell } from './search.ts';

/** A search as matrices for a heat map: entry `row·bits.length + column`, a row a length, a column a depth. */
export interface SizeMap extends SizeAxes {
  /** NaN where there is no figure; Infinity where the codes are exact. */
  readonly snrDb: Float64Array;
  /** NaN where there is no figure; −Infinity where the codes are exact. */
  readonly unwantedDb: Float64Array;
  /** NaN where the size is refused. */
  readonly tableBytes: Float64Array;
}

/** The matrices of the cells found so far; a cell that is still missing has no figures. */
export function sizeMapOf(cells: Iterable<SizeCell>, { lengths, bits }: SizeAxes): SizeMap {
  const emptyMatrix = () => new Float64Array(lengths.length * bits.length).fill(NaN);
  const map = { lengths, bits, snrDb: emptyMatrix(), unwantedDb: emptyMatrix(), tableBytes: emptyMatrix() };
  for (const cell of cells) {
    const row = lengths.indexOf(cell.tableLength);
    const column = bits.indexOf(cell.bits);
    if (row < 0 || column < 0 || cell.problem !== null) continue;
    const at = row * bits.length + column;
    map.snrDb[at] = cell.exact ? Infinity : (cell.snrDb ?? NaN);
    map.unwantedDb[at] = cell.exact ? -Infinity : (cell.unwantedDb ?? NaN);
    map.tableBytes[at] = cell.tableBytes;
  }
  return map;
}
