import { infiniteQueryOptions, keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  libraryTableSchema,
  renderAnswerSchema,
  revisionsPageSchema,
  tablesPageSchema,
  tagsListSchema,
  type createRevisionSchema,
  type createTableSchema,
  type LibraryTable,
  type Revision,
} from '../../shared/contract/index.ts';
import { ask } from './client.ts';

const under = (team: string) => `/teams/${encodeURIComponent(team)}/tables`;
const of = (team: string, table: string) => `${under(team)}/${encodeURIComponent(table)}`;

/** A table, and the entity tag that a change of it wants. */
export interface TaggedTable extends LibraryTable {
  readonly etag: string;
}

/** Query of the list: names as the API has them, only those that are set. */
export type ListQuery = Readonly<Record<string, string>>;

/** What an export is asked for: the target and its options as they were given. */
export interface ExportAsk {
  readonly team: string;
  readonly table: string;
  readonly number: number;
  readonly query: Readonly<Record<string, string>>;
}

export const tableQueries = {
  all: (team: string) => ['tables', team] as const,
  lists: (team: string) => [...tableQueries.all(team), 'list'] as const,
  list: (team: string, query: ListQuery) =>
    queryOptions({
      queryKey: [...tableQueries.lists(team), query],
      queryFn: async ({ signal }) =>
        (await ask(`${under(team)}?${new URLSearchParams(query)}`, { signal, schema: tablesPageSchema }))
          .data,
      placeholderData: keepPreviousData,
    }),
  tags: (team: string) =>
    queryOptions({
      queryKey: [...tableQueries.all(team), 'tags'],
      queryFn: async ({ signal }) =>
        (await ask(`/teams/${encodeURIComponent(team)}/tags`, { signal, schema: tagsListSchema })).data.tags,
    }),
  detail: (team: string, table: string) =>
    queryOptions({
      queryKey: [...tableQueries.all(team), 'detail', table],
      queryFn: async ({ signal }) => readTable(team, table, signal),
    }),
  /** All revisions, page by page, newest first. */
  revisions: (team: string, table: string) =>
    infiniteQueryOptions({
      queryKey: [...tableQueries.all(team), 'revisions', table],
      queryFn: async ({ signal, pageParam }) =>
        (
          await ask(`${of(team, table)}/revisions?${new URLSearchParams({ limit: '20', ...pageParam })}`, {
            signal,
            schema: revisionsPageSchema,
          })
        ).data,
      initialPageParam: {} as { cursor?: string },
      getNextPageParam: ({ nextCursor }) => (nextCursor === null ? undefined : { cursor: nextCursor }),
    }),
  /** A whole revision. It never changes but for its state. */
  revision: (team: string, table: string, number: number) =>
    queryOptions({
      queryKey: [...tableQueries.all(team), 'revision', table, number],
      queryFn: ({ signal }) => readRevision(team, table, number, signal),
    }),
  export: ({ team, table, number, query }: ExportAsk) =>
    queryOptions({
      queryKey: [...tableQueries.all(team), 'export', table, number, query],
      queryFn: async ({ signal }) =>
        (await ask(exportPath({ team, table, number, query }), { signal, schema: renderAnswerSchema })).data
          .files,
      placeholderData: keepPreviousData,
    }),
};

const exportPath = ({ team, table, number, query }: ExportAsk) =>
  `${of(team, table)}/revisions/${number}/export?${new URLSearchParams(query)}`;

/** Where one file of an export can be downloaded. */
export const exportedFile = (wanted: ExportAsk, file: string): string =>
  `/api/v1${exportPath({ ...wanted, query: { ...wanted.query, file } })}`;

/** Not parsed: its codes are up to 65,536 numbers, which the server's presenter types by the same contract. */
export const readRevision = async (team: string, table: string, number: number, signal?: AbortSignal) =>
  (await ask<Revision>(`${of(team, table)}/revisions/${number}`, signal && { signal })).data;

export const readTable = (team: string, table: string, signal?: AbortSignal): Promise<TaggedTable> =>
  tagged(ask(of(team, table), { schema: libraryTableSchema, ...(signal && { signal }) }));

/** The table that a lost race (412) is answered with; null where the answer holds none. */
export function readCurrentTable(current: unknown): TaggedTable | null {
  const { data } = libraryTableSchema.safeParse(current);
  // The server makes its entity tags of the version.
  return data === undefined ? null : { ...data, etag: `"${data.version}"` };
}

async function tagged(answer: Promise<{ data: LibraryTable; etag: string }>): Promise<TaggedTable> {
  const { data, etag } = await answer;
  return { ...data, etag };
}

const schema = libraryTableSchema;

export const createTable = (team: string, body: z.input<typeof createTableSchema>, key: string) =>
  tagged(ask(under(team), { method: 'POST', body, key, schema }));

/** @throws {ProblemError} with the table as it is now in `current`, where it has changed since `ifMatch` */
export const createRevision = (
  team: string,
  table: string,
  body: z.input<typeof createRevisionSchema>,
  { ifMatch, key }: { readonly ifMatch: string; readonly key: string },
) => tagged(ask(`${of(team, table)}/revisions`, { method: 'POST', body, ifMatch, key, schema }));

/** @throws {ProblemError} as `createRevision` */
export const changeTable = (
  team: string,
  table: string,
  body: { readonly title: string; readonly tags: string[] },
  ifMatch: string,
) => tagged(ask(of(team, table), { method: 'PATCH', body, ifMatch, schema }));

export const setArchived = (team: string, table: string, isArchived: boolean, key: string) =>
  tagged(ask(`${of(team, table)}/${isArchived ? 'archive' : 'restore'}`, { method: 'POST', key, schema }));

export const duplicateTable = (
  team: string,
  table: string,
  body: { readonly title?: string; readonly revision?: number },
  key: string,
) => tagged(ask(`${of(team, table)}/duplicate`, { method: 'POST', body, key, schema }));
