import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  idempotencyKeys,
  mailboxMessages,
  mailOutbox,
  oneTimeLinks,
  rateLimits,
  sessions,
  users,
} from '../../server/db/schema/index.ts';
import { cleanUp } from '../../server/upkeep/clean-up.ts';
import { repeat } from '../../server/upkeep/repeat.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { makePerson, makeTeam } from '../support/people.ts';
import { waitUntil } from '../support/wait-until.ts';

let test: OwnTestApp;
beforeAll(async () => {
  test = await makeOwnTestApp();
});
afterAll(() => test.close());

const hour = 3600 * 1000;
const day = 24 * hour;
const from = (ms: number) => new Date(Date.now() + ms);

describe('the clean-up', () => {
  it('deletes what has run out and nothing else', async () => {
    const { db } = test.database;
    const person = await makePerson(test);
    const session = (id: string, expiresAt: Date, revokedAt: Date | null) => ({
      ...{ id, userId: person.id, sessionVersion: 1, client: 'x', lastSeenAt: from(0), expiresAt, revokedAt },
    });
    await db.delete(sessions);
    await db
      .insert(sessions)
      .values([
        session('alive', from(day), null),
        session('over since a day', from(-day - hour), null),
        session('over since an hour', from(-hour), null),
        session('revoked long ago', from(day), from(-2 * day)),
        session('revoked just now', from(day), from(-hour)),
      ]);
    const link = (tokenHash: string, expiresAt: Date) => ({
      ...{ tokenHash, purpose: 'verify-address' as const, email: 'x', expiresAt },
    });
    await db
      .insert(oneTimeLinks)
      .values([link('works', from(hour)), link('over', from(-29 * day)), link('long over', from(-31 * day))]);
    const answer = (key: string, createdAt: Date) => ({
      userId: person.id,
      key,
      requestHash: 'x',
      createdAt,
    });
    await db
      .insert(idempotencyKeys)
      .values([answer('fresh', from(-23 * hour)), answer('old', from(-25 * hour))]);
    await db.insert(rateLimits).values([
      { key: 'counting', points: 1, expire: from(hour).getTime() },
      { key: 'over', points: 1, expire: from(-2 * hour).getTime() },
    ]);
    const mail = (messageId: string, state: 'waiting' | 'sent' | 'undelivered', dueAt: Date) => ({
      ...{ messageId, state, dueAt, recipient: 'x', subject: 'x' },
    });
    await db
      .insert(mailOutbox)
      .values([
        mail('waits', 'waiting', from(-60 * day)),
        mail('sent', 'sent', from(-29 * day)),
        mail('sent long ago', 'sent', from(-31 * day)),
        mail('given up long ago', 'undelivered', from(-31 * day)),
      ]);
    const account = (name: string, createdAt: Date, emailVerifiedAt: Date | null) => ({
      ...{ name, email: `${name}@b.example`, createdAt, emailVerifiedAt },
    });
    await db
      .insert(users)
      .values([
        account('verified', from(-90 * day), from(-90 * day)),
        account('new', from(-29 * day), null),
        account('never verified', from(-31 * day), null),
      ]);
    await db.insert(mailboxMessages).values(
      Array.from({ length: 503 }, (_none, index) => ({
        ...{ messageId: `<${index}@x>`, recipient: 'x', sender: 'x', subject: `Mail ${index}` },
        ...{ textBody: '', htmlBody: '', receivedAt: from(0) },
      })),
    );

    await cleanUp(db);

    const ids = async <Row>(rows: Promise<Row[]>, name: (row: Row) => string) =>
      (await rows).map(name).sort();
    expect(await ids(db.select().from(sessions), ({ id }) => id)).toEqual([
      'alive',
      'over since an hour',
      'revoked just now',
    ]);
    expect(await ids(db.select().from(oneTimeLinks), ({ tokenHash }) => tokenHash)).toEqual([
      'over',
      'works',
    ]);
    expect(await ids(db.select().from(idempotencyKeys), ({ key }) => key)).toEqual(['fresh']);
    expect(await ids(db.select().from(rateLimits), ({ key }) => key)).toEqual(['counting']);
    expect(await ids(db.select().from(mailOutbox), ({ messageId }) => messageId)).toEqual(['sent', 'waits']);
    expect(await ids(db.select().from(users), ({ name }) => name)).toEqual([person.name, 'new', 'verified']);
    const kept = await db.select().from(mailboxMessages);
    expect([kept.length, kept[0].subject]).toEqual([500, 'Mail 3']);
  });

  it('leaves somebody unverified who belongs to a team', async () => {
    const { db } = test.database;
    const person = await makePerson(test);
    await makeTeam(test, [{ person, role: 'viewer' }]);
    await db.update(users).set({ emailVerifiedAt: null, createdAt: from(-99 * day) });
    await cleanUp(db);
    expect((await db.select().from(users)).map(({ id }) => id)).toContain(person.id);
  });

  it('gets through more rows than one statement deletes', async () => {
    const { db } = test.database;
    const over = { points: 1, expire: from(-day).getTime() };
    await db
      .insert(rateLimits)
      .values(Array.from({ length: 2500 }, (_none, index) => ({ key: `key ${index}`, ...over })));
    await cleanUp(db);
    expect((await db.select().from(rateLimits)).map(({ key }) => key)).toEqual(['counting']);
  });
});

describe('repeated work', () => {
  it('goes on after an error and stops when it is closed', async () => {
    let runs = 0;
    const work = () => {
      runs += 1;
      return runs === 1 ? Promise.reject(new Error('once')) : Promise.resolve();
    };
    const repeated = repeat(work, 5, pino({ level: 'silent' }));
    await waitUntil('three runs', () => runs >= 3);
    await repeated.close();
    const before = runs;
    await new Promise((resolve) => setTimeout(resolve, 50));
    expect(runs).toBe(before);
  });
});
