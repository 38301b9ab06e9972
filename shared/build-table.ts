import { parseDefinition } from './contract/index.ts';
import { tabulate, type BuiltTable } from './tabulate.ts';

export { tabulate, type BuiltTable } from './tabulate.ts';

/**
 * The straight line from a definition to its table: parse, synthesise, level, quantise, analyse.
 *
 * @throws {Refusal} where the input is no definition, or its signal cannot be levelled or folded.
 */
export function buildTable(input: unknown): BuiltTable {
  return tabulate(parseDefinition(input));
}
