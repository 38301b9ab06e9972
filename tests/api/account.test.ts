import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailOutbox, oneTimeLinks, users } from '../../server/db/schema/index.ts';
import { freshAddress, mailsTo, tokenSentTo } from '../support/outbox.ts';
import { anyAddress, asPerson, makePerson, makeTeam } from '../support/people.ts';
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

  it('makes one account of eight sign-ups at once', async () => {
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

describe('GET and PATCH /account', () => {
  it('shows the person with their teams', async () => {
    const person = await makePerson(test);
    const team = await makeTeam(test, [{ person, role: 'reviewer' }]);
    const response = await asPerson(test, person).get('/account');
    expect(response.body).toMatchObject({
      memberships: [{ teamSlug: team.slug, teamName: 'Ninth Fathom', role: 'reviewer' }],
    });
    expect(response.headers['cache-control']).toBe('no-store');
  });

  it('changes the name', async () => {
    const person = await makePerson(test);
    const response = await asPerson(test, person).patch('/account', { name: '  Ines M. Marlow ' });
    expect([response.status, (response.body as { name: string }).name]).toEqual([200, 'Ines M. Marlow']);
    expect((await asPerson(test, person).get('/account')).body).toMatchObject({ name: 'Ines M. Marlow' });
  });

  it('refuses nobody, and what is no name', async () => {
    const person = await makePerson(test);
    expect((await nobody().get('/account')).status).toBe(401);
    expect((await nobody().patch('/account', { name: 'X' })).status).toBe(401);
    for (const body of [
      {},
      { name: '' },
      { name: 7 },
      { name: 'x'.repeat(101) },
      { name: 'X', email: 'a@b.example' },
    ]) {
      expect((await asPerson(test, person).patch('/account', body)).status).toBe(422);
    }
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

describe('a change of address', () => {
  const ask = (person: Parameters<typeof asPerson>[1], email: string) =>
    asPerson(test, person).post('/account/change-address', { currentPassword: password, email });

  it('takes place by a link to the new address; the old one gets word', async () => {
    const person = await makePersonWithPassword(test);
    const email = freshAddress();
    expect((await ask(person, email)).status).toBe(202);
    const token = await tokenSentTo(test, email);
    expect((await asPerson(test, person).get('/account')).body).toMatchObject({ email: person.email });
    const response = await nobody().post('/account/confirm-address', { token });
    expect([response.status, response.body]).toEqual([200, { email }]);
    expect((await asPerson(test, person).get('/account')).body).toMatchObject({ email });
    expect((await mailsTo(test, person.email))[0].subject).toBe('Your address was changed');
    expect((await signIn(test, email, password)).cookie).toBeDefined();
    expect((await signIn(test, person.email, password)).cookie).toBeUndefined();
  });

  it('takes back links that were sent to the old address', async () => {
    const person = await makePersonWithPassword(test);
    await nobody().post('/account/forgot-password', { email: person.email });
    const reset = await tokenSentTo(test, person.email);
    const email = freshAddress();
    await ask(person, email);
    await nobody().post('/account/confirm-address', { token: await tokenSentTo(test, email) });
    expect(
      (await nobody().post('/account/reset-password', { token: reset, password: newPassword })).status,
    ).toBe(404);
  });

  it('answers alike for an address that somebody has, who gets word', async () => {
    const [person, owner] = [await makePersonWithPassword(test), await makePerson(test)];
    const response = await ask(person, owner.email);
    expect([response.status, response.text]).toEqual([202, '']);
    expect((await mailsTo(test, owner.email))[0].subject).toBe('You have an account already');
  });

  it('gives an address to one of two who confirm it at once', async () => {
    const [one, two] = [await makePersonWithPassword(test), await makePersonWithPassword(test)];
    const email = freshAddress();
    await ask(one, email);
    const first = await tokenSentTo(test, email);
    await ask(two, email);
    const second = await tokenSentTo(test, email);
    const answers = await Promise.all(
      [first, second].map((token) => nobody().post('/account/confirm-address', { token })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('refuses nobody, a wrong password, the present address, no address', async () => {
    const person = await makePersonWithPassword(test);
    const email = freshAddress();
    expect(
      (await nobody().post('/account/change-address', { currentPassword: password, email })).status,
    ).toBe(401);
    const wrong = await asPerson(test, person).post('/account/change-address', {
      currentPassword: 'no',
      email,
    });
    expect([wrong.status, (await mailsTo(test, email)).length]).toEqual([422, 0]);
    expect((await ask(person, person.email)).status).toBe(422);
    expect((await ask(person, 'nowhere')).status).toBe(422);
  });
});

describe('DELETE /account', () => {
  const remove = (person: Parameters<typeof asPerson>[1], currentPassword = password) =>
    asPerson(test, person).delete('/account', { currentPassword });

  it('takes the account, its sessions and the teams that nobody else is in', async () => {
    const person = await makePersonWithPassword(test);
    const team = await makeTeam(test, [{ person, role: 'admin' }]);
    const response = await remove(person);
    expect(response.status).toBe(204);
    expect(cookiesOf(response)).toBe('authjs.session-token=');
    expect((await asPerson(test, person).get('/account')).status).toBe(401);
    expect((await signIn(test, person.email, password)).cookie).toBeUndefined();
    const other = await makePerson(test);
    expect((await asPerson(test, other).get(`/teams/${team.slug}`)).status).toBe(404);
    expect((await mailsTo(test, person.email))[0].subject).toBe('Your account was deleted');
  });

  it('is refused for the last admin of a team with other members, naming it', async () => {
    const [person, other] = [await makePersonWithPassword(test), await makePerson(test)];
    const team = await makeTeam(test, [
      { person, role: 'admin' },
      { person: other, role: 'reviewer' },
    ]);
    const response = await remove(person);
    expect([response.status, response.body]).toEqual([
      409,
      expect.objectContaining({ teams: [{ slug: team.slug, name: 'Ninth Fathom' }] }),
    ]);
    await asPerson(test, person).patch(`/teams/${team.slug}/members/${other.id}`, { role: 'admin' });
    expect((await remove(person)).status).toBe(204);
    const members = await asPerson(test, other).get(`/teams/${team.slug}/members`);
    expect((members.body as { items: { userId: number }[] }).items.map(({ userId }) => userId)).toEqual([
      other.id,
    ]);
  });

  it('leaves a team an admin where its last two go at once', async () => {
    const [one, two, three] = [
      await makePersonWithPassword(test),
      await makePersonWithPassword(test),
      await makePerson(test),
    ];
    const team = await makeTeam(test, [
      { person: one, role: 'admin' },
      { person: two, role: 'admin' },
      { person: three, role: 'viewer' },
    ]);
    const answers = await Promise.all([remove(one), remove(two)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([204, 409]);
    const members = await asPerson(test, three).get(`/teams/${team.slug}/members`);
    expect((members.body as { items: { role: string }[] }).items.map(({ role }) => role).sort()).toEqual([
      'admin',
      'viewer',
    ]);
  });

  it('refuses nobody, no password, a wrong one', async () => {
    const person = await makePersonWithPassword(test);
    expect((await nobody().delete('/account', { currentPassword: password })).status).toBe(401);
    expect((await asPerson(test, person).delete('/account')).status).toBe(422);
    expect((await remove(person, 'not the password')).status).toBe(422);
    expect((await asPerson(test, person).get('/account')).status).toBe(200);
  });
});

describe('/account/sessions', () => {
  it('lists the sign-ins, the newest use first, and tells which one this is', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie = '' } = await signIn(test, person.email, password);
    const response = await asPerson(test, { cookie, address: anyAddress() }).get('/account/sessions');
    const { items } = response.body as { items: { id: string; isThisOne: boolean; client: string }[] };
    expect(items.map(({ isThisOne, client }) => ({ isThisOne, client }))).toEqual([
      { isThisOne: true, client: 'Sextant/3.1 (a test)' },
      { isThisOne: false, client: 'a test' },
    ]);
  });

  it('ends one of them', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie = '' } = await signIn(test, person.email, password);
    const here = asPerson(test, { cookie, address: anyAddress() });
    expect((await here.delete(`/account/sessions/${person.sessionId}`)).status).toBe(204);
    expect((await asPerson(test, person).get('/account')).status).toBe(401);
    expect((await here.get('/account')).status).toBe(200);
    expect((await here.delete(`/account/sessions/${person.sessionId}`)).status).toBe(404);
  });

  it('ends all others', async () => {
    const person = await makePersonWithPassword(test);
    const { cookie = '' } = await signIn(test, person.email, password);
    expect((await asPerson(test, person).delete('/account/sessions')).status).toBe(204);
    expect((await asPerson(test, { cookie, address: anyAddress() }).get('/account')).status).toBe(401);
    expect((await asPerson(test, person).get('/account')).status).toBe(200);
  });

  it('is nobody else’s', async () => {
    const [person, stranger] = [await makePerson(test), await makePerson(test)];
    expect((await asPerson(test, stranger).delete(`/account/sessions/${person.sessionId}`)).status).toBe(404);
    expect((await asPerson(test, person).get('/account')).status).toBe(200);
    for (const answer of [
      await nobody().get('/account/sessions'),
      await nobody().delete('/account/sessions'),
      await nobody().delete(`/account/sessions/${person.sessionId}`),
    ]) {
      expect(answer.status).toBe(401);
    }
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
    const rows = await test.database.db.select({ recipient: mailOutbox.recipient }).from(mailOutbox);
    expect(rows.length).toBeGreaterThan(0);
  });
});
