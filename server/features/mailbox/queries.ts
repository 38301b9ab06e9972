import { desc, eq, lt } from 'drizzle-orm';
import type { Database } from '../../db/client.ts';
import { mailboxMessages } from '../../db/schema/index.ts';

const pageLength = 50;

export type MessageRow = typeof mailboxMessages.$inferSelect;

/** The newest mails, or those before one; `next` is what the following page comes before. */
export async function findPage(db: Database, before?: number) {
  const { id, recipient, subject, receivedAt } = mailboxMessages;
  const rows = await db
    .select({ id, recipient, subject, receivedAt })
    .from(mailboxMessages)
    .where(before === undefined ? undefined : lt(id, before))
    .orderBy(desc(id))
    .limit(pageLength + 1);
  const page = rows.slice(0, pageLength);
  return { rows: page, next: rows.length > pageLength ? page.at(-1)?.id : undefined };
}

export async function findMessage(db: Database, id: number): Promise<MessageRow | undefined> {
  const [row] = await db.select().from(mailboxMessages).where(eq(mailboxMessages.id, id));
  return row as typeof row | undefined;
}
