import request, { type Response } from 'supertest';
import { hashPassword } from '../../server/auth/passwords.ts';
import { users } from '../../server/db/schema/index.ts';
import { eq } from 'drizzle-orm';
import { anyAddress, makePerson, type TestPerson } from './people.ts';
import { host, origin, type TestApp } from './test-app.ts';

export const password = 'nine fathoms deep';
let hash: Promise<string> | undefined;

/** As `makePerson`, with a password that signs in. */
export async function makePersonWithPassword(test: TestApp, name?: string): Promise<TestPerson> {
  const person = await makePerson(test, name);
  hash ??= hashPassword(password);
  await test.database.db
    .update(users)
    .set({ passwordHash: await hash })
    .where(eq(users.id, person.id));
  return person;
}

/** All Set-Cookie headers of an answer, as a Cookie header would send them back. */
export const cookiesOf = (response: Response): string =>
  ((response.headers['set-cookie'] ?? []) as unknown as string[])
    .map((line) => line.split(';')[0])
    .join('; ');

export interface SignInAnswer {
  readonly response: Response;
  /** `error=…&code=…` of the address Auth.js sends to; empty after a success. */
  readonly outcome: string;
  /** The session's cookie, undefined where none was set. */
  readonly cookie: string | undefined;
  readonly address: string;
}

/** Signs in as the client does: Auth.js's own protocol over HTTP. */
export async function signIn(
  test: TestApp,
  email: string,
  typed: string,
  { address = anyAddress() } = {},
): Promise<SignInAnswer> {
  const csrf = await request(test.app).get('/auth/csrf').set('Host', host).set('X-Forwarded-For', address);
  const { csrfToken } = csrf.body as { csrfToken: string };
  const response = await request(test.app)
    .post('/auth/callback/credentials')
    .set({ Host: host, Origin: origin, 'X-Forwarded-For': address, Cookie: cookiesOf(csrf) })
    .set('X-Auth-Return-Redirect', '1')
    .set('User-Agent', 'Sextant/3.1 (a test)')
    .send({ email, password: typed, csrfToken, callbackUrl: `${origin}/` });
  const { url = '' } = response.body as { url?: string };
  const cookie = /(?:^|; )(authjs\.session-token=[^;]+)/.exec(cookiesOf(response))?.[1];
  return { response, outcome: url.split('?')[1] ?? '', cookie, address };
}
