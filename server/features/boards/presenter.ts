import {
  limits,
  type Board,
  type BoardRevision,
  type BoardRevisionSummary,
  type BoardSummary,
  type LibraryBoard,
} from '../../../shared/contract/index.ts';
import { presentPerson } from '../../auth/present-person.ts';
import type { BoardRow, RevisionRow, RevisionSummaryRow, SummaryRow } from './queries.ts';

export const presentSummary = (row: Omit<SummaryRow, 'id'>): BoardSummary => ({
  slug: row.slug,
  name: row.name,
  outputKind: row.outputKind,
  bits: row.bits,
  isRetired: row.isRetired,
  latestRevision: row.latestRevision,
  changedBy: presentPerson(row.changedById, row.changedByName),
  changedAt: row.changedAt.toISOString(),
});

/** @param newest the newest revisions, newest first */
export const presentBoard = (row: BoardRow, newest: readonly RevisionSummaryRow[]): LibraryBoard => ({
  ...presentSummary(row),
  createdAt: row.createdAt.toISOString(),
  createdBy: presentPerson(row.createdById, row.createdByName),
  version: row.version,
  board: row.board as Board,
  revisions: newest.map(presentRevisionSummary),
  moreRevisions: (newest.at(-1)?.number ?? 1) > 1,
  revisionsAtMost: limits.revisionsPerBoard,
});

export const presentRevisionSummary = (row: RevisionSummaryRow): BoardRevisionSummary => ({
  number: row.number,
  note: row.note,
  outputKind: row.outputKind,
  bits: row.bits,
  digest: row.digest,
  madeBy: presentPerson(row.madeById, row.madeByName),
  madeAt: row.madeAt.toISOString(),
});

/** What is stored was checked on its way in: it is not parsed again. */
export const presentRevision = (row: RevisionRow): BoardRevision => ({
  ...presentRevisionSummary(row),
  board: row.board as Board,
});
