import { eq, sql } from 'drizzle-orm';
import { noticeKinds, type NoticeChoices, type NoticeKind } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { noticeChoices, users } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import { readUnsubscription } from '../../notices/unsubscribe-token.ts';
import { findChoices } from './queries.ts';

/** Sets what is named and leaves the rest; answers all of it as it is now. */
export const changeChoices = (
  { database }: Pick<ServerDeps, 'database'>,
  userId: number,
  changes: Partial<NoticeChoices>,
): Promise<NoticeChoices> =>
  withTransaction(database.db, async (transaction) => {
    await choose(transaction, userId, changes);
    return findChoices(transaction, userId);
  });

/**
 * Switches off the kind of notice that a mailed link names, for the person it was mailed to; again, it changes
 * nothing. An account that is gone gets no mail anyway and is answered alike.
 *
 * @throws {Problem} `not-found` where the link is none of ours
 */
export async function unsubscribe(
  { config, database }: Pick<ServerDeps, 'config' | 'database'>,
  token: string,
): Promise<{ kind: NoticeKind }> {
  const named = readUnsubscription(config.unsubscribeKey, token);
  if (!named)
    throw new Problem('not-found', { detail: 'This link is not valid. Is it as long as in the mail?' });
  const { userId, kind } = named;
  await withTransaction(database.db, async (transaction) => {
    // The row is held, so that the account does not go between the look and the choice.
    const [user] = await transaction
      .select({ id: users.id })
      .from(users)
      .where(eq(users.id, userId))
      .for('update');
    if (user) await choose(transaction, userId, { [kind]: false });
  });
  return { kind };
}

async function choose(transaction: Executor, userId: number, changes: Partial<NoticeChoices>): Promise<void> {
  const changedAt = new Date();
  const rows = noticeKinds.flatMap((kind) => {
    const isWanted = changes[kind];
    return isWanted === undefined ? [] : [{ userId, kind, isWanted, changedAt }];
  });
  if (rows.length === 0) return;
  await transaction
    .insert(noticeChoices)
    .values(rows)
    .onDuplicateKeyUpdate({
      set: { isWanted: sql`values(${noticeChoices.isWanted})`, changedAt },
    });
}
