import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { comments, users } from '../../server/db/schema/index.ts';
import { commentSchema, commentsOfARevision, commentsPageSchema } from '../../shared/contract/index.ts';
import { asPerson, join, makeCrew, makePerson } from '../support/people.ts';
import { done, draftOf } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';
import { eq } from 'drizzle-orm';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
});
afterAll(() => test.close());

describe('comments on a revision', () => {
  it('are read oldest first by everybody, and written by authors in every state', async () => {
    const review = await draftOf(test, crew.team, crew.author);
    expect(await review.comments(crew.viewer)).toEqual({ items: [], nextCursor: null });
    const first = await review.comment(crew.author, { text: '  Why 8 bits?  ', path: 'table.bits' });
    expect(commentSchema.parse(done(first, 201))).toMatchObject({
      by: { id: crew.author.id, name: 'Aldo Brine' },
      text: 'Why 8 bits?',
      path: 'table.bits',
    });
    await review.submit(crew.author);
    done(
      await review.comment(crew.reviewer, { text: 'In review.', path: 'source.partials[0].phaseDeg' }),
      201,
    );
    await review.vet(crew.reviewer, 2);
    done(await review.comment(crew.author, { text: 'Vetted.' }), 201);
    await review.withdraw(crew.reviewer, 3);
    done(await review.comment(crew.admin, { text: 'Withdrawn.', path: null }), 201);
    const page = commentsPageSchema.parse(await review.comments(crew.viewer));
    expect(page.items.map(({ text, path }) => [text, path])).toEqual([
      ['Why 8 bits?', 'table.bits'],
      ['In review.', 'source.partials[0].phaseDeg'],
      ['Vetted.', null],
      ['Withdrawn.', null],
    ]);
    expect(page.items[0]).toEqual(first.body);
    // Talking changes nothing: a verdict that was being written can still be given.
    expect((await review.read(crew.viewer)).version).toBe(4);
    expect((await review.comment(crew.viewer, { text: 'May I?' })).status).toBe(403);
  });

  it('are refused by field where they say nothing, too much, or name no setting', async () => {
    const review = await draftOf(test, crew.team, crew.author);
    const fault = async (body: object) => (await review.comment(crew.author, body)).body.errors?.[0].path;
    expect(await fault({ text: ' ' })).toBe('text');
    expect(await fault({ text: 'x'.repeat(2001) })).toBe('text');
    expect(await fault({ text: 'Half \ud83d' })).toBe('text');
    for (const path of ['', 'table.', '.bits', 'table bits', 'a[x]', '<b>', 'x'.repeat(201)]) {
      expect(await fault({ text: 'x', path }), path).toBe('path');
    }
    expect(await fault({ text: 'x', at: '2026-01-01T00:00:00Z' })).toBe('at');
    expect((await review.comments(crew.viewer)).items).toEqual([]);
  });

  it('come page by page, each once, also while more are written', async () => {
    const review = await draftOf(test, crew.team, crew.author);
    for (let index = 0; index < 7; index++) await review.comment(crew.author, { text: `${index}` });
    const seen: string[] = [];
    let cursor: string | null = null;
    do {
      const page = await review.comments(crew.viewer, `?limit=3${cursor ? `&cursor=${cursor}` : ''}`);
      seen.push(...page.items.map(({ text }) => text));
      cursor = page.nextCursor;
      if (seen.length === 3) await review.comment(crew.author, { text: '7' });
    } while (cursor);
    expect(seen).toEqual(['0', '1', '2', '3', '4', '5', '6', '7']);
    const other = await draftOf(test, crew.team, crew.author);
    const { nextCursor } = await review.comments(crew.viewer, '?limit=3');
    const foreign = await asPerson(test, crew.viewer).get(`${other.revision}/comments?cursor=${nextCursor}`);
    expect(foreign.status).toBe(422);
  });

  it('are written once under one key, and no more than a revision may have', async () => {
    const review = await draftOf(test, crew.team, crew.author);
    const say = () =>
      review.comment(crew.author, { text: 'Once.' }).set('Idempotency-Key', `say-${review.slug}`);
    const answers = await Promise.all([say(), say(), say()]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    const { items } = await review.comments(crew.viewer);
    expect(items).toHaveLength(1);

    const { db } = test.database;
    const [row] = await db.select().from(comments).where(eq(comments.id, items[0].id));
    const { id: _, ...one } = row;
    await db.insert(comments).values(Array.from({ length: commentsOfARevision - 2 }, () => one));
    const last = await Promise.all([1, 2, 3].map(() => review.comment(crew.author, { text: 'Last.' })));
    expect(last.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
  });

  it('outlive the account of who wrote them, and reviews that of who judged', async () => {
    const leaver = await makePerson(test, 'Lea Ving');
    await join(test, crew.team.id, leaver, 'admin');
    const review = await draftOf(test, crew.team, crew.author);
    await review.comment(leaver, { text: 'Farewell.' });
    await review.submit(crew.author);
    await review.giveBack(leaver, 2, 'Farewell.');
    await test.database.db.delete(users).where(eq(users.id, leaver.id));
    const gone = { id: null, name: 'Somebody who has left' };
    expect((await review.comments(crew.viewer)).items).toMatchObject([{ by: gone, text: 'Farewell.' }]);
    expect(await review.read(crew.viewer)).toMatchObject({
      state: 'returned',
      verdict: { by: gone, note: 'Farewell.' },
    });
  });
});
