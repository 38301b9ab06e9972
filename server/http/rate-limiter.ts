import { createHash } from 'node:crypto';
import type { RequestHandler, Request, Response } from 'express';
import { RateLimiterMySQL, RateLimiterRes } from 'rate-limiter-flexible';
import { connectionOptions } from '../db/client.ts';
import { errno, errnoOf } from '../db/errors.ts';
import type { ServerDeps } from '../feature.ts';
import { Problem } from './problem.ts';
import { ratePolicies, type RatePolicy, type RatePolicyName } from './rate-policies.ts';

/** Where a sender stands with a policy. */
export interface Standing {
  readonly policy: RatePolicyName;
  readonly remaining: number;
  readonly resetSeconds: number;
  readonly isOver: boolean;
}

export interface RateLimiter {
  /** Counts `points` for the key and answers where it stands; counts on even where it is over. */
  count(policy: RatePolicyName, key: string, points?: number): Promise<Standing>;
  /** Forgets what was counted for the key. */
  forgive(policy: RatePolicyName, key: string): Promise<void>;
}

/** Counts in the database's `rate_limits`. Keys are kept hashed: they name people and network addresses. */
export function rateLimiter(
  { config, database }: Pick<ServerDeps, 'config' | 'database'>,
  policies: Readonly<Record<RatePolicyName, RatePolicy>> = ratePolicies,
): RateLimiter {
  const counters = new Map<RatePolicyName, RateLimiterMySQL>();
  const counterOf = (policy: RatePolicyName) => {
    const made =
      counters.get(policy) ??
      new RateLimiterMySQL({
        storeClient: database.pool.pool,
        storeType: 'pool',
        dbName: connectionOptions(config.databaseUrl).database,
        tableName: 'rate_limits',
        tableCreated: true,
        clearExpiredByTimeout: false,
        keyPrefix: policy,
        points: policies[policy].quota,
        duration: policies[policy].seconds,
      });
    counters.set(policy, made);
    return made;
  };
  const nameOf = (key: string) => createHash('sha256').update(key).digest('hex');

  return {
    async count(policy, key, points = 1) {
      const result = await counted(() => counterOf(policy).consume(nameOf(key), points));
      return {
        policy,
        remaining: result.remainingPoints,
        resetSeconds: Math.max(1, Math.ceil(result.msBeforeNext / 1000)),
        isOver: result.consumedPoints > policies[policy].quota,
      };
    },
    async forgive(policy, key) {
      await counterOf(policy).delete(nameOf(key));
    },
  };
}

/** The package rejects with its result where the limit is passed, and with an error where counting failed. */
async function counted(consume: () => Promise<RateLimiterRes>): Promise<RateLimiterRes> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await consume();
    } catch (reason) {
      if (reason instanceof RateLimiterRes) return reason;
      if (attempt === 5 || errnoOf(reason) !== errno.deadlock) throw reason;
    }
  }
}

/**
 * Tells the sender where it stands (draft-ietf-httpapi-ratelimit-headers) and ends what is over the limit.
 *
 * @throws {Problem} `too-many-requests` (429) with Retry-After
 */
export function heed(response: Response, { policy, remaining, resetSeconds, isOver }: Standing): void {
  const { quota, seconds } = ratePolicies[policy];
  response.append('RateLimit-Policy', `"${policy}";q=${quota};w=${seconds}`);
  response.append('RateLimit', `"${policy}";r=${remaining};t=${resetSeconds}`);
  if (!isOver) return;
  throw new Problem('too-many-requests', {
    detail: `At most ${quota} in ${sayDuration(seconds)} (${policy}); try again in ${sayDuration(resetSeconds)}.`,
    headers: { 'Retry-After': String(resetSeconds) },
  });
}

/** A route's own limit, for each key. */
export const limitRate =
  (limiter: RateLimiter, policy: RatePolicyName, keyOf: (request: Request) => string): RequestHandler =>
  async (request, response, next) => {
    heed(response, await limiter.count(policy, keyOf(request)));
    next();
  };

function sayDuration(seconds: number): string {
  const [count, unit] =
    seconds < 120
      ? [seconds, 'second']
      : seconds < 7200
        ? [seconds / 60, 'minute']
        : [seconds / 3600, 'hour'];
  const whole = Math.ceil(count);
  return `${whole} ${unit}${whole === 1 ? '' : 's'}`;
}
