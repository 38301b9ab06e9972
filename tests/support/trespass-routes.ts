import { randomBytes } from 'node:crypto';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { insertTable } from '../../server/features/tables/store.ts';
import type { Role } from '../../shared/contract/index.ts';
import { sineDefinition } from './library.ts';
import { boardCases } from './trespass-boards.ts';
import { originalCases } from './trespass-originals.ts';
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
export const freshTable = ({ test, team, admin }: Target, maker = admin): Promise<string> =>
  insertTable(
    test.database.db,
    { teamId: team.id, userId: maker.id },
    { title: 'Trespass', tags: ['trespass'] },
    { built, playback: null, note: '' },
  );

export async function freshMember({ test, team }: Target, role: Role = 'viewer'): Promise<TestPerson> {
  const member = await makePerson(test, 'Somebody Else');
  await join(test, team.id, member, role);
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
const ofRevision = (status: number, below: string, body?: object): RouteCase['attempt'] =>
  ofTable(status, `/revisions/1${below}`, body);

export async function freshLimits({ test, team, admin }: Target): Promise<number> {
  const limits = { tag: `tag ${randomBytes(6).toString('hex')}`, limits: { maxTableBytes: 512 } };
  const response = await asPerson(test, admin).post(`/teams/${team.slug}/limit-sets`, limits);
  if (response.status !== 201) throw new Error(response.text);
  return response.body.id;
}

/** A revision by somebody who asks for nothing else, brought so far that the attempt is the next thing to do with it. */
const ofReview =
  (below: 'verdict' | 'withdraw', body: object): RouteCase['attempt'] =>
  async (target) => {
    const { test, team, admin } = target;
    const maker = await freshMember(target, 'author');
    const revision = `/teams/${team.slug}/tables/${await freshTable(target, maker)}/revisions/1`;
    await asPerson(test, maker).post(`${revision}/submit`, { message: 'Please look.' });
    if (below === 'withdraw') {
      await asPerson(test, admin)
        .post(`${revision}/verdict`, { verdict: 'vetted', note: 'Right.' })
        .set('If-Match', '"2"');
    }
    const headers = { 'If-Match': below === 'verdict' ? '"2"' : '"3"' };
    return { path: `${revision}/${below}`, body, headers, status: 200 };
  };
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
  'GET /teams/:team/tables/:table/revisions/:number/review': {
    access: 'viewer',
    attempt: ofRevision(200, '/review'),
  },
  'POST /teams/:team/tables/:table/revisions/:number/submit': {
    access: 'author',
    attempt: ofRevision(200, '/submit', { message: 'Please look.' }),
  },
  'POST /teams/:team/tables/:table/revisions/:number/verdict': {
    access: 'reviewer',
    attempt: ofReview('verdict', { verdict: 'vetted', note: 'Right.' }),
  },
  'POST /teams/:team/tables/:table/revisions/:number/withdraw': {
    access: 'reviewer',
    attempt: ofReview('withdraw', { reason: 'Wrong after all.' }),
  },
  'GET /teams/:team/tables/:table/revisions/:number/comments': {
    access: 'viewer',
    attempt: ofRevision(200, '/comments'),
  },
  'POST /teams/:team/tables/:table/revisions/:number/comments': {
    access: 'author',
    attempt: ofRevision(201, '/comments', { text: 'Why so?' }),
  },
  'GET /teams/:team/reviews': { access: 'viewer', attempt: inTeam(200, '/reviews') },
  'GET /teams/:team/limit-sets': { access: 'viewer', attempt: inTeam(200, '/limit-sets') },
  'POST /teams/:team/limit-sets': {
    access: 'admin',
    attempt: (target) =>
      inTeam(201, '/limit-sets', {
        tag: `tag ${randomBytes(6).toString('hex')}`,
        limits: { maxTableBytes: 512 },
      })(target, undefined),
  },
  'PUT /teams/:team/limit-sets/:id': {
    access: 'admin',
    attempt: async (target) => ({
      path: `/teams/${target.team.slug}/limit-sets/${await freshLimits(target)}`,
      body: { limits: { maxTableBytes: 256 } },
      headers: seen,
      status: 200,
    }),
  },
  'DELETE /teams/:team/limit-sets/:id': {
    access: 'admin',
    attempt: async (target) => ({
      path: `/teams/${target.team.slug}/limit-sets/${await freshLimits(target)}`,
      headers: seen,
      status: 204,
    }),
  },
  ...originalCases,
  ...boardCases,
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

  'GET /account/notices': { access: 'signed-in', attempt: always(200, '/account/notices') },
  'PATCH /account/notices': {
    access: 'signed-in',
    attempt: always(200, '/account/notices', { comment: true }),
  },
  'POST /notices/unsubscribe': { access: 'anyone', attempt: always(404, '/notices/unsubscribe', noToken()) },
  'GET /notices/unsubscribe': {
    access: 'anyone',
    attempt: always(303, `/notices/unsubscribe?token=${noToken().token}`),
  },
  'GET /teams/:team/audit': { access: 'reviewer', attempt: inTeam(200, '/audit') },
  'GET /teams/:team/audit.csv': { access: 'reviewer', attempt: inTeam(200, '/audit.csv') },

  'POST /report': { access: 'anyone', attempt: always(200, '/report', saved.definition) },
  'POST /render': { access: 'anyone', attempt: always(200, '/render', { ...saved, target: 'c99' }) },
  'GET /health': { access: 'anyone', attempt: always(200, '/health') },
  'GET /openapi.json': { access: 'anyone', attempt: always(200, '/openapi.json') },
  // There with the private database on this machine only, as in these tests.
  'GET /mailbox': { access: 'anyone', attempt: always(200, '/mailbox') },
  'GET /mailbox/:id': { access: 'anyone', attempt: always(404, '/mailbox/999999999') },
};
