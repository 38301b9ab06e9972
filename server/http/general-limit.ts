import type { RequestHandler } from 'express';
import { signInStateOf } from '../auth/sign-in-state.ts';
import { networkOf } from './network.ts';
import { heed, type RateLimiter, type Standing } from './rate-limiter.ts';
import type { RatePolicyName } from './rate-policies.ts';

/** A process draws so many requests at a time from the shared count: the database is asked once for all of them. */
const share = 25;

/** Senders whose shares are remembered. */
const remembered = 10_000;

interface Share {
  left: number;
  standing: Standing;
  readonly endsAt: number;
}

/**
 * The limit on the whole API, for each person, and for each network that nobody is signed in from. What a process has
 * drawn and not spent when the time is over is lost, so with n processes a sender may get up to n · 24 requests less
 * than the quota, and never more.
 */
export function generalLimit(limiter: RateLimiter): RequestHandler {
  const shares = new Map<string, Promise<Share>>();

  async function draw(policy: RatePolicyName, key: string): Promise<Share> {
    const standing = await limiter.count(policy, key, share);
    return { left: share, standing, endsAt: Date.now() + standing.resetSeconds * 1000 };
  }

  async function spend(policy: RatePolicyName, key: string): Promise<Standing> {
    const held = shares.get(key);
    const current = await held;
    const isGood = current && Date.now() < current.endsAt && (current.left > 0 || current.standing.isOver);
    if (!isGood) {
      // Whoever comes first draws; those who wait for the same share look again at what is left of it.
      if (shares.get(key) === held) keep(key, draw(policy, key));
      return spend(policy, key);
    }
    current.left -= 1;
    const { standing, left, endsAt } = current;
    return {
      ...standing,
      remaining: standing.isOver ? 0 : standing.remaining + left,
      resetSeconds: Math.max(1, Math.ceil((endsAt - Date.now()) / 1000)),
    };
  }

  function keep(key: string, drawn: Promise<Share>): void {
    shares.delete(key);
    shares.set(key, drawn);
    drawn.catch(() => shares.get(key) === drawn && shares.delete(key));
    for (const oldest of shares.keys()) {
      if (shares.size <= remembered) break;
      shares.delete(oldest);
    }
  }

  return async (request, response, next) => {
    const { claims } = signInStateOf(request);
    const standing = claims
      ? await spend('api', `person ${claims.userId}`)
      : await spend('api-unknown', `network ${networkOf(request)}`);
    heed(response, standing);
    next();
  };
}
