import type { auditEvents } from '../db/schema/index.ts';
import { macOf, type AuditKey } from './mac.ts';

export type EventRow = typeof auditEvents.$inferSelect;

/**
 * What was done to a chain: `foreign` is a row that was changed or never written by this program, where the rows after
 * it cannot tell which; `head` is the note of where the chain ends.
 */
export const breakKinds = [
  'changed',
  'foreign',
  'inserted',
  'removed',
  'reordered',
  'cut-off',
  'head',
] as const;
export type BreakKind = (typeof breakKinds)[number];

export interface ChainBreak {
  /** The first sequence number at which the chain is not what was written. */
  readonly brokenAt: number;
  readonly kind: BreakKind;
  /** The same in words. */
  readonly says: string;
}

/** What is at hand where a chain breaks. */
export interface BreakSite {
  readonly key: AuditKey;
  /** The sequence number that had to come, and the MAC it had to follow. */
  readonly expected: number;
  readonly before: string;
  /** The rows from there on, in their order; there is at least one, and it does not fit. */
  readonly rows: readonly EventRow[];
  /** Where the chain ends, as noted; undefined where the note is gone. */
  readonly lastSequence: number | undefined;
}

/** Rows that may be missing where those after them were given new numbers. */
const gapsTried = 1000;

/** Names what was done to a chain, from what still fits: no row can be made to fit without the key. */
export function nameBreak(site: BreakSite): ChainBreak {
  const { expected, before, rows, lastSequence } = site;
  const fits = (row: EventRow, sequence: number, mac: string) =>
    row.mac === macOf(site.key, { ...row, sequence }, mac);
  const broken = (kind: BreakKind, says: string): ChainBreak => ({ brokenAt: expected, kind, says });

  const [row, next] = rows as [EventRow, EventRow | undefined];
  const rightful = rows.findIndex((one, index) => index > 0 && fits(one, expected, before));
  if (rightful > 0) {
    const { sequence, mac } = rows[rightful];
    const isGenuine = rows.some(
      (one, index) =>
        index > 0 &&
        [rows[index - 1].mac, one.mac, mac].some((macBefore) => fits(row, one.sequence, macBefore)),
    );
    if (row.sequence === expected && sequence === expected + 1 && !isGenuine) {
      return broken('inserted', `event ${expected} was inserted`);
    }
    return broken('reordered', `event ${expected} stands at ${sequence}: the order was changed`);
  }
  if (fits(row, expected, before)) {
    return broken('reordered', `event ${expected} stands at ${row.sequence}: its number was changed`);
  }
  if (row.sequence > expected) return broken('removed', sayMissing(expected, row.sequence - 1));
  if (lastSequence !== undefined && expected > lastSequence) {
    return broken('inserted', `event ${expected} was inserted at the end`);
  }
  if (next) {
    const computed = macOf(site.key, row, before);
    if (fits(next, next.sequence, row.mac) || fits(next, next.sequence, computed)) {
      return broken('changed', `event ${expected} was changed`);
    }
    for (let gap = 1; gap <= gapsTried; gap++) {
      if (!fits(next, next.sequence + gap, row.mac)) continue;
      const missing = sayMissing(expected, expected + gap - 1);
      return broken('removed', `${missing}; those after have new numbers`);
    }
  }
  return broken('foreign', `event ${expected} was changed, or was not written by Stepwell`);
}

export const sayMissing = (first: number, last: number): string =>
  first === last ? `event ${first} is missing` : `events ${first} to ${last} are missing`;
