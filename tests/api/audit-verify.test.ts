import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { and, eq, gt, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { appendEvent } from '../../server/audit/append-event.ts';
import { deriveAuditKey } from '../../server/audit/mac.ts';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { openDatabase } from '../../server/db/client.ts';
import { auditEvents, auditHeads, teams } from '../../server/db/schema/index.ts';
import { withTransaction } from '../../server/db/transaction.ts';
import { expectOneLine, stepwell } from '../support/command-line.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { makeTestApp, testSecret } from '../support/test-app.ts';
import { freshTable } from '../support/trespass-routes.ts';

let test: OwnTestApp;
let admin: TestPerson;
beforeAll(async () => {
  test = await makeOwnTestApp();
  admin = await makePerson(test, 'Ada Keel');
});
afterAll(() => test.close());

const verify = (args: readonly string[] = [], env: NodeJS.ProcessEnv = {}) =>
  stepwell(['audit-verify', ...args], { env: { DATABASE_URL: test.url, AUTH_SECRET: testSecret, ...env } });

const key = deriveAuditKey(testSecret);
const events = 6;

/** A team of six events, and what somebody does to its rows who can write to the database but has not the key. */
async function makeTampered(slug: string, tamper: (team: Tampering) => Promise<unknown>): Promise<void> {
  const { db } = test.database;
  const { id } = await makeTeam(test, [{ person: admin, role: 'admin' }]);
  await db.update(teams).set({ slug }).where(eq(teams.id, id));
  for (let index = 1; index <= events; index++) await append(id, { index });
  const at = (sequence: number) => and(eq(auditEvents.teamId, id), eq(auditEvents.sequence, sequence));
  await tamper({
    id,
    set: (sequence, change) => db.update(auditEvents).set(change).where(at(sequence)),
    remove: (sequence) => db.delete(auditEvents).where(at(sequence)),
    move: (from, to) => db.update(auditEvents).set({ sequence: to }).where(at(from)),
    shift: (after, by) =>
      db
        .update(auditEvents)
        .set({ sequence: sql`${auditEvents.sequence} + ${by}` })
        .where(and(eq(auditEvents.teamId, id), gt(auditEvents.sequence, after)))
        .orderBy(by > 0 ? sql`${auditEvents.sequence} desc` : auditEvents.sequence),
    insert: async (sequence) => {
      const [row] = await db.select().from(auditEvents).where(at(1));
      await db.insert(auditEvents).values({ ...row, sequence, action: 'revision.vetted' });
    },
    head: (change) => db.update(auditHeads).set(change).where(eq(auditHeads.teamId, id)),
  });
}

interface Tampering {
  readonly id: number;
  set(sequence: number, change: Partial<typeof auditEvents.$inferInsert>): Promise<unknown>;
  remove(sequence: number): Promise<unknown>;
  move(from: number, to: number): Promise<unknown>;
  /** Gives all events after one other numbers. */
  shift(after: number, by: number): Promise<unknown>;
  insert(sequence: number): Promise<unknown>;
  head(change: Partial<typeof auditHeads.$inferInsert>): Promise<unknown>;
}

const append = (teamId: number, details: object, secret = key) =>
  withTransaction(test.database.db, (transaction) =>
    appendEvent(transaction, secret, {
      ...{ teamId, actor: admin, action: 'table.created', subject: 'table:fog-signal' },
      details: { ...details },
    }),
  );

describe('audit-verify finds', () => {
  it('each way of tampering, a line for each team, and says how', async () => {
    await makeTampered('whole', () => Promise.resolve());
    await makeTampered('changed', ({ set }) => set(3, { details: { index: 99 } }));
    await makeTampered('removed', async ({ remove }) => [await remove(2), await remove(3)]);
    await makeTampered('renumbered', async ({ remove, shift, head }) => {
      await remove(3);
      await shift(3, -1);
      await head({ lastSequence: events - 1 });
    });
    await makeTampered('inserted', async ({ shift, insert, head }) => {
      await shift(2, 1);
      await insert(3);
      await head({ lastSequence: events + 1 });
    });
    await makeTampered('appended', ({ insert }) => insert(events + 1));
    await makeTampered('forged', ({ id }) =>
      append(id, {}, deriveAuditKey('another secret of enough letters')),
    );
    await makeTampered('swapped', async ({ move }) => {
      await move(2, 1000);
      await move(5, 2);
      await move(1000, 5);
    });
    await makeTampered('neighbours', async ({ move }) => {
      await move(3, 1000);
      await move(4, 3);
      await move(1000, 4);
    });
    await makeTampered('cut-off', async ({ remove }) => [await remove(5), await remove(6)]);
    await makeTampered('emptied', async ({ remove, head }) => {
      for (let sequence = 1; sequence <= events; sequence++) await remove(sequence);
      await head({ lastSequence: 0, lastMac: '' });
    });
    await makeTampered('set-back', ({ head }) => head({ lastSequence: 4 }));

    const { status, stdout, stderr } = await verify();
    expect([status, stderr]).toEqual([1, '']);
    expect(stdout.trimEnd().split('\n')).toEqual([
      'appended: broken at event 7, inserted: event 7 was inserted at the end',
      'changed: broken at event 3, changed: event 3 was changed',
      'cut-off: broken at event 5, cut-off: events 5 to 6 are missing at the end',
      'emptied: broken at event 1, cut-off: event 1 is missing at the end',
      'forged: broken at event 7, foreign: event 7 was changed, or was not written by Stepwell',
      'inserted: broken at event 3, inserted: event 3 was inserted',
      'neighbours: broken at event 3, reordered: event 3 stands at 4: the order was changed',
      'removed: broken at event 2, removed: events 2 to 3 are missing',
      'renumbered: broken at event 3, removed: event 3 is missing; those after have new numbers',
      'set-back: broken at event 7, head: the chain ends with event 6, and not where its head says',
      'swapped: broken at event 2, reordered: event 2 stands at 5: the order was changed',
      'whole: whole, 6 events',
    ]);
  });

  it('one team alone, and answers programs in JSON', async () => {
    const whole = await verify(['--team', 'whole', '--json']);
    expect([whole.status, whole.stderr]).toEqual([0, '']);
    const [row] = await test.database.db
      .select({ mac: auditHeads.lastMac })
      .from(auditHeads)
      .innerJoin(teams, eq(teams.id, auditHeads.teamId))
      .where(eq(teams.slug, 'whole'));
    expect(JSON.parse(whole.stdout)).toEqual({
      whole: true,
      teams: [{ team: 'whole', events: 6, lastMac: row.mac }],
    });
    const broken = await verify(['--json', '--team', 'removed']);
    expect(broken.status).toBe(1);
    expect(JSON.parse(broken.stdout)).toEqual({
      whole: false,
      teams: [{ team: 'removed', brokenAt: 2, kind: 'removed', says: 'events 2 to 3 are missing' }],
    });
  });

  it('nothing whole without the right key', async () => {
    const other = await verify(['--team', 'whole'], { AUDIT_KEY: 'another secret of enough letters' });
    expect([other.status, other.stdout]).toEqual([
      1,
      'whole: broken at event 1, foreign: event 1 was changed, or was not written by Stepwell\n',
    ]);
  });
});

it('ends with 2 and one line where it cannot tell', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'stepwell-verify-'));
  try {
    const away = 'mysql://nobody@127.0.0.1:1/stepwell';
    const cases = [
      { said: verify(['--team', 'nobody']), line: /^--team: nobody; allowed: .+/ },
      { said: verify(['--team', 'No Slug']), line: /^usage: .+No Slug.+; allowed: .+/ },
      { said: verify(['--all']), line: /^usage: unknown option '--all'; allowed: .+/ },
      { said: verify([], { DATABASE_URL: away }), line: /^DATABASE_URL: .*ECONNREFUSED.*; allowed: .+/ },
      { said: verify([], { AUTH_SECRET: '' }), line: /^AUDIT_KEY: missing.+; allowed: .+/ },
      {
        said: verify([], { DATABASE_URL: '', STEPWELL_DATA: folder }),
        line: /^DATABASE_URL: missing.+; allowed: .+/,
      },
    ];
    for (const { said, line } of cases) expectOneLine(await said, line);
  } finally {
    rmSync(folder, { recursive: true });
  }
});

