import { checkDefinition, limits, type Definition, type Problem } from '../../../../shared/contract/index.ts';
import { storedWords } from '../../../../shared/quantiser/index.ts';
import { Refusal } from '../../../../shared/contract/index.ts';

const folded = (definition: Definition): Definition => ({
  ...definition,
  table: { ...definition.table, fold: 'quarter' },
});

/** The engine's own words for what keeps a table from being folded, settings first; none where it can be. */
export function reasonsAgainstFold(definition: Definition, codes: Uint16Array | null): readonly Problem[] {
  const others = problemsOf({ ...definition, table: { ...definition.table, fold: 'none' } });
  const wrong = problemsOf(folded(definition)).filter(
    ({ path, allowed }) => !others.some((other) => other.path === path && other.allowed === allowed),
  );
  if (wrong.length > 0 || codes === null || codes.length !== definition.table.length) return wrong;
  try {
    storedWords(codes, folded(definition).table);
    return [];
  } catch (error) {
    if (error instanceof Refusal) return error.problems;
    throw error;
  }
}

function problemsOf(definition: Definition): readonly Problem[] {
  const checked = checkDefinition(definition);
  return 'problems' in checked ? checked.problems : [];
}

/** The definition folded, and with it every setting that a quarter asks for; what it allows stays. */
export function asFoldNeeds(definition: Definition): Definition {
  const { table } = definition;
  const { min, max } = limits.tableLength;
  const inFours = Number.isFinite(table.length) ? Math.max(4, 4 * Math.round(table.length / 4)) : 256;
  return {
    ...definition,
    table: {
      ...table,
      fold: 'quarter',
      sampleAt: 'centre',
      scale: 'full-span',
      rounding: table.rounding === 'down' ? 'half-up' : table.rounding,
      cycles: 1,
      length: Math.min(max, Math.max(min, inFours)),
      dither: 'none',
      shaping: 0,
    },
  };
}
