import { eq } from 'drizzle-orm';
import type { AuditAction } from '../../shared/contract/index.ts';
import type { Executor } from '../db/client.ts';
import { auditEvents, auditHeads } from '../db/schema/index.ts';
import { macOf, type AuditKey } from './mac.ts';

export interface AuditEntry {
  readonly teamId: number;
  readonly actor: { readonly id: number; readonly name: string };
  readonly action: AuditAction;
  /** What it was done to, as `table:fog-signal`, `member:17`. */
  readonly subject: string;
  /** What changed, as plain JSON; no secrets. */
  readonly details?: Readonly<Record<string, unknown>>;
}

/**
 * Adds an event to the team's chain, in the transaction of what it tells about. The chain's head is locked from here
 * to the end of the transaction: call it last, so that nothing waits for it that another transaction holds.
 *
 * @param key `config.auditKey`
 */
export async function appendEvent(transaction: Executor, key: AuditKey, entry: AuditEntry): Promise<void> {
  const { teamId, actor, action, subject, details = {} } = entry;
  const [head] = await transaction
    .select({ sequence: auditHeads.lastSequence, mac: auditHeads.lastMac })
    .from(auditHeads)
    .where(eq(auditHeads.teamId, teamId))
    .for('update');
  if (!head) throw new Error(`Team ${teamId} has no audit head; it is made with the team.`);

  const row = {
    teamId,
    sequence: head.sequence + 1,
    at: new Date(),
    actorId: actor.id,
    actorName: actor.name,
    action,
    subject,
    details,
  };
  const mac = macOf(key, row, head.mac);
  await transaction.insert(auditEvents).values({ ...row, mac });
  await transaction
    .update(auditHeads)
    .set({ lastSequence: row.sequence, lastMac: mac })
    .where(eq(auditHeads.teamId, teamId));
}
