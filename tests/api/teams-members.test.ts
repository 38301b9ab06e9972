import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { memberships, teams } from '../../server/db/schema/index.ts';
import { asPerson, join, makeCrew, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const as = (person?: TestPerson) => asPerson(test, person);

describe('members', () => {
  const members = async (person: TestPerson, slug: string) =>
    ((await as(person).get(`/teams/${slug}/members`)).body as { items: { userId: number; role: string }[] })
      .items;

  it('are shown to each other, and to nobody else', async () => {
    const { team, viewer, admin } = await makeCrew(test);
    const list = await members(viewer, team.slug);
    expect(list).toHaveLength(4);
    expect(list).toContainEqual({
      userId: admin.id,
      name: admin.name,
      email: admin.email,
      role: 'admin',
      since: expect.stringMatching(/^\d{4}-.*Z$/),
    });
    expect((await as().get(`/teams/${team.slug}/members`)).status).toBe(401);
    expect((await as(await makePerson(test)).get(`/teams/${team.slug}/members`)).status).toBe(404);
  });

  it('get another role from an admin only', async () => {
    const { team, viewer, author, reviewer, admin } = await makeCrew(test);
    const path = `/teams/${team.slug}/members/${viewer.id}`;
    expect((await as().patch(path, { role: 'author' })).status).toBe(401);
    expect((await as(await makePerson(test)).patch(path, { role: 'author' })).status).toBe(404);
    for (const person of [viewer, author, reviewer]) {
      expect((await as(person).patch(path, { role: 'admin' })).status).toBe(403);
    }
    for (const body of [{}, { role: 'owner' }, { role: 'admin', more: 1 }]) {
      expect((await as(admin).patch(path, body)).status).toBe(422);
    }
    const response = await as(admin).patch(path, { role: 'author' });
    expect([response.status, (response.body as { role: string }).role]).toEqual([200, 'author']);
    expect((await as(viewer).get(`/teams/${team.slug}`)).body).toMatchObject({ myRole: 'author' });
  });

  it('that are not of the team cannot be found in it', async () => {
    const { team, admin } = await makeCrew(test);
    const stranger = await makePerson(test);
    for (const id of [stranger.id, 0, -1, '1e3', 'x', '99999999999999999999']) {
      expect((await as(admin).patch(`/teams/${team.slug}/members/${id}`, { role: 'author' })).status).toBe(
        404,
      );
      expect((await as(admin).delete(`/teams/${team.slug}/members/${id}`)).status).toBe(404);
    }
  });

  it('are removed by an admin, and may leave by themselves', async () => {
    const { team, viewer, author, reviewer, admin } = await makeCrew(test);
    expect((await as().delete(`/teams/${team.slug}/members/${viewer.id}`)).status).toBe(401);
    expect((await as(reviewer).delete(`/teams/${team.slug}/members/${viewer.id}`)).status).toBe(403);
    expect((await as(admin).delete(`/teams/${team.slug}/members/${viewer.id}`)).status).toBe(204);
    expect((await as(author).delete(`/teams/${team.slug}/members/${author.id}`)).status).toBe(204);
    expect((await as(author).get(`/teams/${team.slug}`)).status).toBe(404);
    expect((await members(admin, team.slug)).map(({ userId }) => userId).sort()).toEqual(
      [reviewer.id, admin.id].sort(),
    );
  });

  it('always include an admin', async () => {
    const { team, viewer, admin } = await makeCrew(test);
    expect((await as(admin).delete(`/teams/${team.slug}/members/${admin.id}`)).status).toBe(409);
    expect(
      (await as(admin).patch(`/teams/${team.slug}/members/${admin.id}`, { role: 'author' })).status,
    ).toBe(409);
    await as(admin).patch(`/teams/${team.slug}/members/${viewer.id}`, { role: 'admin' });
    expect((await as(admin).delete(`/teams/${team.slug}/members/${admin.id}`)).status).toBe(204);
  });

  it.each([
    ['leave', (one: TestPerson, path: (id: number) => string) => as(one).delete(path(one.id))],
    [
      'step down',
      (one: TestPerson, path: (id: number) => string) => as(one).patch(path(one.id), { role: 'viewer' }),
    ],
  ])('keep an admin where the last two %s at once, ten times', async (_what, go) => {
    for (let round = 0; round < 10; round++) {
      const [one, two] = [await makePerson(test), await makePerson(test)];
      const team = await makeTeam(test, [
        { person: one, role: 'admin' },
        { person: two, role: 'admin' },
      ]);
      const path = (id: number) => `/teams/${team.slug}/members/${id}`;
      const answers = await Promise.all([go(one, path), go(two, path)]);
      expect(answers.filter(({ status }) => status === 409)).toHaveLength(1);
      const admins = await test.database.db
        .select()
        .from(memberships)
        .where(and(eq(memberships.teamId, team.id), eq(memberships.role, 'admin')));
      expect(admins).toHaveLength(1);
    }
  });

  it('keep an admin where the last two remove each other at once', async () => {
    for (let round = 0; round < 10; round++) {
      const [one, two] = [await makePerson(test), await makePerson(test)];
      const team = await makeTeam(test, [
        { person: one, role: 'admin' },
        { person: two, role: 'admin' },
      ]);
      const answers = await Promise.all([
        as(one).delete(`/teams/${team.slug}/members/${two.id}`),
        as(two).delete(`/teams/${team.slug}/members/${one.id}`),
      ]);
      // The slower one is no member any more by the time it is looked at again.
      expect(answers.map(({ status }) => status).sort()).toEqual([204, 404]);
    }
  });

  it('of two teams have a role in each', async () => {
    const person = await makePerson(test);
    const [one, two] = [
      await makeTeam(test, [{ person, role: 'admin' }], 'Alpha'),
      await makeTeam(test, [{ person: await makePerson(test), role: 'admin' }], 'Beta'),
    ];
    await join(test, two.id, person, 'viewer');
    expect((await as(person).get('/teams')).body).toEqual({
      items: [
        { slug: one.slug, name: 'Alpha', myRole: 'admin' },
        { slug: two.slug, name: 'Beta', myRole: 'viewer' },
      ],
      nextCursor: null,
    });
    expect((await as(person).patch(`/teams/${two.slug}`, { name: 'X' }).set('If-Match', '"1"')).status).toBe(
      403,
    );
    const rows = await test.database.db.select().from(teams).where(eq(teams.id, two.id));
    expect(rows[0].name).toBe('Beta');
  });
});
