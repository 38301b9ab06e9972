import { and, count, desc, eq, like, lt, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { BoardsQuery } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { boardRevisions, boards, users } from '../../db/schema/index.ts';
import type { Position } from '../../http/list-cursor.ts';

const changer = alias(users, 'changer');
const creator = alias(users, 'creator');
const maker = alias(users, 'maker');

const summaryColumns = {
  id: boards.id,
  slug: boards.slug,
  name: boards.name,
  outputKind: boards.outputKind,
  bits: boards.bits,
  isRetired: boards.isRetired,
  latestRevision: boards.latestRevision,
  changedById: boards.changedBy,
  changedByName: changer.name,
  changedAt: boards.changedAt,
};

const revisionSummaryColumns = {
  number: boardRevisions.number,
  note: boardRevisions.note,
  outputKind: boardRevisions.outputKind,
  bits: boardRevisions.bits,
  digest: boardRevisions.digest,
  madeById: boardRevisions.madeBy,
  madeByName: maker.name,
  madeAt: boardRevisions.createdAt,
};

/** By name, then by age, from behind a place. */
export const listBoards = (
  db: Executor,
  teamId: number,
  { retired, limit }: Pick<BoardsQuery, 'retired' | 'limit'>,
  after?: Position,
) =>
  db
    .select(summaryColumns)
    .from(boards)
    .leftJoin(changer, eq(changer.id, boards.changedBy))
    .where(
      and(
        eq(boards.teamId, teamId),
        eq(boards.isRetired, retired === 'yes'),
        after &&
          sql`(${boards.name} > ${after.key} or (${boards.name} = ${after.key} and ${boards.id} > ${after.id}))`,
      ),
    )
    .orderBy(boards.name, boards.id)
    .limit(limit);
export type SummaryRow = Awaited<ReturnType<typeof listBoards>>[number];

export async function findBoard(db: Executor, teamId: number, slug: string) {
  const [row] = await db
    .select({
      ...summaryColumns,
      version: boards.version,
      createdById: boards.createdBy,
      createdByName: creator.name,
      createdAt: boards.createdAt,
      board: boardRevisions.board,
    })
    .from(boards)
    .innerJoin(
      boardRevisions,
      and(
        eq(boardRevisions.teamId, boards.teamId),
        eq(boardRevisions.boardId, boards.id),
        eq(boardRevisions.number, boards.latestRevision),
      ),
    )
    .leftJoin(changer, eq(changer.id, boards.changedBy))
    .leftJoin(creator, eq(creator.id, boards.createdBy))
    .where(and(eq(boards.teamId, teamId), eq(boards.slug, slug)));
  return row as typeof row | undefined;
}
export type BoardRow = NonNullable<Awaited<ReturnType<typeof findBoard>>>;

/** The board's row as it is now, held to the end of the transaction. */
export async function lockBoard(db: Executor, teamId: number, slug: string) {
  const [row] = await db
    .select()
    .from(boards)
    .where(and(eq(boards.teamId, teamId), eq(boards.slug, slug)))
    .for('update');
  return row as typeof row | undefined;
}
export type LockedBoard = NonNullable<Awaited<ReturnType<typeof lockBoard>>>;

/** Newest first, from below the number `before`. */
export const listBoardRevisions = (
  db: Executor,
  teamId: number,
  boardId: number,
  limit: number,
  before?: number,
) =>
  db
    .select(revisionSummaryColumns)
    .from(boardRevisions)
    .leftJoin(maker, eq(maker.id, boardRevisions.madeBy))
    .where(
      and(
        eq(boardRevisions.teamId, teamId),
        eq(boardRevisions.boardId, boardId),
        before === undefined ? undefined : lt(boardRevisions.number, before),
      ),
    )
    .orderBy(desc(boardRevisions.number))
    .limit(limit);
export type RevisionSummaryRow = Awaited<ReturnType<typeof listBoardRevisions>>[number];

export async function findBoardRevision(db: Executor, teamId: number, slug: string, number: number) {
  const [row] = await db
    .select({ ...revisionSummaryColumns, board: boardRevisions.board })
    .from(boards)
    .innerJoin(
      boardRevisions,
      and(eq(boardRevisions.teamId, boards.teamId), eq(boardRevisions.boardId, boards.id)),
    )
    .leftJoin(maker, eq(maker.id, boardRevisions.madeBy))
    .where(and(eq(boards.teamId, teamId), eq(boards.slug, slug), eq(boardRevisions.number, number)));
  return row as typeof row | undefined;
}
export type RevisionRow = NonNullable<Awaited<ReturnType<typeof findBoardRevision>>>;

export async function countBoards(db: Executor, teamId: number): Promise<number> {
  const [row] = await db.select({ boards: count() }).from(boards).where(eq(boards.teamId, teamId));
  return row.boards;
}

/** Addresses of the team's boards that begin with a base. */
export async function takenSlugs(db: Executor, teamId: number, base: string): Promise<Set<string>> {
  const rows = await db
    .select({ slug: boards.slug })
    .from(boards)
    .where(and(eq(boards.teamId, teamId), like(boards.slug, `${base}%`)));
  return new Set(rows.map(({ slug }) => slug));
}
