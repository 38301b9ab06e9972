import { eq } from 'drizzle-orm';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sessions, users } from '../../server/db/schema/index.ts';
import { freshAddress, tokenSentTo } from '../support/outbox.ts';
import { anyAddress, asPerson, makeCrew, makePerson, makeSession } from '../support/people.ts';
import { cookiesOf, makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
import { host, makeTestApp, origin, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const account = (cookie: string) => asPerson(test, { cookie, address: anyAddress() }).get('/account');

describe('signing in', () => {
  it('gives a session that the API takes', async () => {
    const person = await makePersonWithPassword(test);
    const { response, outcome, cookie } = await signIn(test, person.email, password);
    expect(response.status).toBe(200);
    expect(outcome).toBe('');
    const answer = await account(cookie ?? '');
    expect(answer.status).toBe(200);
    expect(answer.body).toEqual({ id: person.id, name: person.name, email: person.email, memberships: [] });
  });

  it('takes the address in any case, with blanks around it', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie } = await signIn(test, ` ${person.email.toUpperCase()} `, password);
    expect(cookie).toBeDefined();
  });

  it('sets a cookie that scripts cannot read and other sites do not send', async () => {
    const person = await makePersonWithPassword(test);
    const { response } = await signIn(test, person.email, password);
    const line = ((response.headers['set-cookie'] ?? []) as unknown as string[]).find((set) =>
      set.startsWith('authjs.session-token='),
    );
    expect(line).toMatch(/HttpOnly/);
    expect(line).toMatch(/SameSite=Lax/);
  });

  it('answers an unknown address and a wrong password in the same words', async () => {
    const person = await makePersonWithPassword(test);
    const wrong = await signIn(test, person.email, 'not the password');
    const unknown = await signIn(test, freshAddress(), 'not the password');
    expect(wrong.outcome).toBe('error=CredentialsSignin&code=credentials');
    expect(unknown.outcome).toBe(wrong.outcome);
    expect(unknown.response.status).toBe(wrong.response.status);
    expect(unknown.response.body).toEqual(wrong.response.body);
    expect(Object.keys(unknown.response.headers).sort()).toEqual(Object.keys(wrong.response.headers).sort());
    expect(unknown.cookie).toBeUndefined();
  });

  it('tells of an unverified address only after the right password', async () => {
    const email = freshAddress();
    await asPerson(test).post('/account/sign-up', { name: 'Ines Marlow', email, password });
    expect((await signIn(test, email, 'not the password')).outcome).toBe(
      'error=CredentialsSignin&code=credentials',
    );
    const right = await signIn(test, email, password);
    expect(right.outcome).toBe('error=CredentialsSignin&code=unverified');
    expect(right.cookie).toBeUndefined();
    await asPerson(test).post('/account/verify-address', { token: await tokenSentTo(test, email) });
    expect((await signIn(test, email, password)).cookie).toBeDefined();
  });

  it.each([
    ['no fields', {}],
    ['lists', { email: ['a@b.example'], password: ['x'] }],
    ['objects', { email: { $ne: '' }, password: { $ne: '' } }],
    ['a password of 9,000 letters', { email: 'a@b.example', password: 'x'.repeat(9_000) }],
  ])('refuses %s', async (_what, fields) => {
    const csrf = await request(test.app).get('/auth/csrf').set('Host', host);
    const response = await request(test.app)
      .post('/auth/callback/credentials')
      .set({ Host: host, Origin: origin, Cookie: cookiesOf(csrf), 'X-Forwarded-For': anyAddress() })
      .set('X-Auth-Return-Redirect', '1')
      .send({ ...fields, csrfToken: (csrf.body as { csrfToken: string }).csrfToken });
    expect((response.body as { url: string }).url).toContain('error=CredentialsSignin&code=credentials');
  });

  it('refuses a body that is too large', async () => {
    const response = await request(test.app)
      .post('/auth/callback/credentials')
      .set({ Host: host, Origin: origin })
      .send({ email: 'a@b.example', password: 'x'.repeat(20_000) });
    expect(response.status).toBe(413);
  });

  it('needs the token against forgery', async () => {
    const person = await makePersonWithPassword(test);
    const response = await request(test.app)
      .post('/auth/callback/credentials')
      .set({ Host: host, Origin: origin, 'X-Auth-Return-Redirect': '1' })
      .send({ email: person.email, password });
    expect((response.body as { url: string }).url).toContain('error=MissingCSRF');
    expect(cookiesOf(response)).not.toContain('session-token');
  });

  it('does not send on to another site', async () => {
    const person = await makePersonWithPassword(test);
    const csrf = await request(test.app).get('/auth/csrf').set('Host', host);
    const response = await request(test.app)
      .post('/auth/callback/credentials')
      .set({ Host: host, Origin: origin, Cookie: cookiesOf(csrf), 'X-Auth-Return-Redirect': '1' })
      .send({
        email: person.email,
        password,
        csrfToken: (csrf.body as { csrfToken: string }).csrfToken,
        callbackUrl: 'https://elsewhere.example/',
      });
    expect(new URL((response.body as { url: string }).url).origin).toBe(origin);
  });

  it('never falls through to the client', async () => {
    for (const path of ['/auth', '/auth/nothing', '/auth/callback/elsewhere']) {
      const response = await request(test.app)
        .get(path)
        .set('Host', host)
        .set('X-Forwarded-For', anyAddress());
      expect([path, response.status]).toEqual([path, expect.toBeOneOf([302, 400, 404])]);
    }
  });
});

