import { limits, type DefinitionInput, type SamplesSource } from '../../contract/index.ts';
import { buildTable } from '../../build-table.ts';
import { harmonicModelOf } from './harmonic-model.ts';
import { cycleOf, reportOldTable, type OldTable, type OldTableReport } from './old-table-report.ts';
import { smoothWithinCodes } from './smooth.ts';

/**
 * The definition that gives a table back entry by entry: its codes as the values of a `samples` source, held, at their
 * own places between the lowest and the highest code.
 */
export function definitionOfTable(name: string, table: OldTable): DefinitionInput {
  return {
    schema: 1,
    name: nameFor(name),
    source: { kind: 'samples', values: signalOf(table.codes, table.bits), resampling: 'hold' },
    level: { normalise: 'none' },
    table: settingsOf(table),
  };
}

export type BetterMethod = 'harmonics' | 'samples';

/** A proposal in place of an old table, and the figures of both. */
export interface BetterTable {
  /** `harmonics`: what best tells the table; `samples`: the smoothest loop that rounds to its codes. */
  readonly method: BetterMethod;
  readonly definition: DefinitionInput;
  readonly before: OldTableReport;
  readonly after: OldTableReport;
}

/**
 * "This old table, better": a new one of the same length and depth, without its mean, over the whole range of codes,
 * without a repeated entry. From its best-fitting harmonics where they leave something out; a table whose every line
 * counts is smoothed within its codes instead.
 *
 * @returns undefined for a table that does not move
 */
export function betterTable(name: string, table: OldTable, method?: BetterMethod): BetterTable | undefined {
  const before = reportOldTable(table);
  if (before.minCode === before.maxCode) return undefined;
  const cycle = cycleOf(table.codes, before);
  const model = harmonicModelOf(cycle);
  const isTold = model.count > 0 && model.count <= limits.partials.max && 2 * model.count < cycle.length - 2;
  const chosen = method ?? (isTold ? 'harmonics' : 'samples');
  const scale = 2 / (2 ** table.bits - 1);
  const source: DefinitionInput['source'] =
    chosen === 'harmonics'
      ? {
          kind: 'harmonics',
          offset: 0,
          partials: model.source.partials
            .slice(0, limits.partials.max)
            .map((partial) => ({ ...partial, amplitude: partial.amplitude * scale })),
        }
      : smoothed(cycle, table);
  const definition: DefinitionInput = {
    schema: 1,
    name: nameFor(name),
    source,
    level: { removeMean: true, normalise: 'span' },
    table: settingsOf(table),
  };
  const { codes } = buildTable(definition);
  return { method: chosen, definition, before, after: reportOldTable({ ...table, codes }) };
}

function smoothed(cycle: Uint16Array, { codes, bits }: OldTable): SamplesSource {
  const values = Array.from(signalOf(smoothWithinCodes(cycle), bits));
  // A cycle of another length than the table lies between its entries.
  return { kind: 'samples', values, resampling: cycle.length === codes.length ? 'hold' : 'linear' };
}

/** Codes as the signal they stand for, −1…1 (engine specification §3.5). */
const signalOf = (codes: ArrayLike<number>, bits: number) =>
  Array.from(codes, (code) => (2 * code) / (2 ** bits - 1) - 1);

const settingsOf = ({ codes, bits, isSigned }: OldTable): DefinitionInput['table'] => ({
  length: codes.length,
  bits,
  coding: isSigned ? 'twos-complement' : 'offset-binary',
});

const nameFor = (name: string) => {
  const cut = name
    .trim()
    .slice(0, limits.nameLength.max)
    .replace(/[\ud800-\udbff]$/, '');
  return cut === '' ? 'old table' : cut;
};
