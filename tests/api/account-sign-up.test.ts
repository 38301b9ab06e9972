import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { oneTimeLinks, users } from '../../server/db/schema/index.ts';
import { freshAddress, mailsTo, tokenSentTo } from '../support/outbox.ts';
import { anyAddress, asPerson, makePerson } from '../support/people.ts';
import { makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
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
const noToken = 'A'.repeat(43);

describe('POST /account/sign-up', () => {
  it('takes a new address, which the mailed link verifies', async () => {
    const email = freshAddress();
    const response = await signUp(email);
    expect([response.status, response.text]).toEqual([202, '']);
    const verified = await nobody().post('/account/verify-address', {
      token: await tokenSentTo(test, email),
    });
    expect([verified.status, verified.body]).toEqual([200, { email }]);
    const { cookie = '' } = await signIn(test, email, password);
    const account = await asPerson(test, { cookie, address: anyAddress() }).get('/account');
    expect(account.body).toMatchObject({ name: 'Ines Marlow', email, memberships: [] });
  });

  it('answers alike for an address that has an account, whose owner gets word without a token', async () => {
    const person = await makePersonWithPassword(test);
    const response = await signUp(person.email, { password: 'somebody else’s idea' });
    expect([response.status, response.text]).toEqual([202, '']);
    const [mail] = await mailsTo(test, person.email);
    expect(mail.subject).toBe('You have an account already');
    expect(mail.textBody).not.toContain('#');
    expect((await signIn(test, person.email, password)).cookie).toBeDefined();
  });

  it('takes about as long for a known address as for a new one', async () => {
    const person = await makePersonWithPassword(test);
    const timeOf = async (email: string) => {
      const start = performance.now();
      await signUp(email);
      return performance.now() - start;
    };
    expect(await timeOf(person.email)).toBeGreaterThan(395);
    expect(await timeOf(freshAddress())).toBeGreaterThan(395);
  });

  it('lets the newest sign-up count while the address is not verified', async () => {
    const email = freshAddress();
    await signUp(email, { password: 'of somebody else' });
    const first = await tokenSentTo(test, email);
    await signUp(email);
    expect((await nobody().post('/account/verify-address', { token: first })).status).toBe(404);
    await nobody().post('/account/verify-address', { token: await tokenSentTo(test, email) });
    expect((await signIn(test, email, 'of somebody else')).cookie).toBeUndefined();
    expect((await signIn(test, email, password)).cookie).toBeDefined();
  });

  it('makes one account of six sign-ups at once', async () => {
    const email = freshAddress();
    const answers = await Promise.all(Array.from({ length: 6 }, () => signUp(email)));
    expect(answers.map(({ status }) => status)).toEqual(Array(6).fill(202));
    expect(await test.database.db.select().from(users).where(eq(users.email, email))).toHaveLength(1);
  });

  it.each([
    ['no body', undefined, ['body']],
    ['a short password', { password: 'short' }, ['password']],
    ['no address', { email: 'not an address' }, ['email']],
    ['a name of blanks', { name: '   ' }, ['name']],
    ['a field it does not know', { role: 'admin' }, ['role']],
    ['an address too long', { email: `${'a'.repeat(250)}@b.example` }, ['email']],
  ])('refuses %s', async (_what, changes, paths) => {
    const fields = changes && { name: 'Ines', email: freshAddress(), password, ...changes };
    const response = await nobody().post('/account/sign-up', fields);
    expect(response.status).toBe(422);
    const { errors } = response.body as { errors: { path: string; value: string }[] };
    expect(errors.map(({ path }) => path)).toEqual(paths);
    expect(response.text).not.toContain('short"');
  });

  it('keeps neither the password nor the token as they are', async () => {
    const email = freshAddress();
    await signUp(email);
    const token = await tokenSentTo(test, email);
    const [user] = await test.database.db.select().from(users).where(eq(users.email, email));
    expect(user.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    const links = await test.database.db.select().from(oneTimeLinks).where(eq(oneTimeLinks.email, email));
    expect(JSON.stringify(links)).not.toContain(token);
  });

  it('takes the same password in another Unicode form', async () => {
    const email = freshAddress();
    await signUp(email, { password: 'sirène à vapeur'.normalize('NFD') });
    await nobody().post('/account/verify-address', { token: await tokenSentTo(test, email) });
    expect((await signIn(test, email, 'sirène à vapeur'.normalize('NFC'))).cookie).toBeDefined();
  });
});

describe('mailed links', () => {
  it('work once', async () => {
    const email = freshAddress();
    await signUp(email);
    const token = await tokenSentTo(test, email);
    const [first, second] = [
      await nobody().post('/account/verify-address', { token }),
      await nobody().post('/account/verify-address', { token }),
    ];
    expect([first.status, second.status]).toEqual([200, 410]);
    expect(second.body).toMatchObject({ type: '/problems/link-used' });
  });

  it('run out', async () => {
    const email = freshAddress();
    await signUp(email);
    await test.database.db
      .update(oneTimeLinks)
      .set({ expiresAt: new Date(Date.now() - 1) })
      .where(eq(oneTimeLinks.email, email));
    const response = await nobody().post('/account/verify-address', {
      token: await tokenSentTo(test, email),
    });
    expect([response.status, (response.body as { type: string }).type]).toEqual([
      410,
      '/problems/link-expired',
    ]);
  });

  it('serve no other purpose than their own', async () => {
    const email = freshAddress();
    await signUp(email);
    const token = await tokenSentTo(test, email);
    for (const [path, body] of [
      ['/account/reset-password', { token, password: newPassword }],
      ['/account/confirm-address', { token }],
      ['/invitations/open', { token }],
    ] as const) {
      expect([path, (await nobody().post(path, body)).status]).toEqual([path, 404]);
    }
  });

  it.each(['/account/verify-address', '/account/confirm-address', '/invitations/open'])(
    'of %s are refused where unknown or malformed',
    async (path) => {
      expect((await nobody().post(path, { token: noToken })).status).toBe(404);
      expect((await nobody().post(path, { token: 'short' })).status).toBe(422);
      expect((await nobody().post(path, {})).status).toBe(422);
      expect((await nobody().get(path)).status).toBe(405);
    },
  );
});

describe('POST /account/resend-verification', () => {
  it('sends a new link to who waits for one; the old one works no longer', async () => {
    const email = freshAddress();
    await signUp(email);
    const old = await tokenSentTo(test, email);
    expect((await nobody().post('/account/resend-verification', { email })).status).toBe(202);
    expect((await nobody().post('/account/verify-address', { token: old })).status).toBe(404);
    const token = await tokenSentTo(test, email);
    expect((await nobody().post('/account/verify-address', { token })).status).toBe(200);
  });

  it('answers alike for others and sends nothing', async () => {
    const person = await makePerson(test);
    for (const email of [person.email, freshAddress()]) {
      const response = await nobody().post('/account/resend-verification', { email });
      expect([response.status, response.text, (await mailsTo(test, email)).length]).toEqual([202, '', 0]);
    }
    expect((await nobody().post('/account/resend-verification', { email: 'x' })).status).toBe(422);
  });
});

describe('limits on the rate of mail', () => {
  it('hold for one address, known or not, whoever asks', async () => {
    for (const email of [(await makePerson(test)).email, freshAddress()]) {
      const answers = [];
      for (let ask = 0; ask < 7; ask++)
        answers.push(await nobody().post('/account/forgot-password', { email }));
      expect(answers.map(({ status }) => status)).toEqual([...Array<number>(6).fill(202), 429]);
      expect(Number(answers[6].headers['retry-after'])).toBeGreaterThan(3500);
    }
  });
});
