import { randomBytes, randomUUID } from 'node:crypto';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { readConfig } from '../../server/config.ts';
import { connectionOptions } from '../../server/db/client.ts';
import { databaseIsAway } from '../../server/db/errors.ts';
import { rateLimits } from '../../server/db/schema/index.ts';
import { networkOf } from '../../server/http/network.ts';
import { rateLimiter, type RateLimiter } from '../../server/http/rate-limiter.ts';
import { ratePolicies } from '../../server/http/rate-policies.ts';
import { makeOwnTestApp } from '../support/own-database.ts';
import { freshAddress } from '../support/outbox.ts';
import { anyAddress, asPerson, makeCrew, makePerson } from '../support/people.ts';
import { makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
import { host, makeTestApp, origin, testSecret, type TestApp } from '../support/test-app.ts';

let test: TestApp;
/** A second process, as far as anything in memory goes. */
let other: TestApp;
let limiter: RateLimiter;
beforeAll(() => {
  test = makeTestApp();
  other = makeTestApp();
  const config = readConfig({ PRIVATE_DATABASE_URL: inject('databaseUrl'), AUTH_SECRET: testSecret });
  limiter = rateLimiter({ config, database: test.database });
});
afterAll(async () => {
  await test.close();
  await other.close();
});

const wrong = (email: string, address: string, app = test) =>
  signIn(app, email, 'not the password', { address });

describe('tries to sign in', () => {
  it('end after ten at one account from one network, in two processes together; the right password does not help', async () => {
    const person = await makePersonWithPassword(test);
    const address = anyAddress();
    for (let index = 0; index < 10; index++) {
      const { response } = await wrong(person.email, address, index % 2 ? other : test);
      expect(response.status).toBe(200);
    }
    for (const app of [test, other]) {
      const { response, outcome, cookie } = await signIn(app, person.email, password, { address });
      expect(response.status).toBe(429);
      expect(response.body).toMatchObject({ type: '/problems/too-many-requests', status: 429 });
      expect(outcome).toBe('error=CredentialsSignin&code=throttled');
      expect(cookie).toBeUndefined();
      const wait = Number(response.headers['retry-after']);
      expect(wait).toBeGreaterThan(14 * 60);
      expect(wait).toBeLessThanOrEqual(15 * 60);
    }
    // Neither the person elsewhere nor a neighbour is kept out.
    expect((await signIn(test, person.email, password)).cookie).toBeDefined();
    const neighbour = await makePersonWithPassword(test);
    expect((await signIn(test, neighbour.email, password, { address })).cookie).toBeDefined();
  });

  it('are told in RateLimit fields (draft-ietf-httpapi-ratelimit-headers)', async () => {
    const { response } = await wrong(freshAddress(), anyAddress());
    expect(response.headers['ratelimit-policy']).toBe(
      '"api-unknown";q=1200;w=60, "sign-in-network";q=100;w=900, "sign-in";q=10;w=900, "sign-in-address";q=100;w=86400',
    );
    expect(response.headers.ratelimit).toMatch(
      /^"api-unknown";r=1198;t=\d+, "sign-in-network";r=99;t=900, "sign-in";r=9;t=900, "sign-in-address";r=99;t=86400$/,
    );
  });

  it('count anew after a success', async () => {
    const person = await makePersonWithPassword(test);
    const address = anyAddress();
    for (let round = 0; round < 2; round++) {
      for (let index = 0; index < 9; index++) await wrong(person.email, address);
      expect((await signIn(test, person.email, password, { address })).cookie).toBeDefined();
    }
  });

  it('end after a hundred at one account from anywhere', async () => {
    const person = await makePersonWithPassword(test);
    for (let index = 0; index < 100; index++) await limiter.count('sign-in-address', person.email);
    const { response } = await signIn(test, person.email, password);
    expect([response.status, response.body]).toEqual([
      429,
      expect.objectContaining({ detail: expect.stringContaining('sign-in-address') }),
    ]);
  });

  it('count one account in whatever case it is typed', async () => {
    const person = await makePersonWithPassword(test);
    const address = anyAddress();
    for (let index = 0; index < 10; index++) {
      await wrong(index % 2 ? person.email.toUpperCase() : ` ${person.email}`, address);
    }
    expect((await wrong(person.email, address)).response.status).toBe(429);
  });

  it.each([
    '/auth/callback/credentials/',
    '/auth/CALLBACK/credentials',
    '/auth//callback/credentials',
    '/auth/callback//credentials',
    '/auth/%63allback/credentials',
    '/auth/callback/credentials?x=1',
    '/AUTH/callback/credentials',
    '/auth/./callback/credentials',
  ])('cannot be made by way of %s once they have ended', async (path) => {
    const person = await makePersonWithPassword(test);
    const address = anyAddress();
    for (let index = 0; index < 10; index++) await limiter.count('sign-in', `${person.email} ${address}`);
    const csrf = await request(test.app).get('/auth/csrf').set('Host', host);
    const cookie = ((csrf.headers['set-cookie'] ?? []) as unknown as string[]).map(
      (line) => line.split(';')[0],
    );
    const response = await request(test.app)
      .post(path)
      .set({ Host: host, Origin: origin, 'X-Forwarded-For': address, Cookie: cookie.join('; ') })
      .send({ email: person.email, password, csrfToken: (csrf.body as { csrfToken: string }).csrfToken });
    expect(String(response.headers['set-cookie'] ?? '')).not.toContain('session-token=ey');
  });
});

describe('the network of a request', () => {
  it('is not what X-Forwarded-For says, unless a trusted proxy says it', async () => {
    const config = readConfig({ PRIVATE_DATABASE_URL: inject('databaseUrl'), AUTH_SECRET: testSecret });
    const direct = makeTestApp({ config });
    const before = await limiter.count('sign-in-network', '127.0.0.1', 0);
    await wrong(freshAddress(), '10.1.2.3', direct);
    await wrong(freshAddress(), '10.3.2.1', direct);
    const after = await limiter.count('sign-in-network', '127.0.0.1', 0);
    expect(before.remaining - after.remaining).toBe(2);
    await direct.close();
  });

  it('is the last address that is no proxy of ours', async () => {
    const address = anyAddress();
    await asPerson(test, { cookie: '', address: `192.0.2.1, ${address}` }).get('/health');
    const standing = await limiter.count('api-unknown', `network ${address}`, 0);
    expect(standing.remaining).toBeLessThan(ratePolicies['api-unknown'].quota);
  });

  it.each([
    ['192.0.2.7', '192.0.2.7'],
    ['::ffff:192.0.2.7', '192.0.2.7'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
    ['2001:db8:1:2::1', '2001:db8:1:2::/64'],
    ['2001:0db8:0001:0002::', '2001:db8:1:2::/64'],
    ['2001:db8::1', '2001:db8:0:0::/64'],
    ['::1', '0:0:0:0::/64'],
    ['fe80::1%eth0', 'fe80:0:0:0::/64'],
    [undefined, ''],
  ])('%s counts as %s', (ip, network) => {
    expect(networkOf({ ip })).toBe(network);
  });
});

describe('other limits', () => {
  it('hold sign-ups from one network', async () => {
    const address = anyAddress();
    for (let index = 0; index < 60; index++) await limiter.count('sign-up', address);
    const response = await asPerson(test, { cookie: '', address }).post('/account/sign-up', {});
    expect(response.status).toBe(429);
    expect(response.headers['retry-after']).toMatch(/^\d+$/);
    expect((await asPerson(test).post('/account/sign-up', {})).status).toBe(422);
  });

  it('hold tries of the current password, and let somebody else go on', async () => {
    const [person, neighbour] = [await makePersonWithPassword(test), await makePersonWithPassword(test)];
    const body = { currentPassword: 'no', newPassword: 'eleven fathoms deep' };
    for (let index = 0; index < 10; index++) {
      expect((await asPerson(test, person).post('/account/change-password', body)).status).toBe(422);
    }
    const right = { ...body, currentPassword: password };
    expect((await asPerson(test, person).post('/account/change-password', right)).status).toBe(429);
    expect((await asPerson(test, person).delete('/account', { currentPassword: password })).status).toBe(429);
    expect((await asPerson(test, neighbour).post('/account/change-password', right)).status).toBe(204);
  });

  it('hold a team’s invitations', async () => {
    const { team, admin } = await makeCrew(test);
    await limiter.count('invitations', String(team.id), 100);
    const body = { email: freshAddress(), role: 'viewer' };
    expect((await asPerson(test, admin).post(`/teams/${team.slug}/invitations`, body)).status).toBe(429);
  });
});

describe('the limit on the whole API', () => {
  it('holds for one person over all their sessions and processes', async () => {
    const [person, neighbour] = [await makePerson(test), await makePerson(test)];
    const { quota } = ratePolicies.api;
    await limiter.count('api', `person ${person.id}`, quota - 50);
    // Each process draws a share of 25: that is all there is.
    const statuses: number[] = [];
    for (let index = 0; index < 60; index++) {
      statuses.push((await asPerson(index % 2 ? other : test, person).get('/account')).status);
    }
    expect(statuses.filter((status) => status === 200)).toHaveLength(50);
    expect(statuses.slice(50)).toEqual(Array(10).fill(429));
    expect((await asPerson(test, neighbour).get('/account')).status).toBe(200);
  });

  it('never lets more through than it says, however many come at once', async () => {
    const person = await makePerson(test);
    await limiter.count('api', `person ${person.id}`, ratePolicies.api.quota - 100);
    const answers = await Promise.all(
      Array.from({ length: 150 }, (_none, index) =>
        asPerson(index % 2 ? other : test, person).get('/account'),
      ),
    );
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(100);
  });

  it('tells what is left', async () => {
    const person = await makePerson(test);
    const left: number[] = [];
    for (let index = 0; index < 30; index++) {
      const { headers } = await asPerson(test, person).get('/account');
      expect(headers['ratelimit-policy']).toBe('"api";q=6000;w=60');
      left.push(Number(/^"api";r=(\d+);t=\d+$/.exec(headers.ratelimit)?.[1]));
    }
    expect(left).toEqual(Array.from({ length: 30 }, (_none, index) => 5999 - index));
  });

  it('holds for all who are not signed in at one network', async () => {
    const address = anyAddress();
    await limiter.count('api-unknown', `network ${address}`, ratePolicies['api-unknown'].quota);
    const response = await asPerson(test, { cookie: 'authjs.session-token=rubbish', address }).get('/health');
    expect(response.status).toBe(429);
    expect((await asPerson(test).get('/health')).status).toBe(200);
  });
});

describe('the counters', () => {
  it('count exactly where many count at once', async () => {
    const key = randomUUID();
    const standings = await Promise.all(
      Array.from({ length: 60 }, () => limiter.count('sign-in-network', key)),
    );
    expect(standings.map(({ remaining }) => remaining).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 60 }, (_none, index) => 40 + index),
    );
  });

  it('name neither people nor networks in the database', async () => {
    const email = freshAddress();
    await wrong(email, '10.99.98.97');
    const rows = await test.database.db.select({ key: rateLimits.key }).from(rateLimits);
    expect(rows.every(({ key }) => /^[a-z-]+:[0-9a-f]{64}$/.test(key))).toBe(true);
  });

  it('begin anew when their time is over', async () => {
    const key = randomBytes(8).toString('hex');
    const quick = rateLimiter(
      {
        config: readConfig({ PRIVATE_DATABASE_URL: inject('databaseUrl'), AUTH_SECRET: testSecret }),
        database: test.database,
      },
      { ...ratePolicies, 'sign-up': { quota: 2, seconds: 1 } },
    );
    const overs = [];
    for (let index = 0; index < 3; index++) overs.push((await quick.count('sign-up', key)).isOver);
    await new Promise((resolve) => setTimeout(resolve, 1100));
    overs.push((await quick.count('sign-up', key)).isOver);
    expect(overs).toEqual([false, false, true, false]);
  });
});

describe('connections that break while they count', () => {
  it('make a request fail, but neither the process nor the next one', async () => {
    const own = await makeOwnTestApp();
    const config = readConfig({ PRIVATE_DATABASE_URL: own.url, AUTH_SECRET: testSecret });
    const fragile = rateLimiter({ config, database: own.database });
    const name = connectionOptions(own.url).database;
    const away: boolean[] = [];
    for (let round = 0; round < 15; round++) {
      const counting = Array.from({ length: 12 }, (_none, index) =>
        fragile
          .count('sign-up', `${round} ${index}`)
          .catch((error: unknown) => away.push(databaseIsAway(error))),
      );
      const [rows] = (await test.database.pool.query(
        'SELECT id FROM information_schema.processlist WHERE db = ?',
        [name],
      )) as unknown as [{ id: number }[]];
      for (const { id } of rows) await test.database.pool.query(`KILL ${id}`).catch(() => undefined);
      await Promise.all(counting);
    }
    expect(away.length).toBeGreaterThan(0);
    expect(new Set(away)).toEqual(new Set([true]));
    expect((await fragile.count('sign-up', randomUUID())).isOver).toBe(false);
    await own.close();
  });
});
