import Papa from 'papaparse';
import type { AuditEvent } from '../../../shared/contract/index.ts';

const columns = ['sequence', 'at', 'actorId', 'actor', 'action', 'subject', 'details'] as const;

/**
 * What makes a spreadsheet take a cell for a formula (OWASP, "CSV Injection"): text that begins so gets an apostrophe.
 * Numbers never do.
 */
const formula = /^[=+\-@\t\r]/;

/** The first record of the file: the names of the columns. */
export const csvHead = (): string => records([columns]);

/** One record of RFC 4180 for each event, CRLF at each end; `details` as JSON. */
export const csvOf = (events: readonly AuditEvent[]): string =>
  records(
    events.map(({ sequence, at, actor, action, subject, details }) => [
      sequence,
      at,
      actor.id,
      actor.name,
      action,
      subject,
      JSON.stringify(details),
    ]),
  );

function records(rows: readonly (readonly (string | number)[])[]): string {
  const text = Papa.unparse(rows as (string | number)[][], { newline: '\r\n', escapeFormulae: formula });
  return `${text}\r\n`;
}
