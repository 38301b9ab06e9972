import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import {
  limitSetsOfATeam,
  type changeLimitSetSchema,
  type CreateLimitSet,
  type LimitSet,
  type VettingLimits,
} from '../../../shared/contract/index.ts';
import { appendEvent, type AuditEntry } from '../../audit/append-event.ts';
import { lockTeam } from '../../auth/team-lock.ts';
import type { TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { teamLimits } from '../../db/schema/index.ts';
import type { ServerDeps } from '../../feature.ts';
import { lostRace, type Precondition } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import { presentLimitSet, readLimitSets } from '../../tables/limit-sets.ts';

/** The transaction a command runs in, and who gave it. */
export interface Command {
  readonly transaction: Executor;
  readonly auditKey: ServerDeps['config']['auditKey'];
  readonly scope: TeamScope;
}

/** @throws {Problem} `conflict` where there are limits for the tag already, or as many as a team may have */
export async function createLimitSet(command: Command, { tag, limits }: CreateLimitSet): Promise<LimitSet> {
  const { transaction, scope } = command;
  await lockTeam(transaction, scope, 'admin');
  const sets = await readLimitSets(transaction, scope.teamId);
  if (sets.some((set) => set.tag === tag)) {
    const whose = tag === null ? 'general limits' : `limits for the tag ${tag}`;
    throw new Problem('conflict', { detail: `The team has ${whose} already; change those.` });
  }
  if (sets.length >= limitSetsOfATeam) {
    throw new Problem('conflict', {
      detail: `The team has limits for ${sets.length} tags, as many as it may.`,
    });
  }
  const row = { teamId: scope.teamId, tag: tag ?? '', limits };
  const [{ id }] = await transaction.insert(teamLimits).values(row).$returningId();
  await note(command, 'limits.created', tag, { limits });
  return presentLimitSet({ ...row, id, version: 1 });
}

/** @throws {Problem} `not-found`; `precondition-failed` with the limits as they are now */
export async function changeLimitSet(
  command: Command,
  id: number,
  precondition: Precondition,
  { limits }: z.infer<typeof changeLimitSetSchema>,
): Promise<LimitSet> {
  const before = await lockLimitSet(command, id, precondition);
  if (isSame(before.limits, limits)) return before;
  const version = before.version + 1;
  await command.transaction.update(teamLimits).set({ limits, version }).where(isSet(command, id));
  await note(command, 'limits.changed', before.tag, { before: before.limits, after: limits });
  return { ...before, limits, version };
}

/** @throws {Problem} as `changeLimitSet` */
export async function deleteLimitSet(
  command: Command,
  id: number,
  precondition: Precondition,
): Promise<void> {
  const before = await lockLimitSet(command, id, precondition);
  await command.transaction.delete(teamLimits).where(isSet(command, id));
  await note(command, 'limits.deleted', before.tag, { limits: before.limits });
}

/** Those who judge hold the team's row: limits change before or after a verdict, never under it. */
async function lockLimitSet(command: Command, id: number, precondition: Precondition): Promise<LimitSet> {
  const { transaction, scope } = command;
  await lockTeam(transaction, scope, 'admin');
  const [row] = await transaction.select().from(teamLimits).where(isSet(command, id));
  if (!(row as typeof row | undefined)) {
    throw new Problem('not-found', { detail: `${scope.teamSlug} has no limits ${id}.` });
  }
  const set = presentLimitSet(row);
  if (!precondition.holds(set.version)) throw lostRace(set);
  return set;
}

const isSet = ({ scope }: Command, id: number) =>
  and(eq(teamLimits.teamId, scope.teamId), eq(teamLimits.id, id));

/** The schema puts the names in one order. */
const isSame = (one: VettingLimits, other: VettingLimits) => JSON.stringify(one) === JSON.stringify(other);

const note = (
  { transaction, auditKey, scope }: Command,
  action: AuditEntry['action'],
  tag: string | null,
  details: Readonly<Record<string, unknown>>,
) =>
  appendEvent(transaction, auditKey, {
    teamId: scope.teamId,
    actor: scope.user,
    action,
    subject: `limits:${tag ?? 'general'}`,
    details,
  });
