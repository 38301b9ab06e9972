import { randomBytes, randomInt } from 'node:crypto';
import request, { type Test } from 'supertest';
import type { Role } from '../../shared/contract/index.ts';
import { cookieName, sealClaims, sessionSeconds } from '../../server/auth/session-token.ts';
import { auditHeads, memberships, sessions, teams, users } from '../../server/db/schema/index.ts';
import { host, origin, testSecret, type TestApp } from './test-app.ts';

export interface TestPerson {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly cookie: string;
  readonly sessionId: string;
  /** The address the person's requests come from, so that rate limits do not join strangers. */
  readonly address: string;
}

export const anyAddress = () => `10.${randomInt(256)}.${randomInt(256)}.${randomInt(1, 255)}`;

/** A person with a verified address who is signed in, put straight into the database; the password opens nothing. */
export async function makePerson(test: Pick<TestApp, 'database'>, name = 'Ines Marlow'): Promise<TestPerson> {
  const { db } = test.database;
  const email = `${randomBytes(6).toString('hex')}@ninthfathom.example`;
  const [{ id }] = await db.insert(users).values({ name, email, emailVerifiedAt: new Date() }).$returningId();
  return { id, name, email, address: anyAddress(), ...(await makeSession(test, id)) };
}

/** One more sign-in of a person. `expiresAt` in the past makes one that has run out. */
export async function makeSession(
  test: Pick<TestApp, 'database'>,
  userId: number,
  { expiresAt = new Date(Date.now() + sessionSeconds * 1000) } = {},
): Promise<{ cookie: string; sessionId: string }> {
  const sessionId = randomBytes(16).toString('base64url');
  const sessionVersion = 1;
  await test.database.db
    .insert(sessions)
    .values({ id: sessionId, userId, sessionVersion, client: 'a test', lastSeenAt: new Date(), expiresAt });
  const sealed = await sealClaims(
    { userId, sessionId, sessionVersion },
    { secret: testSecret, secure: false },
  );
  return { sessionId, cookie: `${cookieName(false)}=${sealed}` };
}

export interface TestTeam {
  readonly id: number;
  readonly slug: string;
}

/** A team with these members, put straight into the database. */
export async function makeTeam(
  test: Pick<TestApp, 'database'>,
  members: readonly { readonly person: TestPerson; readonly role: Role }[],
  name = 'Ninth Fathom',
): Promise<TestTeam> {
  const { db } = test.database;
  const slug = `ninth-fathom-${randomBytes(5).toString('hex')}`;
  const defaults = { arrayPrefix: '', licenceLine: '', bits: 8, length: 256, target: 'c99' };
  const [{ id }] = await db.insert(teams).values({ slug, name, defaults }).$returningId();
  await db.insert(auditHeads).values({ teamId: id });
  for (const { person, role } of members) await join(test, id, person, role);
  return { id, slug };
}

export async function join(
  test: Pick<TestApp, 'database'>,
  teamId: number,
  person: TestPerson,
  role: Role,
): Promise<void> {
  await test.database.db.insert(memberships).values({ teamId, userId: person.id, role });
}

/** A signed-in person for each role, in one team. */
export async function makeCrew(test: Pick<TestApp, 'database'>) {
  const [viewer, author, reviewer, admin] = await Promise.all([
    makePerson(test, 'Vera Quill'),
    makePerson(test, 'Aldo Brine'),
    makePerson(test, 'Rhea Sound'),
    makePerson(test, 'Ada Keel'),
  ]);
  const team = await makeTeam(test, [
    { person: viewer, role: 'viewer' },
    { person: author, role: 'author' },
    { person: reviewer, role: 'reviewer' },
    { person: admin, role: 'admin' },
  ]);
  return { team, viewer, author, reviewer, admin };
}

/** Sends requests as the person, or as nobody: from our own page, to paths below /api/v1. */
export function asPerson(test: TestApp, person?: Pick<TestPerson, 'cookie' | 'address'>) {
  const address = person?.address ?? anyAddress();
  const send = (method: 'get' | 'post' | 'patch' | 'put' | 'delete', path: string, body?: object): Test => {
    const agent = request(test.app);
    const sent = agent[method](`/api/v1${path}`)
      .set('Host', host)
      .set('Origin', origin)
      .set('X-Forwarded-For', address);
    if (person) sent.set('Cookie', person.cookie);
    return body === undefined ? sent : sent.send(body);
  };
  return {
    get: (path: string) => send('get', path),
    post: (path: string, body?: object) => send('post', path, body),
    patch: (path: string, body?: object) => send('patch', path, body),
    put: (path: string, body?: object) => send('put', path, body),
    delete: (path: string, body?: object) => send('delete', path, body),
  };
}
