import { eq, isNotNull } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { deriveAuditKey } from '../../server/audit/mac.ts';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { openDatabase, type OpenDatabase } from '../../server/db/client.ts';
import {
  auditEvents,
  comments,
  mailboxMessages,
  mailOutbox,
  reviews,
  revisions,
} from '../../server/db/schema/index.ts';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { insertTable } from '../../server/features/tables/store.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { ensureBuilt } from '../../server/setup/build.mjs';
import { withLock } from '../../server/setup/lock.mjs';
import type { Review } from '../../shared/contract/index.ts';
import {
  holdTestServer,
  makeTestDatabase,
  type TestDatabase,
  type TestServer,
} from '../support/databases.ts';
import { killableApp, type KillableApp } from '../support/killable-app.ts';
import { sineDefinition } from '../support/library.ts';
import { join, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

const tables = 32;
const workers = 4;

let server: TestServer;
let testDatabase: TestDatabase;
let database: OpenDatabase;
let first: KillableApp;
let second: KillableApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let other: TestPerson;

beforeAll(async () => {
  await withLock(`set-up ${projectFolder}`, () =>
    Promise.all([ensureBuilt('client'), ensureBuilt('server')]),
  );
  server = await holdTestServer();
  testDatabase = await makeTestDatabase(server);
  database = openDatabase(testDatabase.url);
  first = killableApp(testDatabase.url);
  second = killableApp(testDatabase.url);
  await Promise.all([first.start(), second.start()]);
  crew = await makeCrew({ database });
  other = await makePerson({ database }, 'Otto Second');
  await join({ database }, crew.team.id, other, 'reviewer');
});
afterAll(async () => {
  await Promise.all([first.kill(), second.kill()]);
  await database.close();
  await testDatabase.drop();
  await server.release();
});

it(
  'two processes on one database, killed in the middle: each verdict once, nothing acknowledged lost, each mail once',
  { timeout: 180_000 },
  async () => {
    const { db } = database;
    const built = buildRevision(sineDefinition('Killed'));
    const place = { teamId: crew.team.id, userId: crew.author.id };
    const slugs: string[] = [];
    for (let index = 0; index < tables; index++) {
      const named = { title: `Killed ${index}`, tags: [] };
      slugs.push(await insertTable(db, place, named, { built, playback: null, note: '' }));
    }

    let acknowledged = 0;
    const verdicts = new Map<string, Review['verdict']>();
    const send = async (app: KillableApp, person: TestPerson, slug: string, below: string, body: object) => {
      const answer = await app.insist(
        person,
        `/teams/${crew.team.slug}/tables/${slug}/revisions/1/${below}`,
        body,
        { 'Idempotency-Key': `${slug}-${below}-${person.id}`, 'If-Match': '"2"' },
      );
      acknowledged += 1;
      return answer;
    };

    async function reviewOne(slug: string, index: number): Promise<void> {
      const [one, two] = index % 2 === 0 ? [first, second] : [second, first];
      expect((await send(one, crew.author, slug, 'submit', { message: slug })).status).toBe(200);
      expect((await send(two, crew.reviewer, slug, 'comments', { text: slug })).status).toBe(201);
      const answers = await Promise.all([
        send(one, crew.reviewer, slug, 'verdict', { verdict: 'vetted', note: 'one' }),
        send(two, other, slug, 'verdict', { verdict: 'returned', note: 'two' }),
      ]);
      expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
      const won = answers.find(({ status }) => status === 200)?.body as Review;
      const lost = answers.find(({ status }) => status === 412)?.body as { current: Review };
      expect(lost.current.verdict).toEqual(won.verdict);
      verdicts.set(slug, won.verdict);
    }

    async function work(worker: number): Promise<void> {
      for (const [index, slug] of slugs.entries()) {
        if (index % workers === worker) await reviewOne(slug, index);
      }
    }

    /** In the middle: while others are being sent. */
    const reach = (count: number) => waitUntil(`${count} answers`, () => acknowledged >= count, 60);
    async function disturb(): Promise<void> {
      await reach(20);
      await second.kill();
      await second.start();
      await reach(60);
      await first.kill();
      await first.start();
      await reach(90);
      await Promise.all([first.kill(), second.kill()]);
      await Promise.all([first.start(), second.start()]);
    }
    await Promise.all([...Array.from({ length: workers }, (_, worker) => work(worker)), disturb()]);

    const kept = await db
      .select({
        verdict: reviews.verdict,
        note: reviews.note,
        message: reviews.message,
        state: revisions.state,
      })
      .from(reviews)
      .innerJoin(revisions, eq(revisions.id, reviews.revisionId));
    expect(kept).toHaveLength(tables);
    for (const { verdict, note, message: slug, state } of kept) {
      expect({ verdict, note }, slug).toEqual({
        verdict: verdicts.get(slug)?.verdict,
        note: verdicts.get(slug)?.note,
      });
      expect(state).toBe(verdict);
    }
    expect((await db.select().from(comments)).map(({ text }) => text).sort()).toEqual([...slugs].sort());

    const events = await db.select().from(auditEvents).where(eq(auditEvents.teamId, crew.team.id));
    for (const [action, count] of [
      [/^revision\.submitted$/, tables],
      [/^revision\.(vetted|returned)$/, tables],
      [/^comment\.added$/, tables],
      [/./, 3 * tables],
    ] as const) {
      expect(
        events.filter((event) => action.test(event.action)),
        String(action),
      ).toHaveLength(count);
    }
    expect(await verifyChain(db, deriveAuditKey(testSecret), crew.team.id)).toMatchObject({
      events: 3 * tables,
    });

    // To three reviewers that a review is asked for; to the author about the comment and the verdict.
    const queued = await db.select().from(mailOutbox);
    expect(queued).toHaveLength(5 * tables);
    // A worker that was killed holds on to a mail for a while: that while is over.
    await db.update(mailOutbox).set({ claimedUntil: null }).where(isNotNull(mailOutbox.claimedUntil));
    await waitUntil(
      'all mail sent',
      async () => (await db.$count(mailOutbox, eq(mailOutbox.state, 'sent'))) === 5 * tables,
      60,
    );
    const arrived = await db.select().from(mailboxMessages);
    expect(arrived.map(({ messageId }) => messageId).sort()).toEqual(
      queued.map(({ messageId }) => messageId).sort(),
    );
    const toAuthor = arrived.filter(({ recipient }) => recipient === crew.author.email);
    expect(toAuthor).toHaveLength(2 * tables);
    expect(await db.$count(mailOutbox, isNotNull(mailOutbox.textBody))).toBe(0);
  },
);
