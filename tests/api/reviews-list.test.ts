import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { openDatabase } from '../../server/db/client.ts';
import { reviews, revisions } from '../../server/db/schema/index.ts';
import { findReviews } from '../../server/features/reviews/list-reviews.ts';
import { readSummaries } from '../../server/features/reviews/queries.ts';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { insertTable } from '../../server/features/tables/store.ts';
import {
  reviewShows,
  reviewsPageSchema,
  type Review,
  type ReviewsQuery,
  type ReviewSummary,
} from '../../shared/contract/index.ts';
import { sineDefinition } from '../support/library.ts';
import { asPerson, join, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { done, draftOf, reviewOf, setTwoPersonRule, type ReviewOf } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let second: TestPerson;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  second = await makePerson(test, 'Otto Second');
  await join(test, crew.team.id, second, 'reviewer');
});
afterAll(() => test.close());

const page = async (person: TestPerson, query: Record<string, string> = {}, team = crew.team) =>
  reviewsPageSchema.parse(
    done(await asPerson(test, person).get(`/teams/${team.slug}/reviews?${new URLSearchParams(query)}`)),
  );

/** All pages of a list, `limit` rows each. */
async function all(person: TestPerson, show: string, limit: number): Promise<ReviewSummary[]> {
  const items: ReviewSummary[] = [];
  let cursor: string | null = null;
  do {
    const found = await page(person, { show, limit: `${limit}`, ...(cursor ? { cursor } : {}) });
    items.push(...found.items);
    cursor = found.nextCursor;
  } while (cursor);
  return items;
}

describe('the Reviews list', () => {
  it('shows each what is for them, in its order, page by page, as the single reviews have it', async () => {
    const makers = [crew.author, crew.reviewer, second, crew.admin];
    const submitters = [crew.author, second, crew.reviewer];
    const made: ReviewOf[] = [];
    for (let index = 0; index < 14; index++) {
      const review = await draftOf(test, crew.team, makers[index % 4], `Listed ${index}`);
      made.push(review);
      // Every seventh stays a draft, and is in no list.
      if (index % 7 === 6) continue;
      done(await review.submit(submitters[index % 3], `message ${index}`));
    }
    const states: Review[] = await Promise.all(made.map((review) => review.read(second)));
    for (const [index, review] of made.entries()) {
      if (index % 3 !== 0 || states[index].state !== 'in-review') continue;
      const mine = new Set([states[index].madeBy.id, states[index].submission?.by.id]);
      const judge = [crew.admin, second, crew.reviewer].find(({ id }) => !mine.has(id)) ?? crew.admin;
      done(index % 2 === 0 ? await review.vet(judge, 2) : await review.giveBack(judge, 2));
    }

    for (const person of [crew.viewer, crew.author, crew.reviewer, second, crew.admin]) {
      const known = (await Promise.all(made.map((review) => review.read(person)))).filter(
        ({ submission }) => submission !== null,
      );
      const waiting = known.filter(({ state }) => state === 'in-review');
      const expected: Record<ReviewsQuery['show'], Review[]> = {
        'for-me': waiting.filter(({ hindrances }) => hindrances.judge === null),
        waiting,
        mine: known.filter(({ submission }) => submission?.by.id === person.id).reverse(),
        decided: known
          .filter(({ verdict }) => verdict !== null)
          .sort((a, b) => String(b.verdict?.at).localeCompare(String(a.verdict?.at))),
      };
      for (const show of reviewShows) {
        for (const limit of [3]) {
          const items = await all(person, show, limit);
          expect(
            items.map(({ tableSlug }) => tableSlug),
            `${person.name} ${show}`,
          ).toEqual(expected[show].map(({ tableSlug }) => tableSlug));
          for (const [index, item] of items.entries()) {
            const { submission, verdict, hindrances, ...review } = expected[show][index];
            expect(item).toEqual({
              tableSlug: review.tableSlug,
              tableTitle: review.tableTitle,
              number: 1,
              state: review.state,
              submittedBy: submission?.by,
              submittedAt: submission?.at,
              message: submission?.message,
              failedLimits: 0,
              decidedBy: verdict?.by ?? null,
              decidedAt: verdict?.at ?? null,
              mayJudge: hindrances.judge === null,
            });
          }
        }
      }
      expect((await page(person)).waitingForMe).toBe(expected['for-me'].length);
      expect((await page(person)).items).toHaveLength(expected['for-me'].length);
    }

    // With the rule off, one's own wait for one too; the cursor of one list is no good in another.
    await setTwoPersonRule(test, crew.team, crew.admin, false);
    const { items, waitingForMe } = await page(second);
    expect(items).toEqual((await page(second, { show: 'waiting' })).items);
    expect(waitingForMe).toBe(items.length);
    const { nextCursor } = await page(second, { show: 'waiting', limit: '1' });
    for (const [person, show] of [
      [second, 'decided'],
      [second, 'for-me'],
    ] as const) {
      const path = `/teams/${crew.team.slug}/reviews?show=${show}&cursor=${nextCursor}`;
      expect((await asPerson(test, person).get(path)).status).toBe(422);
    }
  });

  it('is refused where it is asked for wrongly', async () => {
    for (const query of ['show=all', 'limit=0', 'limit=101', 'cursor=x', 'sort=title']) {
      const answer = await asPerson(test, crew.viewer).get(`/teams/${crew.team.slug}/reviews?${query}`);
      expect([query, answer.status]).toEqual([query, 422]);
    }
  });
});

