import { randomBytes } from 'node:crypto';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { insertTable } from '../../server/features/tables/store.ts';
import type { Role } from '../../shared/contract/index.ts';
import { sineDefinition } from './library.ts';
import { freshAddress } from './outbox.ts';
import { asPerson, join, makePerson, makeSession, type TestPerson, type TestTeam } from './people.ts';
import type { TestApp } from './test-app.ts';

/** One request that whoever may is answered with `status`; made anew for each sender, as sending it changes things. */
export interface Attempt {
  readonly path: string;
  readonly body?: object;
  readonly headers?: Record<string, string>;
  readonly status: number;
}

export interface Target {
  readonly test: TestApp;
  readonly team: TestTeam;
  /** An admin of the team. */
  readonly admin: TestPerson;
}

export interface RouteCase {
  /** Whoever has less gets 401 (not signed in), 404 (of another team) or 403 (too low a role). */
  readonly access: 'anyone' | 'signed-in' | Role;
  /** @param sender who is going to send it; undefined for nobody */
  readonly attempt: (target: Target, sender: TestPerson | undefined) => Promise<Attempt>;
}

const built = buildRevision(sineDefinition('Trespass'));

/** A new table of the team, with one revision and version 1; answers its address. */
export const freshTable = ({ test, team, admin }: Target): Promise<string> =>
  insertTable(
    test.database.db,
    { teamId: team.id, userId: admin.id },
    { title: 'Trespass', tags: ['trespass'] },
    { built, playback: null, note: '' },
  );

export async function freshMember({ test, team }: Target): Promise<TestPerson> {
  const member = await makePerson(test, 'Somebody Else');
  await join(test, team.id, member, 'viewer');
  return member;
}

export async function freshInvitation({ test, team, admin }: Target): Promise<number> {
  const response = await asPerson(test, admin).post(`/teams/${team.slug}/invitations`, {
    email: freshAddress(),
    role: 'viewer',
  });
  if (response.status !== 201) throw new Error(response.text);
  return response.body.id;
}

const noToken = () => ({ token: randomBytes(32).toString('base64url') });

const always =
  (status: number, path: string, body?: object): RouteCase['attempt'] =>
  () =>
    Promise.resolve({ path, body, status });

const inTeam =
  (status: number, below: string, body?: object): RouteCase['attempt'] =>
  ({ team }) =>
    Promise.resolve({ path: `/teams/${team.slug}${below}`, body, status });

const ofTable =
  (status: number, below: string, body?: object, headers?: Record<string, string>): RouteCase['attempt'] =>
  async (target) => ({
    path: `/teams/${target.team.slug}/tables/${await freshTable(target)}${below}`,
    body,
    headers,
    status,
  });

const seen = { 'If-Match': '"1"' };
const saved = { definition: sineDefinition('Trespass') };

