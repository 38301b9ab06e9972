import type { SizeCell } from './search.ts';

export type SizeFigure = 'snrDb' | 'unwantedDb';

/** What a table must keep; a limit that is left out asks for nothing. */
export interface SizeLimits {
  /** At least. */
  readonly snrDb?: number;
  /** At most. */
  readonly unwantedDb?: number;
  /** At most. */
  readonly tableBytes?: number;
}

/** How good a cell is: more is better, exact codes are best; NaN where there is no figure. */
function goodnessOf(cell: SizeCell, figure: SizeFigure): number {
  if (cell.problem !== null) return NaN;
  if (cell.exact) return Infinity;
  const value = cell[figure];
  if (value === null) return NaN;
  return figure === 'snrDb' ? value : -value;
}

/** By size; of one size by depth, then by length: the coarser converter asks for less. */
const bySize = (a: SizeCell, b: SizeCell) =>
  a.tableBytes - b.tableBytes || a.bits - b.bits || a.tableLength - b.tableLength;

/** The cells that no smaller or equally small one equals or beats in a figure, by size. */
export function paretoOf(cells: Iterable<SizeCell>, figure: SizeFigure): SizeCell[] {
  const front: SizeCell[] = [];
  let best = -Infinity;
  for (const cell of bestOfEachSize(cells, figure)) {
    const goodness = goodnessOf(cell, figure);
    if (goodness > best) {
      front.push(cell);
      best = goodness;
    }
  }
  return front;
}

function bestOfEachSize(cells: Iterable<SizeCell>, figure: SizeFigure): SizeCell[] {
  const best = new Map<number, SizeCell>();
  for (const cell of [...cells].sort(bySize)) {
    const goodness = goodnessOf(cell, figure);
    const held = best.get(cell.tableBytes);
    const isBetter = held === undefined ? goodness > -Infinity : goodness > goodnessOf(held, figure);
    if (isBetter) best.set(cell.tableBytes, cell);
  }
  return [...best.values()];
}

/**
 * The smallest cell that keeps all limits; of one size the coarsest, then the shortest. `null` where none does: a
 * figure that does not exist keeps no limit.
 */
export function smallestThatMeets(cells: Iterable<SizeCell>, limits: SizeLimits): SizeCell | null {
  const { snrDb, unwantedDb, tableBytes } = limits;
  let smallest: SizeCell | null = null;
  for (const cell of cells) {
    const meets =
      cell.problem === null &&
      (snrDb === undefined || goodnessOf(cell, 'snrDb') >= snrDb) &&
      (unwantedDb === undefined || goodnessOf(cell, 'unwantedDb') >= -unwantedDb) &&
      (tableBytes === undefined || cell.tableBytes <= tableBytes);
    if (meets && (smallest === null || bySize(cell, smallest) < 0)) smallest = cell;
  }
  return smallest;
}