describe('the list of a team with many reviews', () => {
  const many = 3000;
  let big: Awaited<ReturnType<typeof makeCrew>>;

  beforeAll(async () => {
    big = await makeCrew(test);
    const { db } = test.database;
    const built = buildRevision(sineDefinition('Many'));
    const place = { teamId: big.team.id, userId: big.author.id };
    const slug = await insertTable(
      db,
      place,
      { title: 'Many', tags: [] },
      { built, playback: null, note: '' },
    );
    done(await reviewOf(test, big.team, slug).submit(big.author));
    // Whole rows, copied in the database; a third of them decided, many at the same moment.
    const copy = sql`select seq + 1, team_id, table_id, 'in-review', bits, length, snr_db, table_bytes, definition,
      report, warnings, codes, engine_version, digest, made_by from ${revisions}, seq_1_to_${sql.raw(`${many}`)}
      where team_id = ${big.team.id}`;
    await db.execute(sql`insert into ${revisions} (number, team_id, table_id, state, bits, length, snr_db, table_bytes,
      definition, report, warnings, codes, engine_version, digest, made_by) ${copy}`);
    await db.execute(sql`insert into ${reviews} (team_id, revision_id, made_by, submitted_by, submitted_at, message,
        failed_limits, verdict, decided_at, decided_by)
      select team_id, id, made_by, made_by, '2026-03-01 12:00:00.000' + interval (number div 7) second, 'm', 0,
        if(number % 3 = 0, 'vetted', null), if(number % 3 = 0, '2026-03-02 12:00:00.000', null), null
      from ${revisions} where team_id = ${big.team.id} and number > 1`);
  });

  it.each(reviewShows)('reads no more than its page: %s', async (show) => {
    const database = openDatabase(inject('databaseUrl'), { connectionLimit: 1 });
    const read = async (): Promise<number> => {
      const [rows] = await database.pool.query("show session status like 'Handler_read%'");
      return (rows as { Value: string }[]).reduce((sum, { Value }) => sum + Number(Value), 0);
    };
    const person = show === 'mine' ? big.author : big.reviewer;
    const asker = { userId: person.id, role: 'reviewer', twoPersonRule: true } as const;
    let cursor: string | undefined;
    // The first page and one further in, behind many rows of one moment.
    for (let step = 0; step < 3; step++) {
      const before = await read();
      const found = await findReviews(database.db, big.team.id, asker, { show, limit: 20, cursor });
      const rows = await readSummaries(database.db, big.team.id, found.ids);
      const walked = (await read()) - before;
      expect(rows).toHaveLength(20);
      // A row of the index, then the review with its revision, table and people.
      expect(walked).toBeLessThan(20 * 8);
      cursor = found.nextCursor ?? undefined;
    }
    await database.close();
  });

  it('is gone through to its end without a row twice or missing', async () => {
    const { db } = test.database;
    const asker = { userId: big.reviewer.id, role: 'reviewer', twoPersonRule: true } as const;
    for (const [show, count] of [
      ['waiting', many + 1 - 1000],
      ['decided', 1000],
    ] as const) {
      const seen: number[] = [];
      let cursor: string | undefined;
      do {
        const found = await findReviews(db, big.team.id, asker, { show, limit: 100, cursor });
        seen.push(...found.ids);
        cursor = found.nextCursor ?? undefined;
      } while (cursor);
      expect([seen.length, new Set(seen).size]).toEqual([count, count]);
    }
  });
});
