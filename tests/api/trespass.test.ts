import { asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildRouters } from '../../server/app.ts';
import {
  auditEvents,
  boardRevisions,
  boards,
  comments,
  memberships,
  oneTimeLinks,
  reviews,
  revisions,
  sessions,
  teamLimits,
  teams,
  users,
  waveTables,
} from '../../server/db/schema/index.ts';
import { listRoutes } from '../../server/http/routes.ts';
import { includesRole, type Role } from '../../shared/contract/index.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson, makeCrew, makePerson, makeSession, makeTeam, type TestPerson } from '../support/people.ts';
import { freshBoard } from '../support/trespass-boards.ts';
import {
  freshInvitation,
  freshLimits,
  freshMember,
  freshTable,
  routeCases,
  type Attempt,
  type RouteCase,
  type Target,
} from '../support/trespass-routes.ts';

let test: OwnTestApp;
let target: Target;
/** Another team, with things of every kind, that none of ours belongs to. */
let other: Target;
let senders: Record<string, TestPerson | undefined>;
let foreign: {
  table: string;
  board: string;
  userId: number;
  id: number;
  limitsId: number;
  sessionId: string;
};

beforeAll(async () => {
  test = await makeOwnTestApp();
  const { team, admin, viewer, author, reviewer } = await makeCrew(test);
  target = { test, team, admin };
  const stranger = await makePerson(test, 'Stella Strange');
  const theirs = await makeTeam(test, [{ person: stranger, role: 'admin' }], 'Elsewhere');
  other = { test, team: theirs, admin: stranger };
  // An address that no table of ours has.
  const table = 'only-theirs';
  await test.database.db
    .update(waveTables)
    .set({ slug: table })
    .where(eq(waveTables.slug, await freshTable(other)));
  const board = 'only-theirs';
  await test.database.db
    .update(boards)
    .set({ slug: board })
    .where(eq(boards.slug, await freshBoard(other)));
  foreign = {
    table,
    board,
    userId: (await freshMember(other)).id,
    id: await freshInvitation(other),
    limitsId: await freshLimits(other),
    sessionId: stranger.sessionId,
  };

  const expired = await makeSession(test, admin.id, { expiresAt: new Date(Date.now() - 1000) });
  const revoked = await makeSession(test, admin.id);
  await test.database.db
    .update(sessions)
    .set({ revokedAt: new Date() })
    .where(eq(sessions.id, revoked.sessionId));
  const outdated = await makeSession(test, admin.id);
  await test.database.db
    .update(sessions)
    .set({ sessionVersion: 0 })
    .where(eq(sessions.id, outdated.sessionId));
  senders = {
    nobody: undefined,
    stranger,
    viewer,
    author,
    reviewer,
    admin,
    expired: { ...admin, ...expired },
    revoked: { ...admin, ...revoked },
    'signed out everywhere': { ...admin, ...outdated },
    'broken cookie': { ...admin, cookie: `${admin.cookie.slice(0, -20)}${'A'.repeat(20)}` },
  };
});
afterAll(() => test.close());

const ours: readonly string[] = ['viewer', 'author', 'reviewer', 'admin'];

/** What a sender is to be answered: the one rule of the whole API. */
function expected({ access }: RouteCase, sender: string, status: number): number {
  if (access === 'anyone') return status;
  if (!ours.includes(sender) && sender !== 'stranger') return 401;
  if (access === 'signed-in') return status;
  if (sender === 'stranger') return 404;
  return includesRole(sender as Role, access) ? status : 403;
}

function send(person: TestPerson | undefined, route: string, { path, body, headers = {} }: Attempt) {
  const method = route.split(' ')[0].toLowerCase() as 'get' | 'post' | 'patch' | 'put' | 'delete';
  const request =
    method === 'get' ? asPerson(test, person).get(path) : asPerson(test, person)[method](path, body);
  return request.set(headers);
}

const allRoutes = () =>
  listRoutes(buildRouters(test.deps)).flatMap(({ path, methods }) =>
    methods.map((method) => `${method} ${path}`),
  );

it('knows every route that the routers have, and no other', () => {
  expect(Object.keys(routeCases).sort()).toEqual(allRoutes().sort());
});

describe('each route answers each sender as it should', () => {
  it.each(Object.entries(routeCases))('%s', async (route, routeCase) => {
    const answered: Record<string, number> = {};
    const right: Record<string, number> = {};
    for (const [name, person] of Object.entries(senders)) {
      const attempt = await routeCase.attempt(target, person);
      const response = await send(person, route, attempt);
      answered[name] = response.status;
      right[name] = expected(routeCase, name, attempt.status);
      if (response.status >= 400)
        expect(response.headers['content-type']).toMatch('application/problem+json');
    }
    expect(answered).toEqual(right);
  });
});

/** All that belongs to the other team, as it stands in the database. */
async function stateOfOther() {
  const { db } = test.database;
  const teamId = other.team.id;
  return {
    team: await db.select().from(teams).where(eq(teams.id, teamId)),
    tables: await db.select().from(waveTables).where(eq(waveTables.teamId, teamId)),
    revisions: await db
      .select({ id: revisions.id, state: revisions.state })
      .from(revisions)
      .where(eq(revisions.teamId, teamId)),
    boards: await db.select().from(boards).where(eq(boards.teamId, teamId)),
    boardRevisions: await db.select().from(boardRevisions).where(eq(boardRevisions.teamId, teamId)),
    reviews: await db.select().from(reviews).where(eq(reviews.teamId, teamId)),
    comments: await db.select().from(comments).where(eq(comments.teamId, teamId)),
    limits: await db.select().from(teamLimits).where(eq(teamLimits.teamId, teamId)),
    members: await db.select().from(memberships).where(eq(memberships.teamId, teamId)),
    links: await db.select().from(oneTimeLinks).where(eq(oneTimeLinks.teamId, teamId)),
    events: await db.select().from(auditEvents).where(eq(auditEvents.teamId, teamId)),
    people: await db.select().from(users).where(eq(users.id, foreign.userId)),
    sessions: await db
      .select({ id: sessions.id, revokedAt: sessions.revokedAt })
      .from(sessions)
      .where(eq(sessions.userId, other.admin.id))
      .orderBy(asc(sessions.id)),
  };
}

