import { createHmac, hkdfSync, type KeyObject, createSecretKey } from 'node:crypto';
import canonicalize from 'canonicalize';

export type AuditKey = KeyObject;

/**
 * The key of the audit chains, kept out of the database: derived (HKDF, RFC 5869) from `AUDIT_KEY`, or from
 * `AUTH_SECRET` where that is not set. To change `AUTH_SECRET` and keep the chains, set `AUDIT_KEY` to the old one.
 */
export const deriveAuditKey = (secret: string): AuditKey =>
  createSecretKey(Buffer.from(hkdfSync('sha256', secret, '', 'stepwell audit chain', 32)));

/** What an event's MAC covers, besides the MAC before it. */
export interface AuditRow {
  readonly teamId: number;
  readonly sequence: number;
  readonly at: Date;
  readonly actorId: number;
  readonly actorName: string;
  readonly action: string;
  readonly subject: string;
  readonly details: unknown;
}

/** HMAC-SHA-256 in hex over the row as canonical JSON (RFC 8785) and the MAC before it; '' begins a chain. */
export function macOf(key: AuditKey, row: AuditRow, before: string): string {
  const { teamId, sequence, at, actorId, actorName, action, subject, details } = row;
  const text = canonicalize([
    teamId,
    sequence,
    at.toISOString(),
    actorId,
    actorName,
    action,
    subject,
    details,
    before,
  ]);
  return createHmac('sha256', key).update(String(text)).digest('hex');
}
