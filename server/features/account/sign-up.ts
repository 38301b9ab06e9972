import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { signUpSchema } from '../../../shared/contract/index.ts';
import { dropLinks, findLink, makeLink, markUsed } from '../../auth/one-time-links.ts';
import { hashPassword } from '../../auth/passwords.ts';
import type { Executor } from '../../db/client.ts';
import { users } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { accountExistsLetter, verifyAddressLetter } from '../../mail/letters.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import { lockUserByAddress } from './queries.ts';

/**
 * Makes an account whose address is still to be verified, or sends word to the owner of the one that exists. Until it
 * is verified the newest sign-up counts: who owns the address can always get their own password in.
 */
export async function signUp(
  { database, origins }: ServerDeps,
  typed: z.infer<typeof signUpSchema>,
): Promise<void> {
  const { name, email } = typed;
  const passwordHash = await hashPassword(typed.password);
  await withTransaction(database.db, async (transaction) => {
    const existing = await lockUserByAddress(transaction, email);
    if (existing?.emailVerifiedAt) {
      await queueMail(transaction, origins[0], email, accountExistsLetter(origins[0]));
      return;
    }
    if (existing)
      await transaction.update(users).set({ name, passwordHash }).where(eq(users.id, existing.id));
    const userId = existing?.id ?? (await insertUser(transaction, { name, email, passwordHash }));
    await sendVerification(transaction, origins[0], { userId, email });
  });
}

/** Sends a new link where the account waits for it; the one before no longer works. */
export async function resendVerification({ database, origins }: ServerDeps, email: string): Promise<void> {
  await withTransaction(database.db, async (transaction) => {
    const user = await lockUserByAddress(transaction, email);
    if (!user || user.emailVerifiedAt) return;
    await sendVerification(transaction, origins[0], { userId: user.id, email });
  });
}

/** @throws {Problem} `not-found`, `link-used` or `link-expired` */
export const verifyAddress = ({ database }: ServerDeps, token: string): Promise<{ email: string }> =>
  withTransaction(database.db, async (transaction) => {
    const link = await findLink(transaction, token, 'verify-address');
    await transaction
      .update(users)
      .set({ emailVerifiedAt: new Date() })
      .where(and(eq(users.id, link.userId ?? 0), eq(users.email, link.email)));
    await markUsed(transaction, link);
    return { email: link.email };
  });

async function insertUser(transaction: Executor, values: typeof users.$inferInsert): Promise<number> {
  const [{ id }] = await transaction.insert(users).values(values).$returningId();
  return id;
}

async function sendVerification(
  transaction: Executor,
  origin: string,
  { userId, email }: { readonly userId: number; readonly email: string },
): Promise<void> {
  await dropLinks(transaction, userId, 'verify-address');
  const { token } = await makeLink(transaction, { purpose: 'verify-address', email, userId });
  await queueMail(transaction, origin, email, verifyAddressLetter(origin, token));
}
