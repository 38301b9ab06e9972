import type { BuiltTable } from '../../shared/build-table.ts';
import type { TableReport } from '../../shared/contract/index.ts';

/** A table as the command line and the API give it: plain lists in the place of typed arrays. */
export const tableReportOf = ({ codes, stored, report, spectrum, warnings }: BuiltTable): TableReport => ({
  codes: Array.from(codes),
  stored: Array.from(stored),
  report,
  spectrum: Array.from(spectrum.amplitudes),
  warnings: [...warnings],
});
