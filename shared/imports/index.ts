export { decodeText } from './decode-text.ts';
export { readAny, type AnyFile } from './read-any.ts';
export { importLimits } from './limits.ts';
export { readCode, type CodeLanguage, type ReadCode } from './code/read-code.ts';
export type { CodeArray, FoundArrays, RefusedArray } from './code/code-array.ts';
export { readIntelHex, sayAddress, wordsOf, type HexWords, type Segment } from './code/intel-hex.ts';
export {
  delimiters,
  readCsv,
  type CsvColumn,
  type CsvOutcome,
  type CsvQuestion,
  type CsvReading,
  type Delimiter,
} from './csv/read-csv.ts';
export { readResponseCsv, type ResponseOutcome } from './response-csv.ts';
export { readWav, type Recording } from './recording/read-wav.ts';
export { looksLikeWav, readWavHeader, type WavHeader } from './recording/wav-header.ts';
export { findPeriod, type FoundPeriod, type PeriodSearch } from './recording/find-period.ts';
export { proposeBounds, snapBounds } from './recording/propose-bounds.ts';
export { cutCycle, type CutCycle, type CycleBounds, type Join } from './recording/cut-cycle.ts';
export { seamOf, type Seam } from './table/seam.ts';
export { oldTableOf, reportOldTable, type OldTable, type OldTableReport } from './table/old-table-report.ts';
export { betterTable, definitionOfTable, type BetterMethod, type BetterTable } from './table/definitions.ts';
export { definitionOfValues, draftsOf, nameOfFile, type ImportDraft } from './drafts.ts';
