import type { RequestHandler } from 'express';
import { includesRole, type Role } from '../../shared/contract/index.ts';
import { Problem } from '../http/problem.ts';
import { findMember, findUser, noteSeen, type SessionRow } from './session-queries.ts';
import { signInStateOf } from './sign-in-state.ts';

export interface Person {
  readonly id: number;
  readonly name: string;
  readonly email: string;
}

/** Who asks, and in which team: all that a command needs to know about the two. */
export interface TeamScope {
  readonly teamId: number;
  readonly teamSlug: string;
  readonly role: Role;
  readonly user: Person;
}

const people = new WeakMap<object, { readonly user: Person; readonly sessionId: string }>();
const scopes = new WeakMap<object, TeamScope>();

/** Lets only signed-in people through (401). The session's row is read each time: ending it works at once. */
export const requireUser: RequestHandler = async (request, _response, next) => {
  const { db, claims } = signInStateOf(request);
  await admit(request, claims && (await findUser(db, claims)));
  next();
};

/**
 * Lets only members of the team in `:team` through, with `role` or one that includes it: 401 for nobody, 404 for
 * who does not belong to it (another team's things do not exist), 403 for too low a role.
 */
export function requireTeam(role: Role): RequestHandler<{ team: string }> {
  return async (request, _response, next) => {
    const { db, claims } = signInStateOf(request);
    const teamSlug = request.params.team;
    const row = claims && (await findMember(db, claims, teamSlug));
    const user = await admit(request, row);
    if (!row?.teamId || !row.role)
      throw new Problem('not-found', { detail: `You have no team named ${teamSlug}.` });
    if (!includesRole(row.role, role)) {
      throw new Problem('forbidden', {
        detail: `This takes the role ${role}; yours in ${teamSlug} is ${row.role}.`,
      });
    }
    scopes.set(request, { teamId: row.teamId, teamSlug, role: row.role, user });
    next();
  };
}

/** The person that `requireUser` or `requireTeam` let through. */
export const userOf = (request: object): Person => personOf(request).user;

/** The session that the request came with. */
export const sessionIdOf = (request: object): string => personOf(request).sessionId;

/** The team and member that `requireTeam` let through. */
export function teamOf(request: object): TeamScope {
  const scope = scopes.get(request);
  if (!scope) throw new Error('The route lacks requireTeam.');
  return scope;
}

async function admit(request: object, row: SessionRow | undefined): Promise<Person> {
  if (!row) {
    throw new Problem('unauthorized', { headers: { 'WWW-Authenticate': 'Bearer realm="Stepwell"' } });
  }
  const user = { id: row.userId, name: row.name, email: row.email };
  people.set(request, { user, sessionId: row.sessionId });
  await noteSeen(signInStateOf(request).db, row);
  return user;
}

function personOf(request: object) {
  const person = people.get(request);
  if (!person) throw new Error('The route lacks requireUser or requireTeam.');
  return person;
}
