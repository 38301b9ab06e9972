import { and, desc, eq, gte, like, lt, lte, type SQL } from 'drizzle-orm';
import type { AuditFilters } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { auditEvents } from '../../db/schema/index.ts';

export interface Question {
  readonly teamId: number;
  readonly filters: AuditFilters;
  /** Only what came before this event. */
  readonly before?: number;
  readonly limit: number;
}

/**
 * A team's events, newest first: in the order of the chain, which clocks that disagree cannot turn round. Which they
 * are is found in an index alone; whole rows are read only for those.
 */
export function findEvents(executor: Executor, { teamId, filters, before, limit }: Question) {
  const found = executor
    .select({ sequence: auditEvents.sequence })
    .from(auditEvents)
    .where(
      and(
        eq(auditEvents.teamId, teamId),
        before === undefined ? undefined : lt(auditEvents.sequence, before),
        ...conditionsOf(filters),
      ),
    )
    .orderBy(desc(auditEvents.sequence))
    .limit(limit)
    .as('found');
  return executor
    .select({
      sequence: auditEvents.sequence,
      at: auditEvents.at,
      actorId: auditEvents.actorId,
      actorName: auditEvents.actorName,
      action: auditEvents.action,
      subject: auditEvents.subject,
      details: auditEvents.details,
    })
    .from(found)
    .innerJoin(auditEvents, and(eq(auditEvents.teamId, teamId), eq(auditEvents.sequence, found.sequence)))
    .orderBy(desc(auditEvents.sequence));
}

export type EventRow = Awaited<ReturnType<typeof findEvents>>[number];

function conditionsOf({ actor, action, subject, from, to }: AuditFilters): (SQL | undefined)[] {
  const isBeginning = action?.endsWith('.');
  return [
    actor === undefined ? undefined : eq(auditEvents.actorId, actor),
    action === undefined
      ? undefined
      : isBeginning
        ? like(auditEvents.action, `${action}%`)
        : eq(auditEvents.action, action),
    subject === undefined ? undefined : eq(auditEvents.subject, subject),
    from === undefined ? undefined : gte(auditEvents.at, new Date(`${from}T00:00:00.000Z`)),
    to === undefined ? undefined : lte(auditEvents.at, new Date(`${to}T23:59:59.999Z`)),
  ];
}