describe('a session', () => {
  const inApi = async (cookie: string) => (await account(cookie)).status;

  it('ends at sign-out, at once', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie = '' } = await signIn(test, person.email, password);
    const csrf = await request(test.app).get('/auth/csrf').set('Host', host).set('Cookie', cookie);
    const response = await request(test.app)
      .post('/auth/signout')
      .set({
        Host: host,
        Origin: origin,
        Cookie: `${cookie}; ${cookiesOf(csrf)}`,
        'X-Auth-Return-Redirect': '1',
      })
      .send({ csrfToken: (csrf.body as { csrfToken: string }).csrfToken });
    expect(response.status).toBe(200);
    expect(await inApi(cookie)).toBe(401);
  });

  it('that was revoked counts neither for the API nor for Auth.js', async () => {
    const person = await makePerson(test);
    expect(await inApi(person.cookie)).toBe(200);
    await test.database.db
      .update(sessions)
      .set({ revokedAt: new Date() })
      .where(eq(sessions.id, person.sessionId));
    expect(await inApi(person.cookie)).toBe(401);
    const session = await request(test.app)
      .get('/auth/session')
      .set('Host', host)
      .set('Cookie', person.cookie);
    expect(session.body).toBeNull();
  });

  it('that has run out does not count', async () => {
    const person = await makePerson(test);
    const { cookie } = await makeSession(test, person.id, { expiresAt: new Date(Date.now() - 1000) });
    expect(await inApi(cookie)).toBe(401);
  });

  it('of an earlier session version does not count', async () => {
    const person = await makePerson(test);
    await test.database.db.update(users).set({ sessionVersion: 2 }).where(eq(users.id, person.id));
    expect(await inApi(person.cookie)).toBe(401);
  });

  it('does not count once the account is gone', async () => {
    const person = await makePerson(test);
    await test.database.db.delete(users).where(eq(users.id, person.id));
    expect(await inApi(person.cookie)).toBe(401);
  });

  it.each([
    ['cut short', (cookie: string) => cookie.slice(0, -10)],
    [
      'with another letter',
      (cookie: string) => `${cookie.slice(0, -30)}${cookie.at(-30) === 'A' ? 'B' : 'A'}${cookie.slice(-29)}`,
    ],
    ['empty', () => 'authjs.session-token='],
    ['of rubbish', () => 'authjs.session-token=rubbish'],
  ])('whose cookie is %s does not count', async (_what, change) => {
    const person = await makePerson(test);
    expect(await inApi(change(person.cookie))).toBe(401);
  });

  it('answers 401 with a challenge (RFC 9110 §11.6.1)', async () => {
    const response = await asPerson(test).get('/account');
    expect(response.status).toBe(401);
    expect(response.headers['www-authenticate']).toMatch(/^Bearer/);
    expect(response.body).toMatchObject({ type: '/problems/unauthorized', status: 401 });
  });

  it('does not count where the request carries an Authorization header', async () => {
    const person = await makePerson(test);
    const response = await request(test.app)
      .get('/api/v1/account')
      .set({ Host: host, Cookie: person.cookie, Authorization: 'Bearer nothing' });
    expect(response.status).toBe(401);
  });

  it('shows Auth.js no more than who it is', async () => {
    const person = await makePerson(test);
    const response = await request(test.app)
      .get('/auth/session')
      .set('Host', host)
      .set('Cookie', person.cookie);
    expect(Object.keys(response.body as object).sort()).toEqual(['expires', 'user']);
    expect((response.body as { user: object }).user).toEqual({ id: String(person.id) });
  });
});

describe('a role', () => {
  it('that was taken away is gone with the next request', async () => {
    const { team, viewer, admin } = await makeCrew(test);
    expect((await asPerson(test, viewer).get(`/teams/${team.slug}`)).status).toBe(200);
    expect((await asPerson(test, admin).delete(`/teams/${team.slug}/members/${viewer.id}`)).status).toBe(204);
    expect((await asPerson(test, viewer).get(`/teams/${team.slug}`)).status).toBe(404);
  });
});
