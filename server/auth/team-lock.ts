import { and, eq, sql } from 'drizzle-orm';
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
  requireRole(member.role, role);
  return team;
}

/** What the team lays down for reviews, and the member's role as it is now. */
export interface TeamRules {
  readonly twoPersonRule: boolean;
  readonly role: Role;
}

/**
 * Keeps the team's row and the member's as they are until the transaction ends, without being in the way of others who
 * do the same: for commands that go by the team's rules. Comes first of all, before anything is read: what is read
 * after it is as new as what is held.
 *
 * @throws {Problem} `not-found` or `forbidden`, as `requireTeam`
 */
export async function holdTeam(transaction: Executor, scope: TeamScope, role: Role): Promise<TeamRules> {
  // MariaDB has no FOR SHARE, which is what the query builder would write.
  const [rows] = await transaction.execute(sql`
    select ${teams.twoPersonRule} as twoPersonRule, ${memberships.role} as role
    from ${teams} inner join ${memberships} on ${memberships.teamId} = ${teams.id}
    where ${teams.id} = ${scope.teamId} and ${memberships.userId} = ${scope.user.id}
    lock in share mode`);
  const [row] = rows as unknown as { twoPersonRule: number; role: Role }[];
  if (!row) throw new Problem('not-found', { detail: `You have no team named ${scope.teamSlug}.` });
  requireRole(row.role, role);
  return { twoPersonRule: row.twoPersonRule === 1, role: row.role };
}

function requireRole(held: Role, needed: Role): void {
  if (includesRole(held, needed)) return;
  throw new Problem('forbidden', { detail: `This takes the role ${needed}; yours is ${held}.` });
}
