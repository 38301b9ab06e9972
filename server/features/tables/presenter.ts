import type {
  Definition,
  LibraryTable,
  Report,
  Revision,
  RevisionSummary,
  TableSummary,
  Warning,
} from '../../../shared/contract/index.ts';
import { limits } from '../../../shared/contract/index.ts';
import { presentPerson } from '../../auth/present-person.ts';
import { presentDrawing } from './drawing.ts';
import type { RevisionRow, RevisionSummaryRow, SummaryRow, TableRow } from './queries.ts';
import { unpackCodes } from './stored-codes.ts';

export const presentSummary = (row: Omit<SummaryRow, 'id'>): TableSummary => ({
  slug: row.slug,
  title: row.title,
  tags: row.tags,
  isArchived: row.isArchived,
  latestRevision: row.latestRevision,
  state: row.state,
  bits: row.bits,
  length: row.length,
  snrDb: row.snrDb,
  tableBytes: row.tableBytes,
  drawing: presentDrawing(row.drawing),
  changedBy: presentPerson(row.changedById, row.changedByName),
  changedAt: row.changedAt.toISOString(),
});

/** @param newest the newest revisions, newest first */
export const presentTable = (row: TableRow, newest: readonly RevisionSummaryRow[]): LibraryTable => ({
  ...presentSummary(row),
  createdAt: row.createdAt.toISOString(),
  createdBy: presentPerson(row.createdById, row.createdByName),
  version: row.version,
  revisions: newest.map(presentRevisionSummary),
  moreRevisions: (newest.at(-1)?.number ?? 1) > 1,
  revisionsAtMost: limits.revisionsPerTable,
});

export const presentRevisionSummary = (row: RevisionSummaryRow): RevisionSummary => ({
  number: row.number,
  state: row.state,
  note: row.note,
  bits: row.bits,
  length: row.length,
  snrDb: row.snrDb,
  tableBytes: row.tableBytes,
  digest: row.digest,
  engineVersion: row.engineVersion,
  madeBy: presentPerson(row.madeById, row.madeByName),
  madeAt: row.madeAt.toISOString(),
});

/** What is stored was checked on its way in: it is not parsed again. */
export const presentRevision = (row: RevisionRow): Revision => ({
  ...presentRevisionSummary(row),
  definition: row.definition as Definition,
  playback: row.playback as Revision['playback'],
  report: row.report as Report,
  warnings: row.warnings as Warning[],
  codes: Array.from(unpackCodes(row.codes)),
});
