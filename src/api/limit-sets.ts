import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  limitSetSchema,
  limitSetsListSchema,
  type createLimitSetSchema,
  type LimitSet,
  type VettingLimits,
} from '../../shared/contract/index.ts';
import { ask } from './client.ts';

const under = (team: string) => `/teams/${encodeURIComponent(team)}/limit-sets`;

/** The server makes its entity tags of the version. */
const etagOf = ({ version }: LimitSet) => `"${version}"`;

export const limitSetQueries = {
  all: (team: string) => ['limit-sets', team] as const,
  list: (team: string) =>
    queryOptions({
      queryKey: [...limitSetQueries.all(team), 'list'],
      queryFn: ({ signal }) => readLimitSets(team, signal),
    }),
};

export const readLimitSets = async (team: string, signal?: AbortSignal) =>
  (await ask(under(team), { schema: limitSetsListSchema, ...(signal && { signal }) })).data.limitSets;

export const createLimitSet = async (team: string, body: z.input<typeof createLimitSetSchema>, key: string) =>
  (await ask(under(team), { method: 'POST', body, key, schema: limitSetSchema })).data;

/** @throws {ProblemError} with the set as it is now in `current`, where it has changed since */
export const changeLimitSet = async (team: string, set: LimitSet, limits: VettingLimits) =>
  (
    await ask(`${under(team)}/${set.id}`, {
      method: 'PUT',
      body: { limits },
      ifMatch: etagOf(set),
      schema: limitSetSchema,
    })
  ).data;

/** @throws {ProblemError} as `changeLimitSet` */
export const removeLimitSet = (team: string, set: LimitSet) =>
  ask(`${under(team)}/${set.id}`, { method: 'DELETE', ifMatch: etagOf(set) });

/** The set that a lost race (412) is answered with; null where the answer holds none. */
export const readCurrentLimitSet = (current: unknown): LimitSet | null =>
  limitSetSchema.safeParse(current).data ?? null;
