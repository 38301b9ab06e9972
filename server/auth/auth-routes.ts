import { CredentialsSignin } from '@auth/core/errors';
import { ExpressAuth, type ExpressAuthConfig } from '@auth/express';
import Credentials from '@auth/express/providers/credentials';
import express, { type RequestHandler } from 'express';
import type { ServerDeps } from '../feature.ts';
import { originGate } from '../http/origin-gate.ts';
import { rateLimiter } from '../http/rate-limiter.ts';
import { endSession } from './sessions.ts';
import { findUser } from './session-queries.ts';
import { claimsOf, sessionSeconds, tokenFieldsOf, type SessionClaims } from './session-token.ts';
import { signIn, signInGate } from './sign-in.ts';
import { tokenSettings } from './sign-in-state.ts';

declare module '@auth/core/types' {
  interface User {
    claims?: SessionClaims;
  }
}

const bodyLimit = 10_000;

/** Signing in and out by Auth.js, for `app.use('/auth', …)`; nothing falls through. */
export function authRoutes(deps: ServerDeps): RequestHandler[] {
  const { origins } = deps;
  return [
    originGate(origins, { takesBearer: false }),
    express.json({ limit: bodyLimit }),
    express.urlencoded({ extended: false, limit: bodyLimit }),
    signInGate(rateLimiter(deps), origins[0]),
    protocolOf(origins),
    ExpressAuth(authConfig(deps)),
  ];
}

/**
 * Auth.js builds addresses from the request. The Host is one of ours by now, and its origin says whether the other
 * end speaks https, whatever stands between.
 */
function protocolOf(origins: readonly string[]): RequestHandler {
  const protocols = new Map(
    origins.map((origin) => [new URL(origin).host, new URL(origin).protocol.slice(0, -1)]),
  );
  return (request, _response, next) => {
    Object.defineProperty(request, 'protocol', { value: protocols.get(request.headers.host ?? '') });
    next();
  };
}

function authConfig(deps: ServerDeps): ExpressAuthConfig {
  const { database, logger } = deps;
  const { secret, secure } = tokenSettings(deps);
  return {
    basePath: '/auth',
    secret,
    trustHost: true,
    useSecureCookies: secure,
    session: { strategy: 'jwt', maxAge: sessionSeconds },
    pages: { signIn: '/sign-in', error: '/sign-in', signOut: '/sign-in' },
    logger: {
      // A wrong password or an address not yet verified is no error of ours.
      error: (error) =>
        logger[error instanceof CredentialsSignin ? 'debug' : 'error']({ err: error }, 'sign-in'),
      warn: (code) => logger.warn({ code }, 'sign-in'),
      debug: () => undefined,
    },
    providers: [
      Credentials({
        credentials: { email: {}, password: {} },
        authorize: async (typed, request) => {
          const claims = await signIn(database.db, typed, request.headers.get('user-agent') ?? undefined);
          return claims && { id: String(claims.userId), claims };
        },
      }),
    ],
    callbacks: {
      // At sign-in the user is there; later only the token, which counts as long as its session's row does.
      jwt: async ({ token, user }) => {
        if (user?.claims) return tokenFieldsOf(user.claims);
        const claims = claimsOf(token);
        return claims && (await findUser(database.db, claims)) ? token : null;
      },
      session: ({ session, token }) => ({
        expires: session.expires,
        user: { id: String(claimsOf(token)?.userId) },
      }),
    },
    events: {
      signOut: async (message) => {
        const claims = 'token' in message ? claimsOf(message.token) : undefined;
        if (claims) await endSession(database.db, claims.userId, claims.sessionId);
      },
    },
  };
}
