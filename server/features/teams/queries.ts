import { and, asc, count, eq, sql } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { memberships, teams, users, waveTables } from '../../db/schema/index.ts';

export const findTeamsOf = (executor: Executor, userId: number) =>
  executor
    .select({ slug: teams.slug, name: teams.name, myRole: memberships.role })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(teams.name), asc(teams.id));

export async function findTeam(executor: Executor, teamId: number) {
  const [team] = await executor.select().from(teams).where(eq(teams.id, teamId));
  return team as typeof team | undefined;
}

export type TeamRow = typeof teams.$inferSelect;

export async function countTables(executor: Executor, teamId: number): Promise<number> {
  const [{ tables }] = await executor
    .select({ tables: count() })
    .from(waveTables)
    .where(eq(waveTables.teamId, teamId));
  return tables;
}

const member = {
  userId: users.id,
  name: users.name,
  email: users.email,
  role: memberships.role,
  since: memberships.createdAt,
};

const membersOf = (executor: Executor) =>
  executor.select(member).from(memberships).innerJoin(users, eq(users.id, memberships.userId));

/** All of them: a team has no more than `teamLimits.members`. */
export const findMembers = (executor: Executor, teamId: number) =>
  membersOf(executor).where(eq(memberships.teamId, teamId)).orderBy(asc(users.name), asc(users.id));

export type MemberRow = Awaited<ReturnType<typeof findMembers>>[number];

/** One member; locked until the transaction ends. */
export async function lockMember(transaction: Executor, teamId: number, userId: number) {
  const [row] = await membersOf(transaction)
    .where(and(eq(memberships.teamId, teamId), eq(memberships.userId, userId)))
    .for('update');
  return row as MemberRow | undefined;
}

/** How many admins a team has, as it is now and not as it was when the transaction began. */
export async function countAdmins(transaction: Executor, teamId: number): Promise<number> {
  const [{ admins }] = await transaction
    .select({ admins: sql<number>`COUNT(*)`.mapWith(Number) })
    .from(memberships)
    .where(and(eq(memberships.teamId, teamId), eq(memberships.role, 'admin')))
    .for('update');
  return admins;
}
