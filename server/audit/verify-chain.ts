import { and, asc, eq, gt } from 'drizzle-orm';
import type { Database } from '../db/client.ts';
import { auditEvents, auditHeads } from '../db/schema/index.ts';
import { macOf, type AuditKey } from './mac.ts';

const pageLength = 500;

/**
 * Goes through a team's chain from the beginning and answers how many events it holds, or the first sequence number
 * at which it is broken: a row changed, missing, added, or the end cut off. Not seen is an earlier state of the whole
 * team, head and all, put back; only a copy kept elsewhere shows that.
 */
export async function verifyChain(
  db: Database,
  key: AuditKey,
  teamId: number,
): Promise<{ events: number } | { brokenAt: number }> {
  let sequence = 0;
  let mac = '';
  for (;;) {
    const page = await db
      .select()
      .from(auditEvents)
      .where(and(eq(auditEvents.teamId, teamId), gt(auditEvents.sequence, sequence)))
      .orderBy(asc(auditEvents.sequence))
      .limit(pageLength);
    for (const row of page) {
      if (row.sequence !== sequence + 1 || row.mac !== macOf(key, row, mac))
        return { brokenAt: sequence + 1 };
      sequence = row.sequence;
      mac = row.mac;
    }
    if (page.length < pageLength) break;
  }
  const [head] = await db.select().from(auditHeads).where(eq(auditHeads.teamId, teamId));
  return head?.lastSequence === sequence && head.lastMac === mac
    ? { events: sequence }
    : { brokenAt: sequence + 1 };
}
