import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  boardRevisionSchema,
  boardRevisionsPageSchema,
  boardsPageSchema,
  libraryBoardSchema,
  type BoardInput,
  type BoardsQuery,
  type LibraryBoard,
} from '../../shared/contract/index.ts';
import { ask } from './client.ts';

const under = (team: string) => `/teams/${encodeURIComponent(team)}/boards`;
const of = (team: string, board: string) => `${under(team)}/${encodeURIComponent(board)}`;

/** A board, and the entity tag that a change of it wants. */
export interface TaggedBoard extends LibraryBoard {
  readonly etag: string;
}

export const boardQueries = {
  all: (team: string) => ['boards', team] as const,
  /** In use or retired, by name, page by page. */
  list: (team: string, retired: BoardsQuery['retired']) =>
    infiniteQueryOptions({
      queryKey: [...boardQueries.all(team), 'list', retired],
      queryFn: async ({ signal, pageParam }) =>
        (
          await ask(`${under(team)}?${new URLSearchParams({ retired, ...pageParam })}`, {
            signal,
            schema: boardsPageSchema,
          })
        ).data,
      initialPageParam: {} as { cursor?: string },
      getNextPageParam: ({ nextCursor }) => (nextCursor === null ? undefined : { cursor: nextCursor }),
    }),
  detail: (team: string, board: string) =>
    queryOptions({
      queryKey: [...boardQueries.all(team), 'detail', board],
      queryFn: ({ signal }) => tagged(ask(of(team, board), { signal, schema })),
    }),
  /** All revisions, page by page, newest first. */
  revisions: (team: string, board: string) =>
    infiniteQueryOptions({
      queryKey: [...boardQueries.all(team), 'revisions', board],
      queryFn: async ({ signal, pageParam }) =>
        (
          await ask(`${of(team, board)}/revisions?${new URLSearchParams({ limit: '20', ...pageParam })}`, {
            signal,
            schema: boardRevisionsPageSchema,
          })
        ).data,
      initialPageParam: {} as { cursor?: string },
      getNextPageParam: ({ nextCursor }) => (nextCursor === null ? undefined : { cursor: nextCursor }),
    }),
  revision: (team: string, board: string, number: number) =>
    queryOptions({
      queryKey: [...boardQueries.all(team), 'revision', board, number],
      queryFn: async ({ signal }) =>
        (await ask(`${of(team, board)}/revisions/${number}`, { signal, schema: boardRevisionSchema })).data,
    }),
};

const schema: z.ZodType<LibraryBoard> = libraryBoardSchema;

/** The board that a lost race (412) is answered with; null where the answer holds none. */
export function readCurrentBoard(current: unknown): TaggedBoard | null {
  const { data } = libraryBoardSchema.safeParse(current);
  // The server makes its entity tags of the version.
  return data === undefined ? null : { ...data, etag: `"${data.version}"` };
}

async function tagged(answer: Promise<{ data: LibraryBoard; etag: string }>): Promise<TaggedBoard> {
  const { data, etag } = await answer;
  return { ...data, etag };
}

interface BoardBody {
  readonly board: BoardInput;
  readonly note: string;
}

export const createBoard = (team: string, body: BoardBody, key: string) =>
  tagged(ask(under(team), { method: 'POST', body, key, schema }));

/** @throws {ProblemError} with the board as it is now in `current`, where it has changed since `ifMatch` */
export const reviseBoard = (
  team: string,
  board: string,
  body: BoardBody,
  { ifMatch, key }: { readonly ifMatch: string; readonly key: string },
) => tagged(ask(`${of(team, board)}/revisions`, { method: 'POST', body, ifMatch, key, schema }));

export const copyBoard = (
  team: string,
  board: string,
  body: { readonly name?: string; readonly revision?: number },
  key: string,
) => tagged(ask(`${of(team, board)}/copy`, { method: 'POST', body, key, schema }));

export const setRetired = (team: string, board: string, isRetired: boolean, key: string) =>
  tagged(ask(`${of(team, board)}/${isRetired ? 'retire' : 'restore'}`, { method: 'POST', key, schema }));
