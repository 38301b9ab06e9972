import type { AuditEvent } from '../../../shared/contract/index.ts';
import type { EventRow } from './queries.ts';

export const presentEvent = ({ at, actorId, actorName, details, ...row }: EventRow): AuditEvent => ({
  ...row,
  at: at.toISOString(),
  actor: { id: actorId, name: actorName },
  details: details as AuditEvent['details'],
});
