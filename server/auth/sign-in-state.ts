import type { RequestHandler } from 'express';
import type { Database } from '../db/client.ts';
import type { ServerDeps } from '../feature.ts';
import { claimsReader, type SessionClaims, type TokenSettings } from './session-token.ts';

interface SignInState {
  readonly db: Database;
  readonly claims: SessionClaims | undefined;
}

const states = new WeakMap<object, SignInState>();

export const tokenSettings = ({
  config,
  origins,
}: Pick<ServerDeps, 'config' | 'origins'>): TokenSettings => ({
  secret: config.authSecret,
  secure: origins[0].startsWith('https:'),
});

/** Reads each request's cookie; what it claims is believed only by `requireUser` and `requireTeam`. */
export function readSignIn(deps: ServerDeps): RequestHandler {
  const read = claimsReader(tokenSettings(deps));
  return async (request, _response, next) => {
    states.set(request, { db: deps.database.db, claims: await read(request) });
    next();
  };
}

/** What the request's cookie claims, and the database to hold it against. */
export function signInStateOf(request: object): SignInState {
  const state = states.get(request);
  if (!state) throw new Error('readSignIn has not seen this request.');
  return state;
}
