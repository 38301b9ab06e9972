import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { oneTimeLinks } from '../../server/db/schema/index.ts';
import { freshAddress, mailsTo, tokenSentTo } from '../support/outbox.ts';
import { anyAddress, asPerson } from '../support/people.ts';
import { cookiesOf, makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const nobody = () => asPerson(test);
const signUp = (email: string, changes: object = {}) =>
  nobody().post('/account/sign-up', { name: 'Ines Marlow', email, password, ...changes });
const newPassword = 'eleven fathoms deep';

describe('a forgotten password', () => {
  it('is set anew by a mailed link, which ends every session and every other link', async () => {
    const person = await makePersonWithPassword(test);
    await nobody().post('/account/forgot-password', { email: person.email });
    const token = await tokenSentTo(test, person.email);
    const response = await nobody().post('/account/reset-password', { token, password: newPassword });
    expect([response.status, response.body]).toEqual([200, { email: person.email }]);
    expect((await asPerson(test, person).get('/account')).status).toBe(401);
    expect((await signIn(test, person.email, password)).cookie).toBeUndefined();
    expect((await signIn(test, person.email, newPassword)).cookie).toBeDefined();
    const again = await nobody().post('/account/reset-password', { token, password: newPassword });
    expect(again.body).toMatchObject({ status: 410, type: '/problems/link-used' });
    expect((await mailsTo(test, person.email))[0].subject).toBe('Your password was changed');
  });

  it('answers alike for an unknown address, and as slowly', async () => {
    const person = await makePersonWithPassword(test);
    for (const [email, mails] of [
      [person.email, 1],
      [freshAddress(), 0],
    ] as const) {
      const start = performance.now();
      const response = await nobody().post('/account/forgot-password', { email });
      expect(performance.now() - start).toBeGreaterThan(395);
      expect([response.status, response.text, (await mailsTo(test, email)).length]).toEqual([202, '', mails]);
    }
  });

  it('verifies the address along the way', async () => {
    const email = freshAddress();
    await signUp(email, { password: 'of somebody else' });
    await nobody().post('/account/forgot-password', { email });
    await nobody().post('/account/reset-password', { token: await tokenSentTo(test, email), password });
    expect((await signIn(test, email, password)).cookie).toBeDefined();
  });

  it('lives 30 minutes', async () => {
    const person = await makePersonWithPassword(test);
    const before = Date.now();
    await nobody().post('/account/forgot-password', { email: person.email });
    const [link] = await test.database.db
      .select()
      .from(oneTimeLinks)
      .where(eq(oneTimeLinks.userId, person.id));
    const minutes = (link.expiresAt.getTime() - before) / 60_000;
    expect(minutes).toBeGreaterThanOrEqual(30);
    expect(minutes).toBeLessThan(30.2);
  });

  it('is refused with a short new one, and the link still works', async () => {
    const person = await makePersonWithPassword(test);
    await nobody().post('/account/forgot-password', { email: person.email });
    const token = await tokenSentTo(test, person.email);
    const refused = await nobody().post('/account/reset-password', { token, password: 'short' });
    expect(refused.status).toBe(422);
    expect(refused.text).not.toContain(token);
    expect((await nobody().post('/account/reset-password', { token, password: newPassword })).status).toBe(
      200,
    );
  });
});

describe('POST /account/change-password', () => {
  const body = { currentPassword: password, newPassword };

  it('ends every other session and goes on with a new one', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie: other = '' } = await signIn(test, person.email, password);
    const response = await asPerson(test, person).post('/account/change-password', body);
    expect(response.status).toBe(204);
    const renewed = cookiesOf(response);
    const statusWith = async (cookie: string) =>
      (await asPerson(test, { cookie, address: anyAddress() }).get('/account')).status;
    expect(await statusWith(renewed)).toBe(200);
    expect(await statusWith(other)).toBe(401);
    expect(await statusWith(person.cookie)).toBe(401);
    expect((await signIn(test, person.email, newPassword)).cookie).toBeDefined();
    expect((await mailsTo(test, person.email))[0].subject).toBe('Your password was changed');
  });

  it('refuses nobody, a wrong current password, a short new one', async () => {
    const person = await makePersonWithPassword(test);
    expect((await nobody().post('/account/change-password', body)).status).toBe(401);
    const wrong = await asPerson(test, person).post('/account/change-password', {
      ...body,
      currentPassword: 'no',
    });
    expect(wrong.status).toBe(422);
    expect((wrong.body as { errors: { path: string }[] }).errors[0].path).toBe('currentPassword');
    const short = await asPerson(test, person).post('/account/change-password', {
      ...body,
      newPassword: 'short',
    });
    expect([short.status, short.text.includes('"short"')]).toEqual([422, false]);
    expect((await asPerson(test, person).get('/account')).status).toBe(200);
  });

  it('lets one of two at once through', async () => {
    const person = await makePersonWithPassword(test);
    const answers = await Promise.all(
      ['first new password', 'second new password'].map((typed) =>
        asPerson(test, person).post('/account/change-password', {
          currentPassword: password,
          newPassword: typed,
        }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([204, expect.toBeOneOf([401, 422])]);
  });
});
