import { and, asc, eq, gt, inArray, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { Executor } from '../../db/client.ts';
import { comments, reviews, revisions, teams, users, waveTables } from '../../db/schema/index.ts';

const maker = alias(users, 'maker');
const submitter = alias(users, 'submitter');
const decider = alias(users, 'decider');
const withdrawer = alias(users, 'withdrawer');

/** A revision by its address, in its team. */
export interface RevisionPlace {
  readonly teamId: number;
  readonly slug: string;
  readonly number: number;
}

const isRevision = ({ teamId, slug, number }: RevisionPlace) =>
  and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug), eq(revisions.number, number));

const ofItsTable = and(eq(revisions.teamId, waveTables.teamId), eq(revisions.tableId, waveTables.id));
const ofItsRevision = and(eq(reviews.teamId, revisions.teamId), eq(reviews.revisionId, revisions.id));

const lastVetted = sql<number | null>`(
  select max(earlier.number) from ${revisions} as earlier
  where earlier.team_id = ${revisions.teamId} and earlier.table_id = ${revisions.tableId}
  and earlier.state = 'vetted' and earlier.number < ${revisions.number})`;

const reviewColumns = {
  tableId: waveTables.id,
  tableSlug: waveTables.slug,
  tableTitle: waveTables.title,
  tags: waveTables.tags,
  isArchived: waveTables.isArchived,
  tableVersion: waveTables.version,
  latestRevision: waveTables.latestRevision,
  revisionId: revisions.id,
  number: revisions.number,
  state: revisions.state,
  bits: revisions.bits,
  length: revisions.length,
  report: revisions.report,
  digest: revisions.digest,
  madeById: revisions.madeBy,
  madeByName: maker.name,
  madeAt: revisions.createdAt,
  lastVetted,
  submittedById: reviews.submittedBy,
  submittedByName: submitter.name,
  submittedAt: reviews.submittedAt,
  message: reviews.message,
  verdict: reviews.verdict,
  decidedById: reviews.decidedBy,
  decidedByName: decider.name,
  decidedAt: reviews.decidedAt,
  note: reviews.note,
  limits: reviews.limits,
  withdrawnById: reviews.withdrawnBy,
  withdrawnByName: withdrawer.name,
  withdrawnAt: reviews.withdrawnAt,
  reason: reviews.reason,
};

/** A revision with what has become of it in review, if it was submitted. */
export async function findReview(db: Executor, place: RevisionPlace) {
  const [row] = await db
    .select(reviewColumns)
    .from(waveTables)
    .innerJoin(revisions, ofItsTable)
    .leftJoin(reviews, ofItsRevision)
    .leftJoin(maker, eq(maker.id, revisions.madeBy))
    .leftJoin(submitter, eq(submitter.id, reviews.submittedBy))
    .leftJoin(decider, eq(decider.id, reviews.decidedBy))
    .leftJoin(withdrawer, eq(withdrawer.id, reviews.withdrawnBy))
    .where(isRevision(place));
  return row as typeof row | undefined;
}
export type ReviewRow = NonNullable<Awaited<ReturnType<typeof findReview>>>;

/** Holds the table to the end of the transaction: all that happens to its revisions happens one after the other. */
export async function lockTable(db: Executor, teamId: number, slug: string): Promise<boolean> {
  const rows = await db
    .select({ id: waveTables.id })
    .from(waveTables)
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug)))
    .for('update');
  return rows.length > 0;
}

/** Leaves the optimiser no way but from the reviews found to what is theirs; it likes to begin with all of a team's tables. */
const byNumber = { forceIndex: ['PRIMARY'] };

/** Rows of the list, in the order of their ids. */
export async function readSummaries(db: Executor, teamId: number, ids: readonly number[]) {
  if (ids.length === 0) return [];
  const rows = await db
    .select({
      id: reviews.id,
      tableSlug: waveTables.slug,
      tableTitle: waveTables.title,
      isArchived: waveTables.isArchived,
      number: revisions.number,
      state: revisions.state,
      madeById: reviews.madeBy,
      submittedById: reviews.submittedBy,
      submittedByName: submitter.name,
      submittedAt: reviews.submittedAt,
      message: reviews.message,
      failedLimits: reviews.failedLimits,
      decidedById: reviews.decidedBy,
      decidedByName: decider.name,
      decidedAt: reviews.decidedAt,
    })
    .from(reviews, byNumber)
    .innerJoin(revisions, ofItsRevision, byNumber)
    .innerJoin(waveTables, ofItsTable, byNumber)
    .leftJoin(submitter, eq(submitter.id, reviews.submittedBy))
    .leftJoin(decider, eq(decider.id, reviews.decidedBy))
    .where(and(eq(reviews.teamId, teamId), inArray(reviews.id, [...ids])));
  const byId = new Map(rows.map((row) => [row.id, row]));
  return ids.flatMap((id) => byId.get(id) ?? []);
}
export type SummaryRow = Awaited<ReturnType<typeof readSummaries>>[number];

export async function findTwoPersonRule(db: Executor, teamId: number): Promise<boolean> {
  const [team] = await db
    .select({ twoPersonRule: teams.twoPersonRule })
    .from(teams)
    .where(eq(teams.id, teamId));
  return team.twoPersonRule;
}

export async function findRevisionId(db: Executor, place: RevisionPlace): Promise<number | undefined> {
  const [row] = await db
    .select({ id: revisions.id })
    .from(waveTables)
    .innerJoin(revisions, ofItsTable)
    .where(isRevision(place));
  return (row as typeof row | undefined)?.id;
}

/** Oldest first, from behind the comment `after`. */
export const listComments = (
  db: Executor,
  teamId: number,
  revisionId: number,
  limit: number,
  after: number,
) =>
  db
    .select({
      id: comments.id,
      writtenById: comments.writtenBy,
      writtenByName: users.name,
      at: comments.createdAt,
      text: comments.text,
      path: comments.path,
    })
    .from(comments)
    .leftJoin(users, eq(users.id, comments.writtenBy))
    .where(and(isComment(teamId, revisionId), gt(comments.id, after)))
    .orderBy(asc(comments.id))
    .limit(limit);
export type CommentRow = Awaited<ReturnType<typeof listComments>>[number];

export const countComments = (db: Executor, teamId: number, revisionId: number) =>
  db.$count(comments, isComment(teamId, revisionId));

/** Everybody who has commented on the revision and still has an account. */
export async function findCommenters(db: Executor, teamId: number, revisionId: number): Promise<number[]> {
  const rows = await db
    .selectDistinct({ id: comments.writtenBy })
    .from(comments)
    .where(isComment(teamId, revisionId));
  return rows.flatMap(({ id }) => id ?? []);
}

const isComment = (teamId: number, revisionId: number) =>
  and(eq(comments.teamId, teamId), eq(comments.revisionId, revisionId));
