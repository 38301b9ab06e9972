import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { auditPageSchema } from '../../shared/contract/index.ts';
import { ask } from './client.ts';

/** What the trail is asked for, by the API's own names. */
export type AuditAsk = Readonly<
  Partial<Record<'actor' | 'action' | 'subject' | 'from' | 'to' | 'cursor', string>>
>;

const of = (team: string) => `/teams/${encodeURIComponent(team)}`;
const withQuery = (path: string, query: AuditAsk) => {
  const text = String(new URLSearchParams(query));
  return text === '' ? path : `${path}?${text}`;
};

export const auditQueries = {
  page: (team: string, query: AuditAsk) =>
    queryOptions({
      queryKey: ['audit', team, query],
      queryFn: async ({ signal }) =>
        (await ask(withQuery(`${of(team)}/audit`, query), { signal, schema: auditPageSchema })).data,
      placeholderData: keepPreviousData,
    }),
};

/** Where all events of the filters can be downloaded. */
export const auditFile = (team: string, { cursor: _page, ...filters }: AuditAsk): string =>
  withQuery(`/api/v1${of(team)}/audit.csv`, filters);