/** Every route there is. A link's token that nobody was sent is 404 to everybody; an empty body is 422 to who may. */
export const routeCases: Readonly<Record<string, RouteCase>> = {
  'GET /teams/:team/tables': { access: 'viewer', attempt: inTeam(200, '/tables') },
  'POST /teams/:team/tables': {
    access: 'author',
    attempt: inTeam(201, '/tables', { title: 'Trespass', ...saved }),
  },
  'GET /teams/:team/tables/:table': { access: 'viewer', attempt: ofTable(200, '') },
  'PATCH /teams/:team/tables/:table': { access: 'author', attempt: ofTable(200, '', { title: 'New' }, seen) },
  'POST /teams/:team/tables/:table/archive': { access: 'author', attempt: ofTable(200, '/archive') },
  'POST /teams/:team/tables/:table/restore': { access: 'author', attempt: ofTable(200, '/restore') },
  'POST /teams/:team/tables/:table/duplicate': { access: 'author', attempt: ofTable(201, '/duplicate') },
  'GET /teams/:team/tables/:table/revisions': { access: 'viewer', attempt: ofTable(200, '/revisions') },
  'POST /teams/:team/tables/:table/revisions': {
    access: 'author',
    attempt: ofTable(201, '/revisions', saved, seen),
  },
  'GET /teams/:team/tables/:table/revisions/:number': {
    access: 'viewer',
    attempt: ofTable(200, '/revisions/1'),
  },
  'GET /teams/:team/tables/:table/revisions/:number/export': {
    access: 'viewer',
    attempt: ofTable(200, '/revisions/1/export?target=c99'),
  },
  'GET /teams/:team/tags': { access: 'viewer', attempt: inTeam(200, '/tags') },

  'GET /teams': { access: 'signed-in', attempt: always(200, '/teams') },
  'POST /teams': { access: 'signed-in', attempt: always(201, '/teams', { name: 'Tenth Fathom' }) },
  'GET /teams/:team': { access: 'viewer', attempt: inTeam(200, '') },
  'PATCH /teams/:team': {
    access: 'admin',
    attempt: async ({ test, team, admin }) => {
      const { headers } = await asPerson(test, admin).get(`/teams/${team.slug}`);
      return {
        path: `/teams/${team.slug}`,
        body: { name: 'Renamed' },
        headers: { 'If-Match': headers.etag },
        status: 200,
      };
    },
  },
  'GET /teams/:team/members': { access: 'viewer', attempt: inTeam(200, '/members') },
  'PATCH /teams/:team/members/:userId': {
    access: 'admin',
    attempt: async (target) => ({
      path: `/teams/${target.team.slug}/members/${(await freshMember(target)).id}`,
      body: { role: 'author' },
      status: 200,
    }),
  },
  // Of somebody else: all but admins may only leave themselves.
  'DELETE /teams/:team/members/:userId': {
    access: 'admin',
    attempt: async (target) => ({
      path: `/teams/${target.team.slug}/members/${(await freshMember(target)).id}`,
      status: 204,
    }),
  },
  'GET /teams/:team/invitations': { access: 'admin', attempt: inTeam(200, '/invitations') },
  'POST /teams/:team/invitations': {
    access: 'admin',
    attempt: (target) =>
      inTeam(201, '/invitations', { email: freshAddress(), role: 'viewer' })(target, undefined),
  },
  'DELETE /teams/:team/invitations/:id': {
    access: 'admin',
    attempt: async (target) => ({
      path: `/teams/${target.team.slug}/invitations/${await freshInvitation(target)}`,
      status: 204,
    }),
  },
  'POST /invitations/open': { access: 'anyone', attempt: always(404, '/invitations/open', noToken()) },
  'POST /invitations/accept': { access: 'signed-in', attempt: always(404, '/invitations/accept', noToken()) },

  'POST /account/sign-up': {
    access: 'anyone',
    attempt: () =>
      always(202, '/account/sign-up', { name: 'New', email: freshAddress(), password: 'nine fathoms deep' })(
        {} as Target,
        undefined,
      ),
  },
  'POST /account/resend-verification': {
    access: 'anyone',
    attempt: () =>
      Promise.resolve({ path: '/account/resend-verification', body: { email: freshAddress() }, status: 202 }),
  },
  'POST /account/forgot-password': {
    access: 'anyone',
    attempt: () =>
      Promise.resolve({ path: '/account/forgot-password', body: { email: freshAddress() }, status: 202 }),
  },
  'POST /account/verify-address': {
    access: 'anyone',
    attempt: always(404, '/account/verify-address', noToken()),
  },
  'POST /account/reset-password': {
    access: 'anyone',
    attempt: always(404, '/account/reset-password', { ...noToken(), password: 'nine fathoms deep' }),
  },
  'POST /account/confirm-address': {
    access: 'anyone',
    attempt: always(404, '/account/confirm-address', noToken()),
  },
  'GET /account': { access: 'signed-in', attempt: always(200, '/account') },
  'PATCH /account': { access: 'signed-in', attempt: always(200, '/account', { name: 'Same' }) },
  'DELETE /account': { access: 'signed-in', attempt: always(422, '/account', {}) },
  'POST /account/change-password': {
    access: 'signed-in',
    attempt: always(422, '/account/change-password', {}),
  },
  'POST /account/change-address': {
    access: 'signed-in',
    attempt: always(422, '/account/change-address', {}),
  },
  'GET /account/sessions': { access: 'signed-in', attempt: always(200, '/account/sessions') },
  'DELETE /account/sessions': { access: 'signed-in', attempt: always(204, '/account/sessions') },
  'DELETE /account/sessions/:id': {
    access: 'signed-in',
    attempt: async ({ test, admin }, sender) => ({
      path: `/account/sessions/${(await makeSession(test, (sender ?? admin).id)).sessionId}`,
      status: 204,
    }),
  },

  'POST /report': { access: 'anyone', attempt: always(200, '/report', saved.definition) },
  'POST /render': { access: 'anyone', attempt: always(200, '/render', { ...saved, target: 'c99' }) },
  'GET /health': { access: 'anyone', attempt: always(200, '/health') },
  'GET /openapi.json': { access: 'anyone', attempt: always(200, '/openapi.json') },
  // There with the private database on this machine only, as in these tests.
  'GET /mailbox': { access: 'anyone', attempt: always(200, '/mailbox') },
  'GET /mailbox/:id': { access: 'anyone', attempt: always(404, '/mailbox/999999999') },
};
