import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { idempotencyKeys } from '../../server/db/schema/index.ts';
import { asPerson, makeCrew, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const as = (person?: TestPerson) => asPerson(test, person);

describe('POST /teams', () => {
  it('makes a team with its maker as admin', async () => {
    const person = await makePerson(test);
    const name = `Harbour Lights ${randomUUID()}`;
    const response = await as(person).post('/teams', { name });
    expect(response.status).toBe(201);
    const slug = name.toLowerCase().replaceAll(' ', '-');
    expect(response.body).toEqual({
      slug,
      name,
      myRole: 'admin',
      defaults: { arrayPrefix: '', licenceLine: '', bits: 8, length: 256, target: 'c99' },
      twoPersonRule: true,
      usage: { tables: 0, tablesAtMost: 200_000 },
      version: 1,
    });
    expect(response.headers).toMatchObject({ location: `/api/v1/teams/${slug}`, etag: '"1"' });
    expect((await as(person).get(`/teams/${slug}`)).body).toEqual(response.body);
  });

  it.each([
    ['Sirènes à vapeur', 'sirenes-a-vapeur'],
    ['  Buoy / 7 — north ', 'buoy-7-north'],
    ['灯台', 'team'],
    ['*/ --> <b>x</b>', 'b-x-b'],
  ])('makes an address of %j', async (name, slug) => {
    const response = await as(await makePerson(test)).post('/teams', { name });
    expect(response.status).toBe(201);
    expect((response.body as { slug: string }).slug).toMatch(new RegExp(`^${slug}(-\\d+)?$`));
  });

  it('gives ten teams of one name, made at once, ten addresses', async () => {
    const people = await Promise.all(Array.from({ length: 10 }, () => makePerson(test)));
    const name = `Twins ${randomUUID().slice(0, 8)}`;
    const answers = await Promise.all(people.map((person) => as(person).post('/teams', { name })));
    expect(answers.map(({ status }) => status)).toEqual(Array(10).fill(201));
    expect(new Set(answers.map(({ body }) => (body as { slug: string }).slug)).size).toBe(10);
  });

  it('refuses an address that is taken', async () => {
    const slug = `lightship-${randomUUID().slice(0, 8)}`;
    expect((await as(await makePerson(test)).post('/teams', { name: 'One', slug })).status).toBe(201);
    expect((await as(await makePerson(test)).post('/teams', { name: 'Two', slug })).status).toBe(409);
  });

  it('refuses nobody, and what makes no team', async () => {
    expect((await as().post('/teams', { name: 'X' })).status).toBe(401);
    const person = await makePerson(test);
    for (const body of [undefined, {}, { name: '' }, { name: 'x'.repeat(101) }, { name: 'X', slug: 'A B' }]) {
      expect((await as(person).post('/teams', body)).status).toBe(422);
    }
    expect((await as(person).get('/teams')).body).toEqual({ items: [], nextCursor: null });
  });
});

describe('a POST with an Idempotency-Key', () => {
  const post = (person: TestPerson, key: string, body: object) =>
    as(person).post('/teams', body).set('Idempotency-Key', key);

  it('is done once and answered twice', async () => {
    const person = await makePerson(test);
    const [key, body] = [`"${randomUUID()}"`, { name: 'Once' }];
    const first = await post(person, key, body);
    const second = await post(person, key, body);
    expect(first.status).toBe(201);
    expect(second.status).toBe(201);
    expect(second.body).toEqual(first.body);
    expect(second.headers).toMatchObject({ location: first.headers.location, etag: '"1"' });
    expect(((await as(person).get('/teams')).body as { items: unknown[] }).items).toHaveLength(1);
  });

  it('is done once where five come at once', async () => {
    const person = await makePerson(test);
    const key = randomUUID();
    const answers = await Promise.all(Array.from({ length: 5 }, () => post(person, key, { name: 'Once' })));
    expect(answers.map(({ status }) => status)).toEqual(Array(5).fill(201));
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    expect(((await as(person).get('/teams')).body as { items: unknown[] }).items).toHaveLength(1);
  });

  it('takes a key for one request only', async () => {
    const person = await makePerson(test);
    const key = randomUUID();
    await post(person, key, { name: 'One' });
    const other = await post(person, key, { name: 'Two' });
    expect(other.body).toMatchObject({ status: 422, errors: [{ path: 'Idempotency-Key' }] });
  });

  it('keeps keys apart by person, and nothing of what failed', async () => {
    const [person, other] = [await makePerson(test), await makePerson(test)];
    const key = randomUUID();
    const slug = `key-${randomUUID().slice(0, 8)}`;
    expect((await post(other, key, { name: 'Mine', slug })).status).toBe(201);
    expect((await post(person, key, { name: 'Mine', slug })).status).toBe(409);
    expect(
      await test.database.db.select().from(idempotencyKeys).where(eq(idempotencyKeys.userId, person.id)),
    ).toHaveLength(0);
    expect((await post(person, key, { name: 'Mine', slug: `${slug}-2` })).status).toBe(201);
  });

  it.each(['', 'x'.repeat(101), 'two words'])('refuses the key %j', async (key) => {
    const response = await post(await makePerson(test), `"${key}"`, { name: 'X' });
    expect(response.body).toMatchObject({ status: 422, errors: [{ path: 'Idempotency-Key' }] });
  });
});

describe('GET /teams/:team', () => {
  it('shows every member the team, with their own role', async () => {
    const crew = await makeCrew(test);
    for (const role of ['viewer', 'author', 'reviewer', 'admin'] as const) {
      const response = await as(crew[role]).get(`/teams/${crew.team.slug}`);
      expect([response.status, (response.body as { myRole: string }).myRole]).toEqual([200, role]);
    }
  });

  it('is 401 for nobody; another team’s admin sees no more than of one that is not there', async () => {
    const { team } = await makeCrew(test);
    const stranger = await makePerson(test);
    await makeTeam(test, [{ person: stranger, role: 'admin' }]);
    expect((await as().get(`/teams/${team.slug}`)).status).toBe(401);
    const foreign = await as(stranger).get(`/teams/${team.slug}`);
    const missing = await as(stranger).get('/teams/not-there');
    expect([foreign.status, missing.status]).toEqual([404, 404]);
    expect(foreign.text.replaceAll(team.slug, 'X')).toBe(missing.text.replaceAll('not-there', 'X'));
    for (const slug of ['%27', 'A%20B', '..%2f..', team.slug.toUpperCase(), 'x'.repeat(300)]) {
      expect([slug, (await as(stranger).get(`/teams/${slug}`)).status]).toEqual([slug, 404]);
    }
  });
});

describe('PATCH /teams/:team', () => {
  const patch = (person: TestPerson | undefined, slug: string, body: object, tag = '"1"') =>
    as(person).patch(`/teams/${slug}`, body).set('If-Match', tag);

  it('changes name and defaults; what is left out stays', async () => {
    const { team, admin } = await makeCrew(test);
    const first = await patch(admin, team.slug, {
      defaults: { bits: 10, licenceLine: 'SPDX-License-Identifier: MIT' },
    });
    expect([first.status, first.headers.etag]).toEqual([200, '"2"']);
    const second = await patch(admin, team.slug, { name: 'Tenth Fathom', defaults: { length: 512 } }, '"2"');
    expect(second.body).toMatchObject({
      name: 'Tenth Fathom',
      defaults: {
        arrayPrefix: '',
        licenceLine: 'SPDX-License-Identifier: MIT',
        bits: 10,
        length: 512,
        target: 'c99',
      },
      version: 3,
    });
    expect((await as(admin).get(`/teams/${team.slug}`)).body).toEqual(second.body);
  });

  it('wants to know which state is changed (428), and refuses one that has passed (412), showing what is now', async () => {
    const { team, admin } = await makeCrew(test);
    for (const tag of ['', '*']) {
      const sent = as(admin).patch(`/teams/${team.slug}`, { name: 'X' });
      expect((await (tag ? sent.set('If-Match', tag) : sent)).status).toBe(428);
    }
    expect((await patch(admin, team.slug, { name: 'X' }, 'rubbish')).status).toBe(400);
    await patch(admin, team.slug, { name: 'Faster' });
    for (const tag of ['"1"', 'W/"2"', '"22"', '"1", "3"']) {
      const lost = await patch(admin, team.slug, { name: 'Slower' }, tag);
      expect(lost.body).toMatchObject({ status: 412, current: { name: 'Faster', version: 2 } });
    }
    expect((await patch(admin, team.slug, { name: 'Third' }, '"1", "2"')).status).toBe(200);
  });

  it('lets one of ten at once through', async () => {
    const { team, admin } = await makeCrew(test);
    const names = Array.from({ length: 10 }, (_none, index) => `Name ${index}`);
    const answers = await Promise.all(names.map((name) => patch(admin, team.slug, { name })));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, ...Array<number>(9).fill(412)]);
    const winner = names[answers.findIndex(({ status }) => status === 200)];
    expect((await as(admin).get(`/teams/${team.slug}`)).body).toMatchObject({ name: winner, version: 2 });
  });

  it('takes an admin: 401 nobody, 404 strangers, 403 the others', async () => {
    const { team, viewer, author, reviewer } = await makeCrew(test);
    expect((await patch(undefined, team.slug, { name: 'X' })).status).toBe(401);
    expect((await patch(await makePerson(test), team.slug, { name: 'X' })).status).toBe(404);
    for (const person of [viewer, author, reviewer]) {
      const response = await patch(person, team.slug, { name: 'X' });
      expect([response.status, (response.body as { type: string }).type]).toEqual([
        403,
        '/problems/forbidden',
      ]);
    }
  });

  it.each([
    [{ defaults: { bits: 17 } }, 'defaults.bits'],
    [{ defaults: { length: 1 } }, 'defaults.length'],
    [{ defaults: { arrayPrefix: '9x' } }, 'defaults.arrayPrefix'],
    [{ defaults: { licenceLine: 'two\nlines' } }, 'defaults.licenceLine'],
    [{ defaults: { target: '../x' } }, 'defaults.target'],
    [{ defaults: { colour: 'blue' } }, 'defaults.colour'],
    [{ slug: 'other' }, 'slug'],
  ])('refuses %j', async (body, path) => {
    const { team, admin } = await makeCrew(test);
    const response = await patch(admin, team.slug, body);
    expect(response.body).toMatchObject({ status: 422, errors: [{ path }] });
  });
});
