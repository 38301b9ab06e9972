import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { auditEvents, reviews, teamLimits } from '../../server/db/schema/index.ts';
import { limitSetsListSchema, limitSetsOfATeam, type VettingLimits } from '../../shared/contract/index.ts';
import { sineDefinition } from '../support/library.ts';
import { asPerson, makeCrew } from '../support/people.ts';
import { done, draftOf, setLimits } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let path: string;
beforeAll(() => {
  test = makeTestApp();
});
beforeEach(async () => {
  crew = await makeCrew(test);
  path = `/teams/${crew.team.slug}/limit-sets`;
});
afterAll(() => test.close());

const admin = () => asPerson(test, crew.admin);
const set = (limits: VettingLimits, tag: string | null = null) =>
  setLimits(test, crew.team, crew.admin, limits, tag);
const change = (id: number, version: number, limits: object) =>
  admin().put(`${path}/${id}`, { limits }).set('If-Match', `"${version}"`);
const remove = (id: number, version: number) =>
  admin().delete(`${path}/${id}`).set('If-Match', `"${version}"`);
const list = async () =>
  limitSetsListSchema.parse((await asPerson(test, crew.viewer).get(path)).body).limitSets;

describe('limits of a team', () => {
  it('are made, listed with the general ones first, changed as a whole and deleted', async () => {
    const tagged = await admin().post(path, { tag: ' Alarm ', limits: { bits: [8, 6, 8] } });
    expect(done(tagged, 201)).toMatchObject({ tag: 'alarm', limits: { bits: [6, 8] }, version: 1 });
    expect(tagged.headers).toMatchObject({
      location: `/api/v1${path}/${tagged.body.id}`,
      etag: '"1"',
    });
    const general = await set({ minSnrDb: 40, maxTableBytes: 512 });
    expect(await list()).toEqual([general, tagged.body]);

    const changed = await change(general.id, 1, { maxClipped: 0 });
    expect([done(changed), changed.headers.etag]).toEqual([
      { ...general, limits: { maxClipped: 0 }, version: 2 },
      '"2"',
    ]);
    expect((await change(general.id, 2, { maxClipped: 0 })).headers.etag).toBe('"2"');
    expect((await remove(tagged.body.id, 1)).status).toBe(204);
    expect(await list()).toEqual([changed.body]);
    expect((await remove(tagged.body.id, 1)).status).toBe(404);

    const events = await test.database.db
      .select()
      .from(auditEvents)
      .where(eq(auditEvents.teamId, crew.team.id));
    expect(events.map(({ action, subject, details }) => [action, subject, details])).toEqual([
      ['limits.created', 'limits:alarm', { limits: { bits: [6, 8] } }],
      ['limits.created', 'limits:general', { limits: { minSnrDb: 40, maxTableBytes: 512 } }],
      [
        'limits.changed',
        'limits:general',
        { before: { minSnrDb: 40, maxTableBytes: 512 }, after: { maxClipped: 0 } },
      ],
      ['limits.deleted', 'limits:alarm', { limits: { bits: [6, 8] } }],
    ]);
  });

  it('are one set for each tag, also where many are made at once, and no more than a team may have', async () => {
    const make = (tag: string | null) => admin().post(path, { tag, limits: { maxClipped: 0 } });
    for (const tag of [null, 'alarm']) {
      const answers = await Promise.all([make(tag), make(tag), make(tag)]);
      expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
    }
    const rows = Array.from({ length: limitSetsOfATeam - 3 }, (_, index) => ({
      teamId: crew.team.id,
      tag: `tag ${index}`,
      limits: { maxClipped: 0 },
    }));
    await test.database.db.insert(teamLimits).values(rows);
    const last = await Promise.all([make('one more'), make('one too many')]);
    expect(last.map(({ status }) => status).sort()).toEqual([201, 409]);
  });

  it('change only from the state that was seen', async () => {
    const { id } = await set({ maxClipped: 0 });
    const put = () => admin().put(`${path}/${id}`, { limits: { maxClipped: 1 } });
    expect([(await put()).status, (await admin().delete(`${path}/${id}`)).status]).toEqual([428, 428]);
    const answers = await Promise.all([1, 2, 3, 4].map((maxClipped) => change(id, 1, { maxClipped })));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412, 412, 412]);
    const [now] = await list();
    for (const { status, body } of answers) if (status === 412) expect(body.current).toEqual(now);
    expect((await remove(id, 1)).body.current).toEqual(now);
  });

  it('are refused by field, value and what is allowed', async () => {
    const refusal = async (body: object) => {
      const answer = await admin().post(path, body);
      expect(answer.status, answer.text).toBe(422);
      return answer.body.errors;
    };
    expect(await refusal({ tag: null, limits: {} })).toEqual([
      { path: 'limits', value: expect.any(String), allowed: 'at least one limit' },
    ]);
    expect(await refusal({ tag: null, limits: { minSnrDb: -1 } })).toEqual([
      { path: 'limits.minSnrDb', value: '-1', allowed: 'a number from 0 to 200 dB' },
    ]);
    expect(await refusal({ tag: null, limits: { bits: [17] } })).toMatchObject([{ path: 'limits.bits[0]' }]);
    expect(await refusal({ tag: null, limits: { loudness: 3, maxClipped: 0 } })).toEqual([
      { path: 'limits.loudness', value: '3', allowed: 'no such field' },
    ]);
    expect(await refusal({ limits: { maxClipped: 0 } })).toMatchObject([{ path: 'tag' }]);
    expect(await refusal({ tag: '', limits: { maxClipped: 0 } })).toMatchObject([{ path: 'tag' }]);
  });
});

