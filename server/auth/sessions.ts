import { randomBytes } from 'node:crypto';
import { and, eq, isNull, ne } from 'drizzle-orm';
import type { CookieOptions, Response } from 'express';
import type { Executor } from '../db/client.ts';
import { sessions } from '../db/schema/index.ts';
import {
  cookieName,
  sealClaims,
  sessionSeconds,
  type SessionClaims,
  type TokenSettings,
} from './session-token.ts';

/** Notes a new sign-in. `sessionVersion` is the one read together with what proved the person. */
export async function startSession(
  executor: Executor,
  person: { readonly userId: number; readonly sessionVersion: number },
  userAgent: string | undefined,
): Promise<SessionClaims> {
  const now = Date.now();
  const claims = { ...person, sessionId: randomBytes(16).toString('base64url') };
  await executor.insert(sessions).values({
    id: claims.sessionId,
    userId: person.userId,
    sessionVersion: person.sessionVersion,
    client: clientName(userAgent),
    lastSeenAt: new Date(now),
    expiresAt: new Date(now + sessionSeconds * 1000),
  });
  return claims;
}

/** Ends one session of a person; answers whether there was one to end. */
export async function endSession(executor: Executor, userId: number, sessionId: string): Promise<boolean> {
  const [{ affectedRows }] = await executor
    .update(sessions)
    .set({ revokedAt: new Date() })
    .where(and(eq(sessions.id, sessionId), eq(sessions.userId, userId), isNull(sessions.revokedAt)));
  return affectedRows > 0;
}

/** Ends all sessions of a person but one, or all of them. */
export async function endSessions(executor: Executor, userId: number, but?: string): Promise<void> {
  await executor
    .update(sessions)
    .set({ revokedAt: new Date() })
    .where(
      and(eq(sessions.userId, userId), isNull(sessions.revokedAt), but ? ne(sessions.id, but) : undefined),
    );
}

const cookieOptions = (secure: boolean): CookieOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  path: '/',
  secure,
});

/** Puts a session into the answer's cookie, as Auth.js does at sign-in. */
export async function setSessionCookie(response: Response, claims: SessionClaims, settings: TokenSettings) {
  response.cookie(cookieName(settings.secure), await sealClaims(claims, settings), {
    ...cookieOptions(settings.secure),
    maxAge: sessionSeconds * 1000,
  });
}

export function clearSessionCookie(response: Response, { secure }: TokenSettings): void {
  response.clearCookie(cookieName(secure), cookieOptions(secure));
}

/** The browser as it names itself, on one line and shortened. */
const clientName = (userAgent = '') =>
  userAgent
    .replace(/\p{C}+/gu, ' ')
    .trim()
    .slice(0, 200) || 'unknown';
