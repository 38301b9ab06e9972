import { and, count, desc, eq, inArray, like, lt, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { Executor } from '../../db/client.ts';
import { revisions, tableTerms, users, waveTables } from '../../db/schema/index.ts';

const changer = alias(users, 'changer');
const creator = alias(users, 'creator');
const maker = alias(users, 'maker');

const summaryColumns = {
  slug: waveTables.slug,
  title: waveTables.title,
  tags: waveTables.tags,
  isArchived: waveTables.isArchived,
  latestRevision: waveTables.latestRevision,
  state: waveTables.state,
  bits: waveTables.bits,
  length: waveTables.length,
  snrDb: waveTables.snrDb,
  tableBytes: waveTables.tableBytes,
  drawing: waveTables.drawing,
  changedById: waveTables.changedBy,
  changedByName: changer.name,
  changedAt: waveTables.changedAt,
};

const tableColumns = {
  ...summaryColumns,
  id: waveTables.id,
  version: waveTables.version,
  createdById: waveTables.createdBy,
  createdByName: creator.name,
  createdAt: waveTables.createdAt,
};

const revisionSummaryColumns = {
  number: revisions.number,
  state: revisions.state,
  note: revisions.note,
  bits: revisions.bits,
  length: revisions.length,
  snrDb: revisions.snrDb,
  tableBytes: revisions.tableBytes,
  digest: revisions.digest,
  engineVersion: revisions.engineVersion,
  madeById: revisions.madeBy,
  madeByName: maker.name,
  madeAt: revisions.createdAt,
};

const revisionColumns = {
  ...revisionSummaryColumns,
  definition: revisions.definition,
  playback: revisions.playback,
  report: revisions.report,
  warnings: revisions.warnings,
  codes: revisions.codes,
};

/** Rows of the list, in the order of their ids. */
export async function readSummaries(db: Executor, teamId: number, ids: readonly number[]) {
  if (ids.length === 0) return [];
  const rows = await db
    .select({ ...summaryColumns, id: waveTables.id })
    .from(waveTables)
    .leftJoin(changer, eq(changer.id, waveTables.changedBy))
    .where(and(eq(waveTables.teamId, teamId), inArray(waveTables.id, [...ids])));
  const byId = new Map(rows.map((row) => [row.id, row]));
  return ids.flatMap((id) => byId.get(id) ?? []);
}
export type SummaryRow = Awaited<ReturnType<typeof readSummaries>>[number];

export async function findTable(db: Executor, teamId: number, slug: string) {
  const [row] = await db
    .select(tableColumns)
    .from(waveTables)
    .leftJoin(changer, eq(changer.id, waveTables.changedBy))
    .leftJoin(creator, eq(creator.id, waveTables.createdBy))
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug)));
  return row as typeof row | undefined;
}
export type TableRow = NonNullable<Awaited<ReturnType<typeof findTable>>>;

/** The table's row as it is now, held to the end of the transaction. */
export async function lockTable(db: Executor, teamId: number, slug: string) {
  const [row] = await db
    .select()
    .from(waveTables)
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug)))
    .for('update');
  return row as typeof row | undefined;
}
export type LockedTable = NonNullable<Awaited<ReturnType<typeof lockTable>>>;

/** Newest first, from below the number `before`. */
export const listRevisions = (
  db: Executor,
  teamId: number,
  tableId: number,
  limit: number,
  before?: number,
) =>
  db
    .select(revisionSummaryColumns)
    .from(revisions)
    .leftJoin(maker, eq(maker.id, revisions.madeBy))
    .where(
      and(
        eq(revisions.teamId, teamId),
        eq(revisions.tableId, tableId),
        before === undefined ? undefined : lt(revisions.number, before),
      ),
    )
    .orderBy(desc(revisions.number))
    .limit(limit);
export type RevisionSummaryRow = Awaited<ReturnType<typeof listRevisions>>[number];

const isRevision = (teamId: number, slug: string, number: number) =>
  and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug), eq(revisions.number, number));

const ofItsTable = and(eq(revisions.teamId, waveTables.teamId), eq(revisions.tableId, waveTables.id));

export async function findRevision(db: Executor, teamId: number, slug: string, number: number) {
  const [row] = await db
    .select(revisionColumns)
    .from(waveTables)
    .innerJoin(revisions, ofItsTable)
    .leftJoin(maker, eq(maker.id, revisions.madeBy))
    .where(isRevision(teamId, slug, number));
  return row as typeof row | undefined;
}
export type RevisionRow = NonNullable<Awaited<ReturnType<typeof findRevision>>>;

export async function countTables(db: Executor, teamId: number): Promise<number> {
  const [row] = await db.select({ tables: count() }).from(waveTables).where(eq(waveTables.teamId, teamId));
  return row.tables;
}

/** Tags of the tables that are not archived, with how many have each. */
export const listTags = (db: Executor, teamId: number) =>
  db
    .select({ tag: sql<string>`substring(${tableTerms.term}, 2)`, tables: count() })
    .from(tableTerms)
    .where(and(eq(tableTerms.teamId, teamId), eq(tableTerms.isArchived, false), like(tableTerms.term, '#%')))
    .groupBy(tableTerms.term)
    .orderBy(tableTerms.term);
