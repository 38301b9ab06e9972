import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { mailboxMessageSchema, mailboxPageSchema } from '../../shared/contract/index.ts';
import { ask } from './client.ts';

export const mailQueries = {
  all: ['mailbox'] as const,
  list: () =>
    infiniteQueryOptions({
      queryKey: [...mailQueries.all, 'list'],
      queryFn: async ({ signal, pageParam }) =>
        (await ask(`/mailbox?${new URLSearchParams(pageParam)}`, { signal, schema: mailboxPageSchema })).data,
      initialPageParam: {} as { cursor?: string },
      getNextPageParam: ({ nextCursor }) => (nextCursor === null ? undefined : { cursor: nextCursor }),
    }),
  detail: (id: number) =>
    queryOptions({
      queryKey: [...mailQueries.all, 'detail', id],
      queryFn: async ({ signal }) =>
        (await ask(`/mailbox/${id}`, { signal, schema: mailboxMessageSchema })).data,
    }),
};
