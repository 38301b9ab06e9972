import { brokenRules, Refusal, showValue, type Definition, type Problem } from '../contract/index.ts';
import { levelCycle, synthesise } from '../waveform/index.ts';
import { usualAxes, type SizeAxes } from './axes.ts';
import { Depths } from './depths.ts';

/** One size of a definition's table and its figures, the same as `tabulate` gives (§4). */
export interface SizeCell {
  readonly tableLength: number;
  readonly bits: number;
  readonly snrDb: number | null;
  readonly unwantedDb: number | null;
  /** Whether the codes stand for the signal without any error: better than any figure. */
  readonly exact: boolean;
  readonly tableBytes: number;
  /** Why the definition cannot have this size; its figures are then `null` and its bytes 0. */
  readonly problem: Problem | null;
}

/**
 * A definition at each length and each depth, a cell at a time: all depths of a length, then the next length. Each
 * step is short, so that a worker can report and be stopped between two.
 *
 * @throws {Refusal} where the definition has measured levels, which hold for one depth only.
 */
export function* sizeSearch(
  definition: Definition,
  { lengths, bits }: SizeAxes = usualAxes,
): Generator<SizeCell, void, void> {
  if (definition.table.levels !== undefined) {
    throw new Refusal({
      path: 'table.levels',
      value: showValue(definition.table.levels),
      allowed: 'no measured levels in a search over depths',
    });
  }
  for (const tableLength of lengths) {
    const row = { ...definition, table: { ...definition.table, length: tableLength } };
    const depths = depthsOf(row);
    for (const depth of bits) yield cellOf(tableLength, depth, depths);
  }
}

/** The cycle is the same at every depth; a length that the definition cannot have has a problem instead. */
function depthsOf(definition: Definition): Depths | Problem {
  const [broken] = brokenRules(definition);
  if (broken !== undefined) return broken;
  return orProblem(() => new Depths(levelCycle(synthesise(definition), definition).cycle, definition.table));
}

function cellOf(tableLength: number, bits: number, depths: Depths | Problem): SizeCell {
  const figures = depths instanceof Depths ? orProblem(() => depths.at(bits)) : depths;
  if ('allowed' in figures) {
    return {
      tableLength,
      bits,
      snrDb: null,
      unwantedDb: null,
      exact: false,
      tableBytes: 0,
      problem: figures,
    };
  }
  const { snrDb, unwantedDb, exact, tableBytes } = figures;
  return { tableLength, bits, snrDb, unwantedDb, exact, tableBytes, problem: null };
}

function orProblem<Result>(work: () => Result): Result | Problem {
  try {
    return work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems[0];
    throw error;
  }
}
