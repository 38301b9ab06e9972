import { and, eq } from 'drizzle-orm';
import { limits, teamLimits, type Board } from '../../../shared/contract/index.ts';
import { boardDigestOf } from '../../../shared/output-stage/index.ts';
import type { Executor } from '../../db/client.ts';
import { errno, errnoOf } from '../../db/errors.ts';
import { boardRevisions, boards } from '../../db/schema/index.ts';
import { Problem } from '../../http/problem.ts';
import { numbered, slugOfTitle } from '../../text/slugs.ts';
import { countBoards, takenSlugs, type LockedBoard } from './queries.ts';

export interface Place {
  readonly teamId: number;
  readonly userId: number;
}

export interface Saved {
  /** As parsed. */
  readonly board: Board;
  readonly note: string;
}

const shownOf = ({ output }: Board) => ({ outputKind: output.kind, bits: output.bits });

/**
 * Stores a new board with its first revision, under a free address made from its name; answers that.
 *
 * @throws {Problem} `conflict` (409) where the team has as many boards as it may
 */
export async function insertBoard(db: Executor, { teamId, userId }: Place, saved: Saved): Promise<string> {
  const had = await countBoards(db, teamId);
  if (had >= teamLimits.boards) {
    throw new Problem('conflict', {
      detail: `The team has ${had} boards, retired ones included, as many as it may.`,
    });
  }
  const now = new Date();
  const { id, slug } = await insertUnderFreeSlug(db, {
    teamId,
    name: saved.board.name,
    ...shownOf(saved.board),
    latestRevision: 1,
    createdBy: userId,
    createdAt: now,
    changedBy: userId,
    changedAt: now,
  });
  await insertRevision(db, { teamId, userId }, id, 1, saved);
  return slug;
}

/** Gives the board its next revision, under the number after its newest, and that one's name. */
export async function insertNextRevision(
  db: Executor,
  place: Place,
  board: Pick<LockedBoard, 'id' | 'latestRevision' | 'version'>,
  saved: Saved,
): Promise<number> {
  const number = board.latestRevision + 1;
  if (number > limits.revisionsPerBoard) {
    throw new Problem('conflict', {
      detail: `This board has ${board.latestRevision} revisions, as many as one may; copy it to go on.`,
    });
  }
  await insertRevision(db, place, board.id, number, saved);
  await changeRow(db, place, board, {
    ...shownOf(saved.board),
    name: saved.board.name,
    latestRevision: number,
  });
  return number;
}

export const storeRetired = (
  db: Executor,
  place: Place,
  board: Pick<LockedBoard, 'id' | 'version'>,
  isRetired: boolean,
) => changeRow(db, place, board, { isRetired });

const changeRow = (
  db: Executor,
  { teamId, userId }: Place,
  { id, version }: Pick<LockedBoard, 'id' | 'version'>,
  changes: Partial<typeof boards.$inferInsert>,
) =>
  db
    .update(boards)
    .set({ ...changes, version: version + 1, changedBy: userId, changedAt: new Date() })
    .where(and(eq(boards.teamId, teamId), eq(boards.id, id)));

const insertRevision = (
  db: Executor,
  { teamId, userId }: Place,
  boardId: number,
  number: number,
  { board, note }: Saved,
) =>
  db.insert(boardRevisions).values({
    teamId,
    boardId,
    number,
    ...shownOf(board),
    board,
    digest: boardDigestOf(board),
    note,
    madeBy: userId,
    createdAt: new Date(),
  });

/** Two that save under the same name at once see the same address free: the later one takes the next. */
async function insertUnderFreeSlug(
  db: Executor,
  row: Omit<typeof boards.$inferInsert, 'slug'>,
): Promise<{ id: number; slug: string }> {
  const base = slugOfTitle(row.name, 'board');
  const taken = await takenSlugs(db, row.teamId, base);
  for (let number = 1; ; number += 1) {
    const slug = numbered(base, number);
    if (taken.has(slug)) continue;
    try {
      const [{ id }] = await db
        .insert(boards)
        .values({ ...row, slug })
        .$returningId();
      return { id, slug };
    } catch (error) {
      if (errnoOf(error) !== errno.duplicate || number > teamLimits.boards) throw error;
    }
  }
}
