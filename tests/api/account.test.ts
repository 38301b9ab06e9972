import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailsTo } from '../support/outbox.ts';
import { anyAddress, asPerson, makePerson, makeTeam } from '../support/people.ts';
import { cookiesOf, makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const nobody = () => asPerson(test);

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
