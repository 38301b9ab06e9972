import { and, asc, eq, gt } from 'drizzle-orm';
import type { Database, Executor } from '../db/client.ts';
import { auditEvents, auditHeads } from '../db/schema/index.ts';
import { nameBreak, sayMissing, type ChainBreak, type EventRow } from './chain-break.ts';
import { macOf, type AuditKey } from './mac.ts';

const pageLength = 500;

/** Rows looked at from a break on to name it; what was moved further than that is called removed or foreign. */
const rowsLookedAt = 10_000;

export interface WholeChain {
  readonly events: number;
  /** The MAC that the chain ends with: kept elsewhere, it shows when an earlier state is put back. */
  readonly lastMac: string;
}

/**
 * Goes through a team's chain from the beginning, as it is at one moment, and answers how many events it holds, or the
 * first one at which it is broken and how: a row changed, missing, added or moved, or the end cut off. Not seen is an
 * earlier state of the whole team, head and all, put back; only a copy kept elsewhere shows that.
 */
export const verifyChain = (db: Database, key: AuditKey, teamId: number): Promise<WholeChain | ChainBreak> =>
  // One snapshot for rows and head, from the first read on: what comes meanwhile is not taken for a fault.
  db.transaction((snapshot) => walk(snapshot, key, teamId), {
    isolationLevel: 'repeatable read',
    accessMode: 'read only',
  });

async function walk(snapshot: Executor, key: AuditKey, teamId: number): Promise<WholeChain | ChainBreak> {
  const [head] = await snapshot.select().from(auditHeads).where(eq(auditHeads.teamId, teamId));
  const lastSequence = (head as typeof head | undefined)?.lastSequence;
  let sequence = 0;
  let mac = '';
  for await (const row of rowsAfter(snapshot, teamId, 0)) {
    if (row.sequence !== sequence + 1 || row.mac !== macOf(key, row, mac)) {
      const rows: EventRow[] = [];
      for await (const one of rowsAfter(snapshot, teamId, sequence)) {
        if (rows.push(one) === rowsLookedAt) break;
      }
      return nameBreak({ key, expected: sequence + 1, before: mac, rows, lastSequence });
    }
    sequence = row.sequence;
    mac = row.mac;
  }
  // A team's first event is its making: a chain without any has lost it.
  const last = Math.max(lastSequence ?? 0, 1);
  if (sequence < last) {
    return {
      brokenAt: sequence + 1,
      kind: 'cut-off',
      says: `${sayMissing(sequence + 1, last)} at the end`,
    };
  }
  if (lastSequence === sequence && head.lastMac === mac) return { events: sequence, lastMac: mac };
  return {
    brokenAt: sequence + 1,
    kind: 'head',
    says: `the chain ends with event ${sequence}, and not where its head says`,
  };
}

async function* rowsAfter(executor: Executor, teamId: number, sequence: number): AsyncGenerator<EventRow> {
  let after = sequence;
  for (;;) {
    const page = await executor
      .select()
      .from(auditEvents)
      .where(and(eq(auditEvents.teamId, teamId), gt(auditEvents.sequence, after)))
      .orderBy(asc(auditEvents.sequence))
      .limit(pageLength);
    yield* page;
    if (page.length < pageLength) return;
    after = page[page.length - 1].sequence;
  }
}
