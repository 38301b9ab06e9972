import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, inject, it } from 'vitest';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { openDatabase } from '../../server/db/client.ts';
import { auditEvents, reviews, revisions } from '../../server/db/schema/index.ts';
import { sineDefinition } from '../support/library.ts';
import { asPerson, join, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { draftOf, reviewOf, setLimits } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

/** Two applications with a pool of connections each, on one database. */
let apps: [TestApp, TestApp];
let crew: Awaited<ReturnType<typeof makeCrew>>;
let second: TestPerson;
beforeAll(async () => {
  apps = [makeTestApp(), makeTestApp({ database: openDatabase(inject('databaseUrl')) })];
  crew = await makeCrew(apps[0]);
  second = await makePerson(apps[0], 'Otto Second');
  await join(apps[0], crew.team.id, second, 'reviewer');
});
afterAll(() => Promise.all(apps.map((app) => app.close())));

it('a whole team at once, over two applications: everybody is answered, and what was answered holds', async () => {
  const [one, two] = apps;
  const { id } = await setLimits(one, crew.team, crew.admin, { maxTableBytes: 64 });
  const slugs: string[] = [];
  for (let index = 0; index < 6; index++)
    slugs.push((await draftOf(one, crew.team, crew.author, `Crowd ${index}`)).slug);
  const statuses: string[] = [];
  const note = ({ status, text }: { status: number; text: string }) =>
    statuses.push(status < 500 ? String(status) : `${status} ${text}`);

  const team = `/teams/${crew.team.slug}`;
  const readTag = async (path: string) => (await asPerson(one, crew.admin).get(path)).headers.etag;
  async function rule(): Promise<void> {
    for (let turn = 0; turn < 12; turn++) {
      const admin = asPerson(turn % 2 === 0 ? one : two, crew.admin);
      const limits = { limits: { maxTableBytes: 60 + turn } };
      note(await admin.put(`${team}/limit-sets/${id}`, limits).set('If-Match', `"${turn + 1}"`));
      note(await admin.patch(team, { twoPersonRule: turn % 2 === 1 }).set('If-Match', await readTag(team)));
    }
  }
  async function save(slug: string): Promise<void> {
    for (let turn = 0; turn < 4; turn++) {
      const path = `${team}/tables/${slug}`;
      const body = { definition: sineDefinition('Crowd', { seed: turn, dither: 'triangular' }) };
      note(
        await asPerson(two, crew.author)
          .post(`${path}/revisions`, body)
          .set('If-Match', await readTag(path)),
      );
    }
  }
  async function review(slug: string): Promise<void> {
    const [here, there] = apps.map((app) => reviewOf(app, crew.team, slug));
    const talk = [here.comment(crew.author, { text: 'One.' }), there.comment(second, { text: 'Two.' })];
    note(await here.submit(crew.author));
    const verdicts = [here.vet(crew.reviewer, 2, 'Good.'), there.giveBack(second, 2, 'Bad.')];
    for (const answer of await Promise.all([...talk, ...verdicts])) note(answer);
    note(await there.withdraw(crew.reviewer, 3));
  }
  await Promise.all([rule(), ...slugs.map(save), ...slugs.map(review)]);

  expect(statuses.filter((status) => !/^(20[01]|409|412)$/.test(status))).toEqual([]);
  const { db } = one.database;
  const rows = await db
    .select({ verdict: reviews.verdict, withdrawnAt: reviews.withdrawnAt, state: revisions.state })
    .from(reviews)
    .innerJoin(revisions, eq(revisions.id, reviews.revisionId))
    .where(eq(reviews.teamId, crew.team.id));
  expect(rows).toHaveLength(slugs.length);
  for (const { verdict, withdrawnAt, state } of rows) {
    expect(state).toBe(withdrawnAt ? 'withdrawn' : verdict);
    expect(withdrawnAt !== null).toBe(verdict === 'vetted');
  }
  const events = await db.select().from(auditEvents).where(eq(auditEvents.teamId, crew.team.id));
  const count = (action: string) => events.filter((event) => event.action === action).length;
  expect(count('revision.vetted') + count('revision.returned')).toBe(slugs.length);
  expect(count('comment.added')).toBe(2 * slugs.length);
  expect(await verifyChain(db, one.deps.config.auditKey, crew.team.id)).toMatchObject({
    events: events.length,
  });
});
