import { decode, encode } from '@auth/core/jwt';
import type { Request } from 'express';
import { z } from 'zod';

/** How long a sign-in lasts at most, in seconds: 30 days, as NIST SP 800-63B §4.1.3 has it for level 1. */
export const sessionSeconds = 30 * 24 * 3600;

/** What the cookie says. Whether it still counts, the session's row says. */
export interface SessionClaims {
  readonly userId: number;
  readonly sessionId: string;
  readonly sessionVersion: number;
}

export interface TokenSettings {
  readonly secret: string;
  /** Whether the application is open at an https address. */
  readonly secure: boolean;
}

/** The cookie as Auth.js names it; over https the prefix keeps other hosts from planting one (RFC 6265bis §4.1.3). */
export const cookieName = (secure: boolean) => `${secure ? '__Secure-' : ''}authjs.session-token`;

/** The claims as they stand in the encrypted token. */
export const tokenFieldsOf = ({ userId, sessionId, sessionVersion }: SessionClaims) => ({
  uid: userId,
  sid: sessionId,
  sv: sessionVersion,
});

const tokenSchema = z.object({ uid: z.int(), sid: z.string(), sv: z.int(), exp: z.number() });

/** Reads the claims out of a decrypted token; undefined where it is none of ours. */
export function claimsOf(token: unknown): (SessionClaims & { readonly expiresAt: number }) | undefined {
  const { data } = tokenSchema.safeParse(token);
  return (
    data && { userId: data.uid, sessionId: data.sid, sessionVersion: data.sv, expiresAt: data.exp * 1000 }
  );
}

/** Encrypts the claims into a new cookie value. */
export const sealClaims = (claims: SessionClaims, { secret, secure }: TokenSettings) =>
  encode({ token: tokenFieldsOf(claims), secret, salt: cookieName(secure), maxAge: sessionSeconds });

/** Decrypting costs more than the query after it: this many cookies are remembered. */
const remembered = 2000;

/** Answers who a request's cookie says it comes from. A request with an Authorization header has no cookies for us. */
export function claimsReader({ secret, secure }: TokenSettings) {
  const name = cookieName(secure);
  const known = new Map<string, SessionClaims & { readonly expiresAt: number }>();

  return async (request: Request): Promise<SessionClaims | undefined> => {
    if (request.headers.authorization !== undefined) return undefined;
    const sealed = cookieOf(request.headers.cookie, name);
    if (!sealed) return undefined;
    const claims =
      known.get(sealed) ?? claimsOf(await decode({ token: sealed, secret, salt: name }).catch(() => null));
    if (!claims) return undefined;
    known.delete(sealed);
    if (claims.expiresAt <= Date.now()) return undefined;
    known.set(sealed, claims);
    if (known.size > remembered)
      for (const oldest of known.keys()) if (known.size > remembered) known.delete(oldest);
    return claims;
  };
}

function cookieOf(header: string | undefined, name: string): string | undefined {
  for (const pair of header?.split(';') ?? []) {
    const at = pair.indexOf('=');
    if (at > 0 && pair.slice(0, at).trim() === name) return pair.slice(at + 1).trim();
  }
  return undefined;
}
