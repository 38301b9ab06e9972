import { queryOptions } from '@tanstack/react-query';
import { originalSchema, originalsListSchema } from '../../shared/contract/index.ts';
import { ask } from './client.ts';

export interface RevisionPlace {
  readonly team: string;
  readonly table: string;
  readonly number: number;
}

const part = encodeURIComponent;
const under = ({ team, table, number }: RevisionPlace) =>
  `/teams/${part(team)}/tables/${part(table)}/revisions/${number}/originals`;

export const originalQueries = {
  list: (at: RevisionPlace) =>
    queryOptions({
      queryKey: ['originals', at],
      queryFn: async ({ signal }) => (await ask(under(at), { signal, schema: originalsListSchema })).data,
    }),
};

/** Keeps a file with the revision that was made from it. The same bytes once more change nothing. */
export const keepOriginal = async (at: RevisionPlace, file: File) => {
  const name = new URLSearchParams({ name: file.name.slice(0, 120) });
  return (await ask(`${under(at)}?${name}`, { method: 'POST', file, schema: originalSchema })).data;
};

export const removeOriginal = (at: RevisionPlace, id: number) =>
  ask(`${under(at)}/${id}`, { method: 'DELETE' });

/** Where the file itself is fetched: an attachment. */
export const originalAddress = (at: RevisionPlace, id: number) => `/api/v1${under(at)}/${id}`;