it('leaves a whole chain after 200 changes at once over two servers, and sees none broken meanwhile', async () => {
  const team = await makeTeam(test, [{ person: admin, role: 'admin' }]);
  await append(team.id, {});
  const target = { test, team, admin };
  const slugs: string[] = [];
  for (let index = 0; index < 200; index++) slugs.push(await freshTable(target));
  const second = makeTestApp({ config: test.deps.config, database: openDatabase(test.url), jobs: test.jobs });
  let isOver = false;
  const looks = (async () => {
    for (let look = 0; !isOver; look++) {
      expect(await verifyChain(test.database.db, key, team.id), `look ${look}`).toHaveProperty('events');
    }
  })();
  const statuses = await Promise.all(
    slugs.map(async (slug, index) => {
      const sent = asPerson(index % 2 === 0 ? test : { ...second, close: test.close }, admin)
        .patch(`/teams/${team.slug}/tables/${slug}`, { title: `Changed ${index}` })
        .set('If-Match', '"1"');
      return (await sent).status;
    }),
  );
  isOver = true;
  await looks;
  await second.database.close();
  expect(statuses).toEqual(slugs.map(() => 200));
  const { status, stdout } = await verify(['--team', team.slug]);
  expect([status, stdout]).toEqual([0, `${team.slug}: whole, 201 events\n`]);
});
