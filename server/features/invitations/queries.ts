import { and, asc, count, eq, gt, isNull } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { mailOutbox, memberships, oneTimeLinks, teams, users } from '../../db/schema/index.ts';

const isOpen = (teamId: number) =>
  and(
    eq(oneTimeLinks.teamId, teamId),
    eq(oneTimeLinks.purpose, 'invitation'),
    isNull(oneTimeLinks.usedAt),
    gt(oneTimeLinks.expiresAt, new Date()),
  );

/** All that still work: a team has no more than `teamLimits.openInvitations`. */
export const findInvitations = (executor: Executor, teamId: number) =>
  executor
    .select({
      id: oneTimeLinks.id,
      email: oneTimeLinks.email,
      role: oneTimeLinks.role,
      invitedBy: users.name,
      delivery: mailOutbox.state,
      createdAt: oneTimeLinks.createdAt,
      expiresAt: oneTimeLinks.expiresAt,
    })
    .from(oneTimeLinks)
    .leftJoin(users, eq(users.id, oneTimeLinks.createdBy))
    .leftJoin(mailOutbox, eq(mailOutbox.id, oneTimeLinks.mailId))
    .where(isOpen(teamId))
    .orderBy(asc(oneTimeLinks.id));

export type InvitationRow = Awaited<ReturnType<typeof findInvitations>>[number];

export async function countInvitations(transaction: Executor, teamId: number): Promise<number> {
  const [{ open }] = await transaction
    .select({ open: count() })
    .from(oneTimeLinks)
    .where(isOpen(teamId))
    .for('update');
  return open;
}

export async function countMembers(transaction: Executor, teamId: number): Promise<number> {
  const [{ members }] = await transaction
    .select({ members: count() })
    .from(memberships)
    .where(eq(memberships.teamId, teamId))
    .for('update');
  return members;
}

export async function findMembership(transaction: Executor, teamId: number, userId: number) {
  const [row] = await transaction
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.teamId, teamId), eq(memberships.userId, userId)))
    .for('update');
  return row as typeof row | undefined;
}

/** The team of an invitation, locked until the transaction ends. */
export async function lockTeamRow(transaction: Executor, teamId: number) {
  const [team] = await transaction
    .select({ id: teams.id, slug: teams.slug, name: teams.name })
    .from(teams)
    .where(eq(teams.id, teamId))
    .for('update');
  return team as typeof team | undefined;
}

export async function isMemberAddress(
  transaction: Executor,
  teamId: number,
  email: string,
): Promise<boolean> {
  const rows = await transaction
    .select({ userId: memberships.userId })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.teamId, teamId), eq(users.email, email)))
    .for('update');
  return rows.length > 0;
}
