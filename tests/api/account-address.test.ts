import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freshAddress, mailsTo, tokenSentTo } from '../support/outbox.ts';
import { asPerson, makePerson } from '../support/people.ts';
import { makePersonWithPassword, password, signIn } from '../support/sign-in.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

const nobody = () => asPerson(test);
const newPassword = 'eleven fathoms deep';

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