describe('a review', () => {
  it('shows how the revision stands against the general limits and those of its tags', async () => {
    await set({ minSnrDb: 45, maxTableBytes: 63, maxMean: 0.001 });
    await set({ bits: [6, 8], lengths: [128, 256] }, 'alarm');
    await set({ maxClipped: 0 }, 'other');
    const plain = await draftOf(test, crew.team, crew.author, 'Plain');
    const { report } = (await asPerson(test, crew.viewer).get(plain.revision)).body;
    const general = [
      { limit: 'minSnrDb', tag: null, allowed: 45, measured: report.snrDb, passed: true },
      { limit: 'maxTableBytes', tag: null, allowed: 63, measured: 64, passed: false },
      { limit: 'maxMean', tag: null, allowed: 0.001, measured: Math.abs(report.mean), passed: true },
    ];
    expect((await plain.read(crew.viewer)).limits).toEqual(general);
    const tagged = await draftOf(test, crew.team, crew.author, 'Tagged', { tags: ['alarm', 'unknown'] });
    expect((await tagged.read(crew.viewer)).limits).toEqual([
      ...general,
      { limit: 'lengths', tag: 'alarm', allowed: [128, 256], measured: 64, passed: false },
      { limit: 'bits', tag: 'alarm', allowed: [6, 8], measured: 8, passed: true },
    ]);
    done(await tagged.submit(crew.author));
    const { body } = await asPerson(test, crew.viewer).get(`/teams/${crew.team.slug}/reviews?show=waiting`);
    expect(body.items).toMatchObject([{ failedLimits: 2 }]);
  });

  it('vets against a failed limit only with a reason, and the refusal tells which fail', async () => {
    const { id } = await set({ minSnrDb: 60.5, maxTableBytes: 64 });
    await set({ bits: [6, 7] }, 'alarm');
    const review = await draftOf(test, crew.team, crew.author, 'Fails', { tags: ['alarm'] });
    await review.submit(crew.author);
    const silent = await review.vet(crew.reviewer, 2);
    expect([silent.status, silent.body.errors]).toEqual([
      422,
      [
        {
          path: 'note',
          value: '""',
          allowed:
            '1 to 2000 characters: why it is vetted although minSnrDb is 48.0355, allowed at least 60.5; ' +
            'bits is 8, allowed one of 6, 7 (tag alarm)',
        },
      ],
    ]);
    expect((await review.read(crew.reviewer)).state).toBe('in-review');
    // To return it takes the usual reasons and no others.
    const vetted = done(await review.vet(crew.reviewer, 2, 'The filter behind it takes care.'));
    expect(vetted.limits.map(({ passed }: { passed: boolean }) => passed)).toEqual([false, true, false]);

    // Kept as they were, whatever the limits are afterwards.
    done(await change(id, 1, { minSnrDb: 10 }));
    expect((await review.read(crew.viewer)).limits).toEqual(vetted.limits);
    done(await review.withdraw(crew.reviewer, 3));
    expect((await review.read(crew.viewer)).limits).toEqual(vetted.limits);
    const { body } = await asPerson(test, crew.viewer).get(`/teams/${crew.team.slug}/reviews?show=decided`);
    expect(body.items).toMatchObject([{ failedLimits: 2, state: 'withdrawn' }]);
  });

  it('goes by the limits of the moment of the verdict, not of the submission', async () => {
    const review = await draftOf(test, crew.team, crew.author, 'Moved');
    await review.submit(crew.author);
    const { id } = await set({ maxTableBytes: 1 });
    expect((await review.vet(crew.reviewer, 2)).status).toBe(422);
    await change(id, 1, { maxTableBytes: 64 });
    expect(done(await review.vet(crew.reviewer, 2)).limits).toMatchObject([{ passed: true }]);
  });

  it('that returns keeps the limits too; one of a table without any error passes limits on noise', async () => {
    await set({ minSnrDb: 100, maxUnwantedDb: -100 });
    const square = {
      ...sineDefinition('Exact', { length: 2 }),
      source: { kind: 'samples', values: [-1, 1], resampling: 'hold' },
    };
    const review = await draftOf(test, crew.team, crew.author, 'Exact', { definition: square });
    await review.submit(crew.author);
    expect((await review.read(crew.viewer)).limits).toMatchObject([
      { limit: 'minSnrDb', measured: null, passed: true },
      { limit: 'maxUnwantedDb', measured: null, passed: true },
    ]);
    const returned = done(await review.giveBack(crew.reviewer, 2));
    expect(returned.limits).toHaveLength(2);
    const [row] = await test.database.db.select().from(reviews).where(eq(reviews.teamId, crew.team.id));
    expect(row.limits).toEqual(returned.limits);
  });

  it('meets a change of limits before or after, never in between: what is kept is what was judged', async () => {
    const { id } = await set({ maxTableBytes: 64 });
    const reviewsOfAll = await Promise.all(
      Array.from({ length: 6 }, (_, index) => draftOf(test, crew.team, crew.author, `Met ${index}`)),
    );
    for (const review of reviewsOfAll) done(await review.submit(crew.author));
    const [changed, ...verdicts] = await Promise.all([
      change(id, 1, { maxTableBytes: 8 }),
      ...reviewsOfAll.map((review) => review.vet(crew.reviewer, 2)),
    ]);
    done(changed);
    for (const verdict of verdicts) {
      // Judged by the old limit it passes without a word; by the new one it needs one.
      if (verdict.status === 200) expect(verdict.body.limits).toMatchObject([{ allowed: 64, passed: true }]);
      else expect(verdict.body.errors).toMatchObject([{ path: 'note' }]);
    }
  });
});