describe('an admin who names another team’s things', () => {
  const named = Object.keys(routeCases).filter(
    (route) => /:(table|board|userId|id)\b/.test(route) && !route.includes('mailbox'),
  );

  it.each(named)('is told that they do not exist: %s', async (route) => {
    const before = await stateOfOther();
    const { body, headers } = await routeCases[route].attempt(target, target.admin);
    const id = route.includes('/account/sessions')
      ? foreign.sessionId
      : route.includes('/limit-sets')
        ? foreign.limitsId
        : foreign.id;
    const path = route
      .split(' ')[1]
      .replace(':team', target.team.slug)
      .replace(':table', foreign.table)
      .replace(':board', foreign.board)
      .replace(':userId', String(foreign.userId))
      .replace(':id', String(id))
      .replace(':number', '1');
    const response = await send(target.admin, route, {
      path: `${path}${/export$/.test(path) ? '?target=c99' : ''}`,
      body,
      headers,
      status: 0,
    });
    expect(response.status, response.text).toBe(404);
    expect(response.text).not.toContain('Elsewhere');
    expect(await stateOfOther()).toEqual(before);
  });

  it.each(Object.keys(routeCases).filter((route) => route.includes(':team')))(
    'finds the team itself not there, with their and with own things below it: %s',
    async (route) => {
      const before = await stateOfOther();
      for (const things of [other, target]) {
        const attempt = await routeCases[route].attempt(things, things.admin);
        const path = attempt.path.replace(things.team.slug, other.team.slug);
        const response = await send(target.admin, route, { ...attempt, path });
        expect(response.status, response.text).toBe(404);
        expect(response.body.type).toBe('/problems/not-found');
      }
      const after = await stateOfOther();
      // What the attempts themselves had made for the other team to have.
      expect(after.team).toEqual(before.team);
      expect(after.tables.filter(({ id }) => before.tables.some((table) => table.id === id))).toEqual(
        before.tables,
      );
      expect(after.members).toEqual(expect.arrayContaining(before.members));
      expect(after.links).toEqual(expect.arrayContaining(before.links));
    },
  );

  it('finds nothing of theirs by any word of a query, and cannot go on where they were', async () => {
    await freshTable(other);
    await freshTable(other);
    const list = `/teams/${other.team.slug}/tables`;
    const theirs = await asPerson(test, other.admin).get(`${list}?limit=1`);
    expect(theirs.body.nextCursor).toEqual(expect.any(String));
    const own = `/teams/${target.team.slug}/tables`;
    const get = (path: string) => asPerson(test, target.admin).get(path);
    expect((await get(`${own}?limit=1&cursor=${theirs.body.nextCursor}`)).status).toBe(422);
    const slug = await freshTable(target);
    const cursor = theirs.body.nextCursor;
    expect((await get(`${own}/${slug}/revisions?cursor=${cursor}`)).status).toBe(422);

    const titled = { title: 'Heard of elsewhere', tags: ['secret'] };
    await test.database.db.update(waveTables).set(titled).where(eq(waveTables.slug, foreign.table));
    for (const query of ['search=elsewhere', 'tag=secret', 'search=heard&archived=yes']) {
      expect((await get(`${own}?${query}`)).body.items, query).toEqual([]);
    }
    expect((await get(`/teams/${target.team.slug}/tags`)).body.tags).not.toContainEqual(
      expect.objectContaining({ tag: 'secret' }),
    );
    const { body } = await get('/account');
    expect(JSON.stringify(body)).not.toContain(other.team.slug);
    expect((await get('/teams')).text).not.toContain(other.team.slug);
  });

  // An original's body is a file and has no fields.
  const writing = Object.keys(routeCases).filter(
    (route) => /^(POST|PATCH|PUT)/.test(route) && route.includes(':team') && !route.endsWith('/originals'),
  );
  it.each(writing)('cannot smuggle them into a body: %s', async (route) => {
    const before = await stateOfOther();
    const attempt = await routeCases[route].attempt(target, target.admin);
    const smuggled = {
      ...attempt.body,
      id: foreign.id,
      teamId: other.team.id,
      team: other.team.slug,
      tableId: before.tables[0].id,
      table: foreign.table,
      userId: foreign.userId,
      createdBy: other.admin.id,
    };
    const response = await send(target.admin, route, { ...attempt, body: smuggled });
    // What takes no body at all reads none.
    const takesNone = /\/(archive|restore|retire)$/.test(route);
    expect(response.status, response.text).toBe(takesNone ? 200 : 422);
    if (!takesNone) {
      const paths = (response.body.errors as { path: string }[]).map(({ path }) => path);
      expect(paths).toEqual(
        expect.arrayContaining(['teamId', 'team', 'tableId', 'table', 'userId', 'createdBy']),
      );
    }
    expect(await stateOfOther()).toEqual(before);
  });
});
