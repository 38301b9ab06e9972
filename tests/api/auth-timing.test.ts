import { verify } from '@node-rs/argon2';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { freshAddress } from '../support/outbox.ts';
import { makePerson } from '../support/people.ts';
import { makePersonWithPassword, signIn } from '../support/sign-in.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

// Everything is computed as ever; the calls are noted. A stopwatch on a busy machine would prove less.
vi.mock('@node-rs/argon2', { spy: true });

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());
beforeEach(() => {
  vi.mocked(verify).mockClear();
});

/** What the time of a check depends on: which hash, how much memory, how many passes, the password's length. */
const workDone = () =>
  vi
    .mocked(verify)
    .mock.calls.map(([kept, typed]) => [
      String(kept).split('$').slice(1, 4),
      String(kept).length,
      String(typed).length,
    ]);

describe('signing in computes the same hash', () => {
  it.each([
    ['for a wrong password', async () => (await makePersonWithPassword(test)).email],
    ['for an unknown address', () => Promise.resolve(freshAddress())],
    ['for an account without a password', async () => (await makePerson(test)).email],
  ])('%s', async (_what, addressOf) => {
    const { outcome } = await signIn(test, await addressOf(), 'not the password');
    expect(outcome).toBe('error=CredentialsSignin&code=credentials');
    expect(workDone()).toEqual([[['argon2id', 'v=19', 'm=19456,t=2,p=1'], 97, 16]]);
  });
});
