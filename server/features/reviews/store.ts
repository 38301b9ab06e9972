import { and, eq } from 'drizzle-orm';
import type { RevisionState } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { comments, reviews, revisions, waveTables } from '../../db/schema/index.ts';
import type { ReviewRow } from './queries.ts';

/** Who changes something, in which team, and when. */
export interface Stamp {
  readonly teamId: number;
  readonly userId: number;
  readonly at: Date;
}

export const insertReview = (
  db: Executor,
  { teamId, userId, at }: Stamp,
  row: ReviewRow,
  submitted: { readonly message: string; readonly failedLimits: number },
) =>
  db.insert(reviews).values({
    ...submitted,
    teamId,
    revisionId: row.revisionId,
    madeBy: row.madeById,
    submittedBy: userId,
    submittedAt: at,
  });

export const updateReview = (
  db: Executor,
  { teamId }: Stamp,
  row: ReviewRow,
  changes: Partial<typeof reviews.$inferInsert>,
) =>
  db
    .update(reviews)
    .set(changes)
    .where(and(eq(reviews.teamId, teamId), eq(reviews.revisionId, row.revisionId)));

/** Puts the revision into a state, and its table too where it is the newest: the list shows that one's. */
export async function storeState(
  db: Executor,
  { teamId, userId, at }: Stamp,
  row: ReviewRow,
  state: RevisionState,
): Promise<void> {
  await db
    .update(revisions)
    .set({ state })
    .where(and(eq(revisions.teamId, teamId), eq(revisions.id, row.revisionId)));
  await db
    .update(waveTables)
    .set({
      ...(row.number === row.latestRevision ? { state } : {}),
      version: row.tableVersion + 1,
      changedBy: userId,
      changedAt: at,
    })
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.id, row.tableId)));
}

/** Answers the comment's number. */
export async function insertComment(
  db: Executor,
  { teamId, userId, at }: Stamp,
  { revisionId }: ReviewRow,
  comment: { readonly text: string; readonly path: string | null },
): Promise<number> {
  const [{ id }] = await db
    .insert(comments)
    .values({ ...comment, teamId, revisionId, writtenBy: userId, createdAt: at })
    .$returningId();
  return id;
}
