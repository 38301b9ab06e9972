import { and, asc, desc, eq, gt, isNull } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { memberships, sessions, teams, users } from '../../db/schema/index.ts';

/** Sessions shown at once; more than a person will have. */
const sessionsShown = 100;

export const findMemberships = (executor: Executor, userId: number) =>
  executor
    .select({ teamSlug: teams.slug, teamName: teams.name, role: memberships.role })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(teams.name), asc(teams.id));

export const findSessions = (executor: Executor, userId: number) =>
  executor
    .select({
      id: sessions.id,
      client: sessions.client,
      createdAt: sessions.createdAt,
      lastSeenAt: sessions.lastSeenAt,
      expiresAt: sessions.expiresAt,
    })
    .from(sessions)
    .innerJoin(users, and(eq(users.id, sessions.userId), eq(users.sessionVersion, sessions.sessionVersion)))
    .where(and(eq(sessions.userId, userId), isNull(sessions.revokedAt), gt(sessions.expiresAt, new Date())))
    .orderBy(desc(sessions.lastSeenAt), desc(sessions.id))
    .limit(sessionsShown);

export type SessionRow = Awaited<ReturnType<typeof findSessions>>[number];

/** The account's row, locked until the transaction ends. */
export async function lockUser(transaction: Executor, userId: number) {
  const [user] = await transaction.select().from(users).where(eq(users.id, userId)).for('update');
  if (!user) throw new Error(`There is no user ${userId}.`);
  return user;
}

export async function lockUserByAddress(transaction: Executor, email: string) {
  const [user] = await transaction.select().from(users).where(eq(users.email, email)).for('update');
  return user as typeof user | undefined;
}
