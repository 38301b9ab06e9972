import { eq } from 'drizzle-orm';
import { dropLinks, findLink, makeLink, markUsed } from '../../auth/one-time-links.ts';
import { checkPassword, hashPassword } from '../../auth/passwords.ts';
import type { SessionClaims } from '../../auth/session-token.ts';
import { endSessions, startSession } from '../../auth/sessions.ts';
import { users } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import { passwordChangedLetter, resetPasswordLetter } from '../../mail/letters.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import { lockUser, lockUserByAddress } from './queries.ts';

/** Sends a link to set a new password, to who has an account; the one before no longer works. */
export async function forgotPassword({ database, origins }: ServerDeps, email: string): Promise<void> {
  await withTransaction(database.db, async (transaction) => {
    const user = await lockUserByAddress(transaction, email);
    if (!user) return;
    await dropLinks(transaction, user.id, 'reset-password');
    const { token } = await makeLink(transaction, { purpose: 'reset-password', email, userId: user.id });
    await queueMail(transaction, origins[0], email, resetPasswordLetter(origins[0], token));
  });
}

/**
 * Sets a new password by a mailed link and ends every session. The link has proved the address, too.
 *
 * @throws {Problem} `not-found`, `link-used` or `link-expired`
 */
export async function resetPassword(
  { database, origins }: ServerDeps,
  { token, password }: { readonly token: string; readonly password: string },
): Promise<{ email: string }> {
  // A wrong token costs no hash.
  await database.db.transaction((transaction) => findLink(transaction, token, 'reset-password'));
  const passwordHash = await hashPassword(password);
  return withTransaction(database.db, async (transaction) => {
    const link = await findLink(transaction, token, 'reset-password');
    const user = await lockUserByAddress(transaction, link.email);
    if (!user || user.id !== link.userId) throw new Problem('not-found', { detail: 'The account is gone.' });
    await transaction
      .update(users)
      .set({
        passwordHash,
        sessionVersion: user.sessionVersion + 1,
        emailVerifiedAt: user.emailVerifiedAt ?? new Date(),
      })
      .where(eq(users.id, user.id));
    await endSessions(transaction, user.id);
    await markUsed(transaction, link);
    await dropLinks(transaction, user.id);
    await queueMail(transaction, origins[0], user.email, passwordChangedLetter(origins[0]));
    return { email: user.email };
  });
}

/**
 * Sets a new password and ends every session; answers a new one to go on with. A sign-in with the old password that
 * is just under way ends too: its session carries the old version.
 *
 * @throws {Problem} `validation` where the current password is wrong
 */
export async function changePassword(
  { database, origins }: ServerDeps,
  userId: number,
  typed: { readonly currentPassword: string; readonly newPassword: string },
  userAgent: string | undefined,
): Promise<SessionClaims> {
  const known = await requirePassword({ database }, userId, typed.currentPassword);
  const passwordHash = await hashPassword(typed.newPassword);
  return withTransaction(database.db, async (transaction) => {
    const user = await lockUser(transaction, userId);
    if (user.passwordHash !== known) throw wrongPassword();
    const sessionVersion = user.sessionVersion + 1;
    await transaction.update(users).set({ passwordHash, sessionVersion }).where(eq(users.id, userId));
    await endSessions(transaction, userId);
    await dropLinks(transaction, userId, 'reset-password');
    await queueMail(transaction, origins[0], user.email, passwordChangedLetter(origins[0]));
    return startSession(transaction, { userId, sessionVersion }, userAgent);
  });
}

/**
 * Makes sure that it is the account's password, and answers the hash it fits: a command that goes on with it checks
 * that this hash is still the one kept.
 *
 * @throws {Problem} `validation`
 */
export async function requirePassword(
  { database }: Pick<ServerDeps, 'database'>,
  userId: number,
  typed: string,
): Promise<string> {
  const [user] = await database.db
    .select({ kept: users.passwordHash })
    .from(users)
    .where(eq(users.id, userId));
  if (!(await checkPassword(user?.kept, typed)) || !user.kept) throw wrongPassword();
  return user.kept;
}

export const wrongPassword = () =>
  new Problem('validation', {
    errors: [
      { path: 'currentPassword', value: 'another one', allowed: 'the current password of the account' },
    ],
  });
