import { and, asc, desc, eq, gt, isNotNull, isNull, lt, ne, or, type SQL } from 'drizzle-orm';
import type { MySqlColumn } from 'drizzle-orm/mysql-core';
import { includesRole, type ReviewsQuery } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { reviews } from '../../db/schema/index.ts';
import { readCursor, writeCursor } from '../../http/list-cursor.ts';
import type { Asker } from './hindrances.ts';

export interface FoundPage {
  readonly ids: readonly number[];
  readonly nextCursor: string | null;
}

interface Order {
  /** The index whose order it is: a page is read from it and nothing else. */
  readonly index: string;
  readonly moment: MySqlColumn;
  readonly isNewestFirst: boolean;
}

const longestWaiting: Order = { index: 'reviews_waiting', moment: reviews.submittedAt, isNewestFirst: false };
const orders: Readonly<Record<ReviewsQuery['show'], Order>> = {
  'for-me': longestWaiting,
  waiting: longestWaiting,
  mine: { index: 'reviews_mine', moment: reviews.submittedAt, isNewestFirst: true },
  decided: { index: 'reviews_decided', moment: reviews.decidedAt, isNewestFirst: true },
};

/** @throws {Problem} `validation` (422) for a cursor of another list */
export async function findReviews(
  db: Executor,
  teamId: number,
  asker: Asker,
  { show, cursor, limit }: ReviewsQuery,
): Promise<FoundPage> {
  const question = ['reviews', teamId, show, show === 'for-me' || show === 'mine' ? asker.userId : null];
  const order = orders[show];
  const further = beyond(question, order, cursor);
  if (show === 'for-me' && !mayJudgeAny(asker)) return { ids: [], nextCursor: null };
  const rows = await db
    .select({ id: reviews.id, moment: order.moment })
    .from(reviews, { forceIndex: [order.index] })
    .where(and(eq(reviews.teamId, teamId), shown(show, asker), further))
    .orderBy(...[order.moment, reviews.id].map(order.isNewestFirst ? desc : asc))
    .limit(limit + 1);
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return {
    ids: page.map(({ id }) => id),
    nextCursor:
      last && rows.length > page.length
        ? writeCursor(question, { key: (last.moment as Date).toISOString(), id: last.id })
        : null,
  };
}

/** How many the one who asks may judge now. */
export async function countWaitingFor(db: Executor, teamId: number, asker: Asker): Promise<number> {
  if (!mayJudgeAny(asker)) return 0;
  return db.$count(reviews, and(eq(reviews.teamId, teamId), shown('for-me', asker)));
}

const mayJudgeAny = ({ role }: Asker) => includesRole(role, 'reviewer');

function shown(show: ReviewsQuery['show'], { userId, twoPersonRule }: Asker): SQL | undefined {
  switch (show) {
    case 'for-me':
      return and(
        isNull(reviews.verdict),
        ...(twoPersonRule
          ? [isSomebodyElse(reviews.submittedBy, userId), isSomebodyElse(reviews.madeBy, userId)]
          : []),
      );
    case 'waiting':
      return isNull(reviews.verdict);
    case 'mine':
      return eq(reviews.submittedBy, userId);
    case 'decided':
      return isNotNull(reviews.decidedAt);
  }
}

const isSomebodyElse = (person: MySqlColumn, userId: number) => or(isNull(person), ne(person, userId));

function beyond(question: readonly unknown[], { moment, isNewestFirst }: Order, cursor?: string) {
  if (cursor === undefined) return undefined;
  const { key, id } = readCursor(question, cursor);
  const at = new Date(String(key));
  const past = isNewestFirst ? lt : gt;
  return or(past(moment, at), and(eq(moment, at), past(reviews.id, id)));
}
