import { infiniteQueryOptions, queryOptions, type QueryClient } from '@tanstack/react-query';
import {
  commentSchema,
  commentsPageSchema,
  reviewSchema,
  reviewsPageSchema,
  type Comment,
  type CreateComment,
  type GiveVerdict,
  type Review,
  type ReviewsQuery,
} from '../../shared/contract/index.ts';
import { ask } from './client.ts';
import { tableQueries } from './tables.ts';

export type ReviewShow = ReviewsQuery['show'];

/** How a revision stands in review, and the entity tag that a verdict on it wants. */
export interface TaggedReview extends Review {
  readonly etag: string;
}

/** One revision of one table of one team. */
export interface RevisionAt {
  readonly team: string;
  readonly table: string;
  readonly number: number;
}

const part = encodeURIComponent;
const under = (team: string) => `/teams/${part(team)}/reviews`;
const of = ({ team, table, number }: RevisionAt) =>
  `/teams/${part(team)}/tables/${part(table)}/revisions/${number}`;

/** Who waits must not be shown a count that is old; it is asked for anew this often, in milliseconds. */
const countEveryMs = 60_000;

export const reviewQueries = {
  all: (team: string) => ['reviews', team] as const,
  list: (team: string, show: ReviewShow) =>
    infiniteQueryOptions({
      queryKey: [...reviewQueries.all(team), 'list', show],
      queryFn: ({ signal, pageParam }) => readReviews(team, { show, ...pageParam }, signal),
      initialPageParam: {} as { cursor?: string },
      getNextPageParam: ({ nextCursor }) => (nextCursor === null ? undefined : { cursor: nextCursor }),
      staleTime: 0,
    }),
  /** How many wait for the one who asks. */
  waiting: (team: string) =>
    queryOptions({
      queryKey: [...reviewQueries.all(team), 'waiting'],
      queryFn: async ({ signal }) => (await readReviews(team, { limit: '1' }, signal)).waitingForMe,
      refetchInterval: countEveryMs,
      refetchOnWindowFocus: true,
    }),
  detail: (at: RevisionAt) =>
    queryOptions({
      queryKey: [...reviewQueries.all(at.team), 'detail', at],
      queryFn: async ({ signal }) => tagged(ask(`${of(at)}/review`, { signal, schema: reviewSchema })),
      staleTime: 0,
    }),
  /** All of them: a revision has a thousand at most. */
  comments: (at: RevisionAt) =>
    queryOptions({
      queryKey: [...reviewQueries.all(at.team), 'comments', at],
      queryFn: ({ signal }) => readComments(at, signal),
      staleTime: 0,
    }),
};

async function readComments(at: RevisionAt, signal: AbortSignal): Promise<Comment[]> {
  const comments: Comment[] = [];
  let cursor: string | null = '';
  while (cursor !== null) {
    const query: string = cursor === '' ? '' : `?${new URLSearchParams({ cursor })}`;
    const { data } = await ask(`${of(at)}/comments${query}`, { signal, schema: commentsPageSchema });
    comments.push(...data.items);
    cursor = data.nextCursor;
  }
  return comments;
}

const readReviews = async (team: string, query: Record<string, string>, signal?: AbortSignal) =>
  (
    await ask(`${under(team)}?${new URLSearchParams(query)}`, {
      schema: reviewsPageSchema,
      ...(signal && { signal }),
    })
  ).data;

async function tagged(answer: Promise<{ data: Review; etag: string }>): Promise<TaggedReview> {
  const { data, etag } = await answer;
  return { ...data, etag };
}

/** The review that a lost race (412) is answered with; null where the answer holds none. */
export function readCurrentReview(current: unknown): TaggedReview | null {
  const { data } = reviewSchema.safeParse(current);
  // The server makes its entity tags of the version.
  return data === undefined ? null : { ...data, etag: `"${data.version}"` };
}

const schema = reviewSchema;

export const submitRevision = (at: RevisionAt, message: string, key: string) =>
  tagged(ask(`${of(at)}/submit`, { method: 'POST', body: { message }, key, schema }));

/** @throws {ProblemError} with the review as it is now in `current`, where it has changed since `ifMatch` */
export const giveVerdict = (at: RevisionAt, body: GiveVerdict, ifMatch: string) =>
  tagged(ask(`${of(at)}/verdict`, { method: 'POST', body, ifMatch, schema }));

/** @throws {ProblemError} as `giveVerdict` */
export const withdrawRevision = (at: RevisionAt, reason: string, ifMatch: string) =>
  tagged(ask(`${of(at)}/withdraw`, { method: 'POST', body: { reason }, ifMatch, schema }));

export const addComment = async (at: RevisionAt, body: CreateComment, key: string) =>
  (await ask(`${of(at)}/comments`, { method: 'POST', body, key, schema: commentSchema })).data;

/** Takes up a review as it is now; lists and tables that tell of the revision's state are read anew. */
export async function takeReview(
  queryClient: QueryClient,
  at: RevisionAt,
  review: TaggedReview,
): Promise<void> {
  queryClient.setQueryData(reviewQueries.detail(at).queryKey, review);
  await Promise.all([
    queryClient.invalidateQueries({ queryKey: reviewQueries.all(at.team) }),
    queryClient.invalidateQueries({ queryKey: tableQueries.all(at.team) }),
  ]);
}
