import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest';
import { appendEvent } from '../../server/audit/append-event.ts';
import { deriveAuditKey } from '../../server/audit/mac.ts';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { openDatabase } from '../../server/db/client.ts';
import { auditEvents, auditHeads, users } from '../../server/db/schema/index.ts';
import { withTransaction } from '../../server/db/transaction.ts';
import {
  asPerson,
  makeCrew,
  makePerson,
  makeTeam,
  type TestPerson,
  type TestTeam,
} from '../support/people.ts';
import { makeTestApp, testSecret, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let team: TestTeam;
let admin: TestPerson;
const key = deriveAuditKey(testSecret);

beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());
beforeEach(async () => {
  admin = await makePerson(test, 'Ada Keel');
  team = await makeTeam(test, [{ person: admin, role: 'admin' }]);
});

const append = (db = test.database.db, details: object = {}) =>
  withTransaction(db, (transaction) =>
    appendEvent(transaction, key, {
      teamId: team.id,
      actor: admin,
      action: 'table.created',
      subject: 'table:fog-signal',
      details: { ...details },
    }),
  );
const verify = () => verifyChain(test.database.db, key, team.id);

describe('the chain of audit events', () => {
  it('holds with 50 writers at once, over three pools of connections', async () => {
    const pools = [openDatabase(inject('databaseUrl')), openDatabase(inject('databaseUrl')), test.database];
    await Promise.all(Array.from({ length: 50 }, (_none, index) => append(pools[index % 3].db, { index })));
    await Promise.all([pools[0].close(), pools[1].close()]);
    expect(await verify()).toMatchObject({ events: 50 });
    const rows = await test.database.db.select().from(auditEvents).where(eq(auditEvents.teamId, team.id));
    expect(rows.map(({ sequence }) => sequence).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 50 }, (_none, index) => index + 1),
    );
    expect(new Set(rows.map(({ details }) => (details as { index: number }).index)).size).toBe(50);
  });

  it('keeps no event of a transaction that failed', async () => {
    await append();
    await expect(
      test.database.db.transaction(async (transaction) => {
        await appendEvent(transaction, key, {
          teamId: team.id,
          actor: admin,
          action: 'table.created',
          subject: 'y',
        });
        throw new Error('after all not');
      }),
    ).rejects.toThrow('after all not');
    await append();
    expect(await verify()).toMatchObject({ events: 2 });
  });

  it('holds for any text and number in its details', async () => {
    await append(test.database.db, {
      text: 'é \u{1f6a2} */ \u2028 \\ " <b>',
      number: 0.1 + 0.2,
      deep: [{ b: 1, a: [null] }],
    });
    expect(await verify()).toMatchObject({ events: 1 });
  });

  it.each([
    ['a changed detail', { details: { index: 99 } }],
    ['another actor', { actorId: 1 }],
    ['another name', { actorName: 'Somebody' }],
    ['another action', { action: 'table.archived' }],
    ['another subject', { subject: 'table:chirp' }],
    ['another time', { at: new Date('2001-02-03T04:05:06Z') }],
    ['another MAC', { mac: '0'.repeat(64) }],
  ])('shows %s', async (_what, change) => {
    for (let index = 0; index < 5; index++) await append(test.database.db, { index });
    await test.database.db
      .update(auditEvents)
      .set(change)
      .where(and(eq(auditEvents.teamId, team.id), eq(auditEvents.sequence, 3)));
    expect(await verify()).toMatchObject({ brokenAt: 3, kind: 'changed' });
  });

  it('shows a missing event, in the middle and at the end', async () => {
    for (let index = 0; index < 5; index++) await append(test.database.db, { index });
    const remove = (sequence: number) =>
      test.database.db
        .delete(auditEvents)
        .where(and(eq(auditEvents.teamId, team.id), eq(auditEvents.sequence, sequence)));
    await remove(5);
    expect(await verify()).toMatchObject({ brokenAt: 5, kind: 'cut-off' });
    await remove(2);
    expect(await verify()).toMatchObject({ brokenAt: 2, kind: 'removed' });
  });

  it('shows an event written without the key', async () => {
    await append();
    await withTransaction(test.database.db, (transaction) =>
      appendEvent(transaction, deriveAuditKey('another secret of enough letters'), {
        teamId: team.id,
        actor: admin,
        action: 'revision.vetted',
        subject: 'table:fog-signal',
      }),
    );
    expect(await verify()).toMatchObject({ brokenAt: 2, kind: 'foreign' });
  });

  it('shows rows moved to another team', async () => {
    await append();
    const other = await makeTeam(test, [{ person: admin, role: 'admin' }]);
    await test.database.db
      .update(auditEvents)
      .set({ teamId: other.id })
      .where(eq(auditEvents.teamId, team.id));
    const [head] = await test.database.db.select().from(auditHeads).where(eq(auditHeads.teamId, team.id));
    await test.database.db
      .update(auditHeads)
      .set({ lastSequence: head.lastSequence, lastMac: head.lastMac })
      .where(eq(auditHeads.teamId, other.id));
    expect(await verifyChain(test.database.db, key, other.id)).toMatchObject({
      brokenAt: 1,
      kind: 'foreign',
    });
  });

  it('outlives the account of who acted', async () => {
    await append();
    await test.database.db.delete(users).where(eq(users.id, admin.id));
    expect(await verify()).toMatchObject({ events: 1 });
  });
});

describe('what is done to a team', () => {
  it('is all in its chain, with who did it', async () => {
    const { team: crewTeam, viewer, author, admin: boss } = await makeCrew(test);
    const as = (person: TestPerson) => asPerson(test, person);
    const path = `/teams/${crewTeam.slug}`;
    await as(boss).patch(path, { name: 'Tenth Fathom' }).set('If-Match', '"1"');
    await as(boss).patch(`${path}/members/${viewer.id}`, { role: 'author' });
    await as(boss).delete(`${path}/members/${viewer.id}`);
    await as(author).delete(`${path}/members/${author.id}`);
    const invited = await as(boss).post(`${path}/invitations`, { email: viewer.email, role: 'viewer' });
    await as(boss).delete(`${path}/invitations/${(invited.body as { id: number }).id}`);
    const rows = await test.database.db.select().from(auditEvents).where(eq(auditEvents.teamId, crewTeam.id));
    expect(rows.at(-1)?.details).toEqual({ email: viewer.email, role: 'viewer' });
    expect(rows.map(({ action, actorName }) => [action, actorName])).toEqual([
      ['team.changed', 'Ada Keel'],
      ['member.role-changed', 'Ada Keel'],
      ['member.removed', 'Ada Keel'],
      ['member.left', 'Aldo Brine'],
      ['member.invited', 'Ada Keel'],
      ['invitation.withdrawn', 'Ada Keel'],
    ]);
    expect(await verifyChain(test.database.db, key, crewTeam.id)).toMatchObject({ events: 6 });
  });
});
