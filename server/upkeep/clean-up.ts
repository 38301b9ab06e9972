import { and, desc, eq, isNull, lt, notExists, or, sql } from 'drizzle-orm';
import type { Database } from '../db/client.ts';
import {
  idempotencyKeys,
  mailboxMessages,
  mailOutbox,
  memberships,
  oneTimeLinks,
  rateLimits,
  sessions,
  users,
} from '../db/schema/index.ts';

const hour = 3600 * 1000;
const day = 24 * hour;

/** Rows deleted by one statement: short locks, so that nobody waits for them. */
const batch = 1000;

/** Mails that the readable mailbox keeps. */
const mailboxLength = 500;

/** Deletes what has run out: sessions, links, answers kept for repeated requests, counters, mail, unverified accounts. */
export async function cleanUp(db: Database, now = new Date()): Promise<void> {
  const ago = (ms: number) => new Date(now.getTime() - ms);
  await inBatches(() =>
    db
      .delete(sessions)
      .where(or(lt(sessions.expiresAt, ago(day)), lt(sessions.revokedAt, ago(day))))
      .limit(batch),
  );
  // Kept for a while, so that an old link is told apart from a wrong one.
  await inBatches(() =>
    db
      .delete(oneTimeLinks)
      .where(lt(oneTimeLinks.expiresAt, ago(30 * day)))
      .limit(batch),
  );
  await inBatches(() =>
    db
      .delete(idempotencyKeys)
      .where(lt(idempotencyKeys.createdAt, ago(day)))
      .limit(batch),
  );
  await inBatches(() =>
    db
      .delete(rateLimits)
      .where(lt(rateLimits.expire, ago(hour).getTime()))
      .limit(batch),
  );
  for (const state of ['sent', 'undelivered'] as const) {
    await inBatches(() =>
      db
        .delete(mailOutbox)
        .where(and(eq(mailOutbox.state, state), lt(mailOutbox.dueAt, ago(30 * day))))
        .limit(batch),
    );
  }
  await inBatches(() =>
    db
      .delete(users)
      .where(
        and(
          isNull(users.emailVerifiedAt),
          lt(users.createdAt, ago(30 * day)),
          notExists(
            db
              .select({ one: sql`1` })
              .from(memberships)
              .where(eq(memberships.userId, users.id)),
          ),
        ),
      )
      .limit(batch),
  );
  const [oldest] = await db
    .select({ id: mailboxMessages.id })
    .from(mailboxMessages)
    .orderBy(desc(mailboxMessages.id))
    .limit(1)
    .offset(mailboxLength);
  if (oldest) await db.delete(mailboxMessages).where(lt(mailboxMessages.id, oldest.id + 1));
}

async function inBatches(deleteSome: () => Promise<[{ affectedRows: number }, ...unknown[]]>): Promise<void> {
  for (;;) {
    const [{ affectedRows }] = await deleteSome();
    if (affectedRows < batch) return;
  }
}
