import { auditQuerySchema } from '../../../shared/contract/index.ts';
import type { AuditAsk } from '../../api/audit.ts';

const names = ['actor', 'action', 'subject', 'from', 'to', 'cursor'] as const;

/** Reads an address's query; what the trail does not know or take is left out, as nobody typed it here. */
export function readAuditQuery(parameters: URLSearchParams): AuditAsk {
  const query: Partial<Record<(typeof names)[number], string>> = {};
  for (const name of names) {
    const value = parameters.get(name);
    if (value !== null && auditQuerySchema.shape[name].safeParse(value).success) query[name] = value;
  }
  return query;
}

/** The query with some of it changed; '' takes a filter away. A cursor is good for its own filters only, so it goes. */
export function changedQuery(query: AuditAsk, part: AuditAsk): Record<string, string> {
  const { cursor: _old, ...kept } = query;
  return Object.fromEntries(
    Object.entries({ ...kept, ...part }).filter(([, value]) => value !== undefined && value !== ''),
  );
}

export const isFiltered = (query: AuditAsk): boolean =>
  names.some((name) => name !== 'cursor' && query[name] !== undefined);
