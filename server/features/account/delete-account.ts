import { and, asc, eq, inArray, ne, sql } from 'drizzle-orm';
import { appendEvent } from '../../audit/append-event.ts';
import type { Person } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { memberships, teams, users } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import { accountDeletedLetter } from '../../mail/letters.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import { requirePassword, wrongPassword } from './password-commands.ts';
import { lockUser } from './queries.ts';

/**
 * Deletes the account, and with it the teams that nobody else belongs to. What the person made for other teams stays
 * theirs.
 *
 * @throws {Problem} `validation` where the password is wrong, `conflict` where a team with other members would be left
 * without an admin
 */
export async function deleteAccount(deps: ServerDeps, user: Person, currentPassword: string): Promise<void> {
  const { config, database, origins } = deps;
  const known = await requirePassword(deps, user.id, currentPassword);
  await withTransaction(database.db, async (transaction) => {
    // Locked first: whoever adds the person to a team waits for it.
    const account = await lockUser(transaction, user.id);
    if (account.passwordHash !== known) throw wrongPassword();
    const places = await lockTeamsOf(transaction, user.id);
    const stuck = places.filter(({ others, otherAdmins }) => others > 0 && otherAdmins === 0);
    if (stuck.length > 0) {
      throw new Problem('conflict', {
        detail:
          `You are the last admin of ${stuck.map(({ name }) => `“${name}”`).join(', ')}. ` +
          'Make somebody else an admin there first, or remove the other members.',
        extensions: { teams: stuck.map(({ slug, name }) => ({ slug, name })) },
      });
    }
    const alone = places.filter(({ others }) => others === 0).map(({ teamId }) => teamId);
    if (alone.length > 0) await transaction.delete(teams).where(inArray(teams.id, alone));
    await queueMail(transaction, origins[0], account.email, accountDeletedLetter());
    await transaction.delete(users).where(eq(users.id, user.id));
    for (const { teamId, others } of places) {
      if (others === 0) continue;
      await appendEvent(transaction, config.auditKey, {
        teamId,
        actor: user,
        action: 'member.left',
        subject: `member:${user.id}`,
        details: { accountDeleted: true },
      });
    }
  });
}

/**
 * The person's teams, locked in the order of their numbers, each with how many others it has. Every read is a locking
 * one: a plain one would see the teams as they were when the transaction began.
 */
async function lockTeamsOf(transaction: Executor, userId: number) {
  const rows = await transaction
    .select({ teamId: teams.id, slug: teams.slug, name: teams.name })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(teams.id))
    .for('update');
  const places = [];
  for (const row of rows) {
    const [count] = await transaction
      .select({
        others: sql<number>`COUNT(*)`.mapWith(Number),
        otherAdmins: sql<number>`COALESCE(SUM(${memberships.role} = 'admin'), 0)`.mapWith(Number),
      })
      .from(memberships)
      .where(and(eq(memberships.teamId, row.teamId), ne(memberships.userId, userId)))
      .for('update');
    places.push({ ...row, ...count });
  }
  return places;
}
