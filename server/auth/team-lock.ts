import { and, eq } from 'drizzle-orm';
import { includesRole, type Role } from '../../shared/contract/index.ts';
import type { Executor } from '../db/client.ts';
import { memberships, teams } from '../db/schema/index.ts';
import { Problem } from '../http/problem.ts';
import type { TeamScope } from './team-scope.ts';

export type TeamRow = typeof teams.$inferSelect;

/**
 * Locks the team's row until the transaction ends and looks again at what the member may do: since the request came
 * in, somebody may have changed that. Changes of a team, its members and its invitations begin with this, so that
 * they come one after the other.
 *
 * @throws {Problem} `not-found` or `forbidden`, as `requireTeam`
 */
export async function lockTeam(transaction: Executor, scope: TeamScope, role: Role): Promise<TeamRow> {
  const [team] = await transaction.select().from(teams).where(eq(teams.id, scope.teamId)).for('update');
  const [member] = await transaction
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.teamId, scope.teamId), eq(memberships.userId, scope.user.id)))
    .for('update');
  if (!team || !member)
    throw new Problem('not-found', { detail: `You have no team named ${scope.teamSlug}.` });
  if (!includesRole(member.role, role)) {
    throw new Problem('forbidden', { detail: `This takes the role ${role}; yours is ${member.role}.` });
  }
  return team;
}
