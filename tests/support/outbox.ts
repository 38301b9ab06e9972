import { desc, eq } from 'drizzle-orm';
import { mailOutbox } from '../../server/db/schema/index.ts';
import type { TestApp } from './test-app.ts';

/** What waits in the outbox for an address, the newest first. */
export const mailsTo = (test: TestApp, address: string) =>
  test.database.db
    .select()
    .from(mailOutbox)
    .where(eq(mailOutbox.recipient, address))
    .orderBy(desc(mailOutbox.id));

/** The token of the link in the newest mail to an address. */
export async function tokenSentTo(test: TestApp, address: string): Promise<string> {
  const [mail] = await mailsTo(test, address);
  const token = /#([\w-]{43})\b/.exec(mail?.textBody ?? '')?.[1];
  if (!token) throw new Error(`The newest mail to ${address} has no link: ${mail?.textBody ?? 'no mail'}`);
  return token;
}

/** An address that nobody has. */
let made = 0;
export const freshAddress = () =>
  `person-${process.pid}-${Date.now().toString(36)}-${++made}@ninthfathom.example`;
