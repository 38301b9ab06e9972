import { pino } from 'pino';
import request, { type Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildRouters } from '../../server/app.ts';
import { readConfig } from '../../server/config.ts';
import { teams } from '../../server/db/schema/index.ts';
import { listRoutes } from '../../server/http/routes.ts';
import { freshAddress, tokenSentTo } from '../support/outbox.ts';
import { anyAddress, asPerson, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { cookiesOf, makePersonWithPassword, password } from '../support/sign-in.ts';
import { host, makeTestApp, origin, testSecret, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const kindOf = (response: Response) => (response.body as { type?: string }).type;
const foreignOrigins = [
  undefined,
  'null',
  'https://elsewhere.example',
  'http://127.0.0.1:4174',
  'https://127.0.0.1:4173',
  'http://127.0.0.1:4173.elsewhere.example',
  'http://localhost:4173',
  ' http://127.0.0.1:4173/',
];

/** Every write of the API, by its route's own path. */
const writes = () => {
  const routers = buildRouters({
    config: readConfig({
      PRIVATE_DATABASE_URL: 'mysql://x@localhost/stepwell_test_x',
      AUTH_SECRET: testSecret,
    }),
    origins: [origin],
    database: test.database,
    jobs: test.jobs,
    logger: pino({ level: 'silent' }),
  });
  return listRoutes(routers).flatMap(({ path, methods }) =>
    methods.filter((method) => method !== 'GET').map((method) => [method.toLowerCase(), path] as const),
  );
};

describe('a write by cookie', () => {
  it('needs our own Origin, on every route', async () => {
    const { team, admin } = await makeCrew(test);
    const list = writes();
    expect(list.length).toBeGreaterThan(20);
    for (const [method, path] of list) {
      for (const from of [undefined, 'null', 'https://elsewhere.example']) {
        const agent = request(test.app);
        const sent = agent[method as 'post'](
          `/api/v1${path.replace(':team', team.slug).replace(/:\w+/g, '1')}`,
        ).set({ Host: host, Cookie: admin.cookie, 'X-Forwarded-For': admin.address });
        if (from !== undefined) sent.set('Origin', from);
        const response = await sent.send({});
        expect([method, path, from, response.status, kindOf(response)]).toEqual([
          method,
          path,
          from,
          403,
          '/problems/foreign-origin',
        ]);
      }
    }
  });

  it.each(foreignOrigins)('is refused from Origin %j and changes nothing', async (from) => {
    const person = await makePerson(test);
    const sent = request(test.app).patch('/api/v1/account').set({ Host: host, Cookie: person.cookie });
    if (from !== undefined) sent.set('Origin', from);
    expect((await sent.send({ name: 'Taken Over' })).status).toBe(403);
    expect((await asPerson(test, person).get('/account')).body).toMatchObject({ name: person.name });
  });

  it.each(foreignOrigins)('signs nobody in or out from Origin %j', async (from) => {
    const person = await makePersonWithPassword(test);
    const csrf = await request(test.app).get('/auth/csrf').set('Host', host);
    for (const path of ['/auth/callback/credentials', '/auth/signout', '/auth/session']) {
      const sent = request(test.app)
        .post(path)
        .set({ Host: host, Cookie: `${person.cookie}; ${cookiesOf(csrf)}` });
      if (from !== undefined) sent.set('Origin', from);
      const { csrfToken } = csrf.body as { csrfToken: string };
      const response = await sent.send({ email: person.email, password, csrfToken });
      expect([path, response.status]).toEqual([path, 403]);
      expect(cookiesOf(response)).toBe('');
    }
    expect((await asPerson(test, person).get('/account')).status).toBe(200);
  });

  it('may not slip in with a bearer token: the cookie is ignored then', async () => {
    const person = await makePerson(test);
    for (const scheme of ['Bearer nothing', 'bearer nothing', 'Bearer  ']) {
      const response = await request(test.app)
        .patch('/api/v1/account')
        .set({
          Host: host,
          Cookie: person.cookie,
          Authorization: scheme,
          Origin: 'https://elsewhere.example',
        })
        .send({ name: 'Taken Over' });
      expect([scheme, response.status]).toEqual([scheme, expect.toBeOneOf([401, 403])]);
    }
    const signOut = await request(test.app)
      .post('/auth/signout')
      .set({ Host: host, Cookie: person.cookie, Authorization: 'Bearer nothing' })
      .send({});
    expect(signOut.status).toBe(403);
    expect((await asPerson(test, person).get('/account')).body).toMatchObject({ name: person.name });
  });

  it('is not made by reading', async () => {
    const { team, admin } = await makeCrew(test);
    for (const [, path] of writes()) {
      await asPerson(test, admin).get(path.replace(':team', team.slug).replace(/:\w+/g, '1'));
    }
    expect((await asPerson(test, admin).get(`/teams/${team.slug}`)).body).toMatchObject({ version: 1 });
  });
});

describe('a foreign Host', () => {
  it.each(['elsewhere.example', '127.0.0.1', '127.0.0.1:80', 'localhost:4173', `${host}.elsewhere.example`])(
    '%s gets 421 before anything else',
    async (foreign) => {
      for (const [method, path] of [
        ['get', '/'],
        ['get', '/auth/csrf'],
        ['post', '/auth/callback/credentials'],
        ['get', '/api/v1/account'],
        ['post', '/api/v1/account/forgot-password'],
      ] as const) {
        const response = await request(test.app)[method](path).set({ Host: foreign, Origin: origin });
        expect([path, response.status]).toEqual([path, 421]);
        expect(cookiesOf(response)).toBe('');
      }
    },
  );

  it('does not get into mailed links, by X-Forwarded-Host either', async () => {
    const person = await makePerson(test);
    await asPerson(test)
      .post('/account/forgot-password', { email: person.email })
      .set('X-Forwarded-Host', 'elsewhere.example')
      .set('X-Forwarded-Proto', 'https')
      .set('Forwarded', 'host=elsewhere.example');
    expect(await tokenSentTo(test, person.email)).toHaveLength(43);
    const answer = await request(test.app)
      .get('/auth/signin')
      .set({ Host: host, 'X-Forwarded-Host': 'elsewhere.example', 'X-Forwarded-Proto': 'https' });
    expect(new URL(answer.headers.location, origin).href).toBe(
      `${origin}/sign-in?callbackUrl=${encodeURIComponent(origin)}`,
    );
  });
});

describe('over https behind a proxy', () => {
  const secureOrigin = 'https://tables.example';
  let secure: TestApp;
  beforeAll(() => {
    secure = makeTestApp({ origins: [secureOrigin] });
  });
  afterAll(() => secure.close());

  it('cookies are Secure and carry the prefixes that keep other hosts out', async () => {
    const person = await makePersonWithPassword(secure);
    const sent = { Host: 'tables.example', Origin: secureOrigin, 'X-Forwarded-For': anyAddress() };
    const csrf = await request(secure.app).get('/auth/csrf').set(sent);
    expect(cookiesOf(csrf)).toMatch(/__Host-authjs\.csrf-token=/);
    const response = await request(secure.app)
      .post('/auth/callback/credentials')
      .set({ ...sent, Cookie: cookiesOf(csrf), 'X-Auth-Return-Redirect': '1' })
      .send({
        email: person.email,
        password,
        csrfToken: (csrf.body as { csrfToken: string }).csrfToken,
        callbackUrl: `${secureOrigin}/tables`,
      });
    expect(response.body).toEqual({ url: `${secureOrigin}/tables` });
    const set = response.headers['set-cookie'] as unknown as string[];
    const line = set.find((cookie) => cookie.startsWith('__Secure-authjs.session-token='));
    expect(line).toMatch(/; Secure/);
    const account = await request(secure.app)
      .get('/api/v1/account')
      .set({ ...sent, Cookie: cookiesOf(response) });
    expect(account.status).toBe(200);
    expect(account.headers['strict-transport-security']).toMatch(/max-age=/);
    // A cookie without the prefix could have been set by a neighbour over http.
    const bare = cookiesOf(response).replaceAll('__Secure-', '');
    expect(
      (
        await request(secure.app)
          .get('/api/v1/account')
          .set({ ...sent, Cookie: bare })
      ).status,
    ).toBe(401);
  });

  it('the cookie that a change of password sets is just the same', async () => {
    const person = await makePersonWithPassword(secure);
    const sent = { Host: 'tables.example', Origin: secureOrigin, 'X-Forwarded-For': anyAddress() };
    const csrf = await request(secure.app).get('/auth/csrf').set(sent);
    const signedIn = await request(secure.app)
      .post('/auth/callback/credentials')
      .set({ ...sent, Cookie: cookiesOf(csrf), 'X-Auth-Return-Redirect': '1' })
      .send({ email: person.email, password, csrfToken: (csrf.body as { csrfToken: string }).csrfToken });
    const changed = await request(secure.app)
      .post('/api/v1/account/change-password')
      .set({ ...sent, Cookie: cookiesOf(signedIn) })
      .send({ currentPassword: password, newPassword: 'eleven fathoms deep' });
    const attributes = (response: Response) =>
      (response.headers['set-cookie'] as unknown as string[])
        .find((cookie) => cookie.startsWith('__Secure-authjs.session-token='))
        ?.split('; ')
        .slice(1)
        .filter((part) => !/^(Expires|Max-Age)=/.test(part))
        .sort();
    expect(changed.status).toBe(204);
    expect(attributes(changed)).toEqual(attributes(signedIn));
  });
});

describe('an answer', () => {
  it('names no program and is never kept by caches', async () => {
    const response = await asPerson(test).get('/account');
    expect(response.headers['x-powered-by']).toBeUndefined();
    expect(response.headers['cache-control']).toBe('no-store');
    expect(response.headers['content-security-policy']).toContain("default-src 'self'");
  });

  it('does not repeat secrets that were sent to it', async () => {
    const secrets = {
      password: 'swordfsh',
      currentPassword: 'x'.repeat(201),
      token: 'not-a-token-but-secret',
    };
    for (const [path, body] of [
      ['/account/sign-up', { name: 'X', email: freshAddress(), password: secrets.password }],
      ['/account/reset-password', { token: secrets.token, password: secrets.password }],
      ['/account/verify-address', { token: secrets.token }],
      ['/invitations/open', { token: secrets.token }],
    ] as const) {
      const response = await asPerson(test).post(path, body);
      expect(response.status).toBe(422);
      for (const secret of Object.values(secrets)) expect(response.text).not.toContain(secret);
    }
  });
});

describe('hostile text', () => {
  it('goes through names unchanged, as text', async () => {
    const names = [
      '<script>alert(1)</script>',
      '*/ ??/\n--> "\' \\',
      '\u202eabc',
      '\u{1f6a2}',
      '=1+1',
      '\u0000null',
    ];
    const person: TestPerson = await makePerson(test);
    for (const name of names) {
      const response = await asPerson(test, person).post('/teams', { name });
      expect([response.status, (response.body as { name: string }).name]).toEqual([201, name.trim()]);
      expect(response.headers['content-type']).toMatch(/^application\/json/);
      expect(response.headers['x-content-type-options']).toBe('nosniff');
    }
  });

  it('in queries is data: quotes and wildcards find nothing', async () => {
    const { db } = test.database;
    const before = await db.select().from(teams);
    for (const text of ["' OR 1=1 -- ", '%', '_', '";DROP TABLE teams;--', '\\']) {
      const response = await asPerson(test, await makePerson(test)).get(`/teams/${encodeURIComponent(text)}`);
      expect(response.status).toBe(404);
    }
    expect((await db.select().from(teams)).length).toBe(before.length);
  });
});
