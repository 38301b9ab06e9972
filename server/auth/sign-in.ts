import { AsyncLocalStorage } from 'node:async_hooks';
import { CredentialsSignin } from '@auth/core/errors';
import { eq } from 'drizzle-orm';
import type { RequestHandler, Response } from 'express';
import { z } from 'zod';
import { emailField } from '../../shared/contract/index.ts';
import type { Database } from '../db/client.ts';
import { users } from '../db/schema/index.ts';
import { networkOf } from '../http/network.ts';
import { Problem } from '../http/problem.ts';
import { heed, type RateLimiter } from '../http/rate-limiter.ts';
import type { RatePolicyName } from '../http/rate-policies.ts';
import { checkPassword } from './passwords.ts';
import type { SessionClaims } from './session-token.ts';
import { startSession } from './sessions.ts';

/** The address has not been verified; told only to who knows the password. */
class Unverified extends CredentialsSignin {
  override code = 'unverified';
}

const credentialsSchema = z.object({ email: emailField, password: z.string().max(200) });

/** What lies between the gate, which sees the request, and `signIn`, which Auth.js calls. */
const attempts = new AsyncLocalStorage<{ forgive(): Promise<void> }>();

/** Counts tries to sign in, before anything is computed for them. `signIn` runs behind this gate only. */
export function signInGate(limiter: RateLimiter, origin: string): RequestHandler {
  return async (request, response, next) => {
    if (request.method !== 'POST' || !/^\/callback(\/|$)/i.test(request.path)) {
      next();
      return;
    }
    const email = emailField.safeParse((request.body as { email?: unknown } | undefined)?.email).data ?? '';
    const network = networkOf(request);
    const keys = {
      'sign-in-network': network,
      'sign-in': `${email} ${network}`,
      'sign-in-address': email,
    } as const;
    for (const policy of ['sign-in-network', 'sign-in', 'sign-in-address'] as const) {
      await countTry(response, limiter, policy, keys[policy], origin);
    }
    const forgive = async () => {
      for (const policy of ['sign-in', 'sign-in-address'] as const)
        await limiter.forgive(policy, keys[policy]);
    };
    attempts.run({ forgive }, next);
  };
}

/** Auth.js tells its outcomes by an address to go on to; the refusal carries one too. */
async function countTry(
  response: Response,
  limiter: RateLimiter,
  policy: RatePolicyName,
  key: string,
  origin: string,
) {
  const standing = await limiter.count(policy, key);
  try {
    heed(response, standing);
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    const url = `${origin}/sign-in?error=CredentialsSignin&code=throttled`;
    throw new Problem(error.kind, { detail: error.message, headers: error.headers, extensions: { url } });
  }
}

/**
 * Proves a person by address and password and starts a session; null where the two do not belong together. An unknown
 * address takes as long as a wrong password and is answered alike.
 *
 * @throws {Unverified} where the password is right but the address was never verified
 */
export async function signIn(
  db: Database,
  typed: unknown,
  userAgent: string | undefined,
): Promise<SessionClaims | null> {
  const attempt = attempts.getStore();
  if (!attempt) throw new Error('signIn was reached without passing signInGate.');
  const { data } = credentialsSchema.safeParse(typed);
  const [user] = await db
    .select({
      userId: users.id,
      sessionVersion: users.sessionVersion,
      passwordHash: users.passwordHash,
      emailVerifiedAt: users.emailVerifiedAt,
    })
    .from(users)
    .where(eq(users.email, data?.email ?? ''));
  const isRight = await checkPassword(user?.passwordHash, data?.password ?? '');
  if (!user || !isRight) return null;
  if (!user.emailVerifiedAt) throw new Unverified();
  const { userId, sessionVersion } = user;
  const claims = await startSession(db, { userId, sessionVersion }, userAgent);
  await attempt.forgive();
  return claims;
}
