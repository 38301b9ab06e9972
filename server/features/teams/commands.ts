import { randomInt } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import {
  teamDefaultsSchema,
  teamLimits,
  type changeTeamSchema,
  type createTeamSchema,
  type Member,
  type Role,
  type Team,
} from '../../../shared/contract/index.ts';
import { appendEvent } from '../../audit/append-event.ts';
import { lockTeam } from '../../auth/team-lock.ts';
import type { Person, TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { errno, errnoOf } from '../../db/errors.ts';
import { auditHeads, memberships, teams } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { lostRace, type Precondition } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import { presentMember, presentTeam } from './presenter.ts';
import { countAdmins, countTables, findTeamsOf, lockMember } from './queries.ts';
import { numberedSlug, slugOf } from './slugs.ts';

type Deps = Pick<ServerDeps, 'config' | 'database'>;

/**
 * Makes a team with the person as its admin. Without a slug one is made from the name.
 *
 * @throws {Problem} `conflict` where the slug is taken, or the person has as many teams as one may have
 */
export async function createTeam(
  { config }: Pick<ServerDeps, 'config'>,
  transaction: Executor,
  user: Person,
  typed: z.infer<typeof createTeamSchema>,
): Promise<Team> {
  const mine = await findTeamsOf(transaction, user.id);
  if (mine.length >= teamLimits.teamsOfAPerson) {
    throw new Problem('conflict', {
      detail: `You belong to ${mine.length} teams; that is as many as one may.`,
    });
  }
  const team = { name: typed.name, defaults: teamDefaultsSchema.parse({}) };
  const { teamId, slug } =
    typed.slug === undefined
      ? await insertWithFreeSlug(transaction, team)
      : { slug: typed.slug, teamId: await insertTeam(transaction, { ...team, slug: typed.slug }) };
  if (teamId === undefined)
    throw new Problem('conflict', { detail: `The address ${slug} is taken by another team.` });
  await transaction.insert(memberships).values({ teamId, userId: user.id, role: 'admin' });
  await transaction.insert(auditHeads).values({ teamId });
  await appendEvent(transaction, config.auditKey, {
    teamId,
    actor: user,
    action: 'team.created',
    subject: `team:${slug}`,
    details: { name: typed.name },
  });
  return presentTeam({ ...team, slug, twoPersonRule: true, version: 1 }, 'admin', 0);
}

type NewTeam = typeof teams.$inferInsert;

/** Answers the team's number, or undefined where its slug is taken. */
async function insertTeam(transaction: Executor, team: NewTeam): Promise<number | undefined> {
  try {
    const [{ id }] = await transaction.insert(teams).values(team).$returningId();
    return id;
  } catch (error) {
    if (errnoOf(error) === errno.duplicate) return undefined;
    throw error;
  }
}

/** Tries the name's slug, then numbers; trying tells what others are just inserting, which reading would not. */
async function insertWithFreeSlug(transaction: Executor, team: Omit<NewTeam, 'slug'>) {
  const first = slugOf(team.name);
  let slug = first;
  let teamId = await insertTeam(transaction, { ...team, slug });
  for (let number = 2; teamId === undefined; number = number < 20 ? number + 1 : randomInt(20, 10_000_000)) {
    slug = numberedSlug(first, number);
    teamId = await insertTeam(transaction, { ...team, slug });
  }
  return { slug, teamId };
}

/** @throws {Problem} `precondition-failed` with the team as it is now, where it has changed since it was read */
export const changeTeam = (
  { config, database }: Deps,
  scope: TeamScope,
  precondition: Precondition,
  typed: z.infer<typeof changeTeamSchema>,
): Promise<Team> =>
  withTransaction(database.db, async (transaction) => {
    const team = await lockTeam(transaction, scope, 'admin');
    const before = presentTeam(team, scope.role, await countTables(transaction, scope.teamId));
    if (!precondition.holds(team.version)) throw lostRace(before);
    const after = {
      ...before,
      name: typed.name ?? before.name,
      defaults: { ...before.defaults, ...typed.defaults },
      twoPersonRule: typed.twoPersonRule ?? before.twoPersonRule,
      version: before.version + 1,
    };
    await transaction
      .update(teams)
      .set({
        name: after.name,
        defaults: after.defaults,
        twoPersonRule: after.twoPersonRule,
        version: after.version,
      })
      .where(eq(teams.id, team.id));
    await appendEvent(transaction, config.auditKey, {
      teamId: team.id,
      actor: scope.user,
      action: 'team.changed',
      subject: `team:${team.slug}`,
      details: { ...typed },
    });
    return after;
  });

/** @throws {Problem} `not-found` for who is no member, `conflict` where the team would be left without an admin */
export const changeRole = (
  { config, database }: Deps,
  scope: TeamScope,
  userId: number,
  role: Role,
): Promise<Member> =>
  withTransaction(database.db, async (transaction) => {
    await lockTeam(transaction, scope, 'admin');
    const member = await requireMember(transaction, scope, userId);
    if (member.role === role) return presentMember(member);
    if (member.role === 'admin') await keepAnAdmin(transaction, scope.teamId);
    await transaction
      .update(memberships)
      .set({ role })
      .where(and(eq(memberships.teamId, scope.teamId), eq(memberships.userId, userId)));
    await appendEvent(transaction, config.auditKey, {
      teamId: scope.teamId,
      actor: scope.user,
      action: 'member.role-changed',
      subject: `member:${userId}`,
      details: { name: member.name, from: member.role, to: role },
    });
    return presentMember({ ...member, role });
  });

/**
 * Takes somebody out of the team: oneself with any role, others as an admin.
 *
 * @throws {Problem} as `changeRole`, and `forbidden` for who may remove only themselves
 */
export const removeMember = ({ config, database }: Deps, scope: TeamScope, userId: number): Promise<void> =>
  withTransaction(database.db, async (transaction) => {
    const isLeaving = userId === scope.user.id;
    await lockTeam(transaction, scope, isLeaving ? 'viewer' : 'admin');
    const member = await requireMember(transaction, scope, userId);
    if (member.role === 'admin') await keepAnAdmin(transaction, scope.teamId);
    await transaction
      .delete(memberships)
      .where(and(eq(memberships.teamId, scope.teamId), eq(memberships.userId, userId)));
    await appendEvent(transaction, config.auditKey, {
      teamId: scope.teamId,
      actor: scope.user,
      action: isLeaving ? 'member.left' : 'member.removed',
      subject: `member:${userId}`,
      details: { name: member.name, role: member.role },
    });
  });

async function requireMember(transaction: Executor, { teamId, teamSlug }: TeamScope, userId: number) {
  const member = await lockMember(transaction, teamId, userId);
  if (!member) throw new Problem('not-found', { detail: `${teamSlug} has no member ${userId}.` });
  return member;
}

/** @throws {Problem} where the one who goes is the only one */
async function keepAnAdmin(transaction: Executor, teamId: number): Promise<void> {
  if ((await countAdmins(transaction, teamId)) > 1) return;
  throw new Problem('conflict', { detail: 'A team needs an admin: make somebody else one first.' });
}
