import type { Revision } from '../../shared/contract/index.ts';
import { analyseTable } from '../../shared/analysis/index.ts';
import type { TableAnswer } from './engine-messages.ts';

/**
 * A built table with the codes and figures that were stored. They are the same, as long as the engine is; a revision
 * of an older engine is drawn and measured as it was saved.
 */
export function asStored(
  built: TableAnswer,
  { codes: stored, report, warnings }: Pick<Revision, 'codes' | 'report' | 'warnings'>,
): TableAnswer {
  const isSame = stored.length === built.codes.length && stored.every((code, k) => code === built.codes[k]);
  if (isSame) return { ...built, report, warnings };
  const codes = Uint16Array.from(stored);
  const { clippedSamples, clippedCodes } = report;
  const { values, spectrum } = analyseTable(
    { cycle: built.cycle, clippedSamples },
    { codes, clippedCodes },
    built.definition.table,
  );
  const errorLsb = values.map((value, k) => (value - built.cycle[k]) / built.lsb);
  return { ...built, codes, values, errorLsb, spectrum, report, warnings };
}
