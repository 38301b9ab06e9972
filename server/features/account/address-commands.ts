import { eq } from 'drizzle-orm';
import { dropLinks, findLink, makeLink, markUsed } from '../../auth/one-time-links.ts';
import type { Person } from '../../auth/team-scope.ts';
import { users } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import { accountExistsLetter, addressChangedLetter, confirmAddressLetter } from '../../mail/letters.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import { requirePassword } from './password-commands.ts';
import { lockUser, lockUserByAddress } from './queries.ts';

/**
 * Sends a link to the new address. Whether that has an account already, only its owner is told.
 *
 * @throws {Problem} `validation` where the current password is wrong or the address is the present one
 */
export async function askForAddress(
  deps: ServerDeps,
  user: Person,
  typed: { readonly currentPassword: string; readonly email: string },
): Promise<void> {
  const { database, origins } = deps;
  const { email } = typed;
  await requirePassword(deps, user.id, typed.currentPassword);
  if (email === user.email) {
    throw new Problem('validation', {
      errors: [
        { path: 'email', value: JSON.stringify(email), allowed: 'another address than the present one' },
      ],
    });
  }
  await withTransaction(database.db, async (transaction) => {
    const owner = await lockUserByAddress(transaction, email);
    await dropLinks(transaction, user.id, 'change-address');
    if (owner) {
      await queueMail(transaction, origins[0], email, accountExistsLetter(origins[0]));
      return;
    }
    const { token } = await makeLink(transaction, { purpose: 'change-address', email, userId: user.id });
    await queueMail(transaction, origins[0], email, confirmAddressLetter(origins[0], token));
  });
}

/**
 * Gives the account the address that the link was sent to. Links sent to the old address work no longer.
 *
 * @throws {Problem} `not-found`, `link-used`, `link-expired`, or `conflict` where the address has got another account
 */
export const confirmAddress = (
  { database, origins }: ServerDeps,
  token: string,
): Promise<{ email: string }> =>
  withTransaction(database.db, async (transaction) => {
    const link = await findLink(transaction, token, 'change-address');
    const { email, userId } = link;
    if (userId === null) throw new Error('A link to change an address belongs to a person.');
    if (await lockUserByAddress(transaction, email)) {
      throw new Problem('conflict', { detail: 'This address has an account of its own by now.' });
    }
    const user = await lockUser(transaction, userId);
    await transaction.update(users).set({ email, emailVerifiedAt: new Date() }).where(eq(users.id, userId));
    await markUsed(transaction, link);
    await dropLinks(transaction, userId);
    await queueMail(transaction, origins[0], user.email, addressChangedLetter(email));
    return { email };
  });
