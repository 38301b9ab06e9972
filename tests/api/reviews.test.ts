import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { auditEvents } from '../../server/db/schema/index.ts';
import { reviewSchema, type RevisionState } from '../../shared/contract/index.ts';
import { sineDefinition } from '../support/library.ts';
import { asPerson, join, makeCrew, makePerson, type TestPerson } from '../support/people.ts';
import { done, draftOf, reviewOf, type ReviewOf } from '../support/reviews.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
/** One more of a role, so that somebody can always do what the others may not. */
let secondReviewer: TestPerson;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  secondReviewer = await makePerson(test, 'Otto Second');
  await join(test, crew.team.id, secondReviewer, 'reviewer');
});
afterAll(() => test.close());

const fresh = (maker: TestPerson = crew.author, title?: string, changes?: object) =>
  draftOf(test, crew.team, maker, title, changes);

/** Brings a draft into a state, by people who may. */
async function bring(review: ReviewOf, state: RevisionState, submitter = crew.author): Promise<void> {
  if (state === 'draft') return;
  done(await review.submit(submitter));
  if (state === 'in-review') return;
  if (state === 'returned') done(await review.giveBack(secondReviewer, 2));
  else done(await review.vet(secondReviewer, 2));
  if (state === 'withdrawn') done(await review.withdraw(secondReviewer, 3));
}

describe('the way of a revision', () => {
  it('leads from draft through review to vetted and withdrawn, each step told with who, when and why', async () => {
    const review = await fresh(crew.author, 'All the way', { tags: ['way'] });
    const draft = await review.read(crew.viewer);
    expect(reviewSchema.parse(draft)).toMatchObject({
      tableSlug: review.slug,
      tableTitle: 'All the way',
      tags: ['way'],
      number: 1,
      state: 'draft',
      madeBy: { id: crew.author.id, name: 'Aldo Brine' },
      submission: null,
      verdict: null,
      withdrawal: null,
      limits: [],
      lastVetted: null,
      twoPersonRule: true,
      hindrances: { submit: 'role', judge: 'state', withdraw: 'state' },
      version: 1,
    });

    const submitted = await review.submit(crew.author, '  Mind the seam.  ');
    expect(submitted.headers.etag).toBe('"2"');
    expect(reviewSchema.parse(done(submitted))).toMatchObject({
      state: 'in-review',
      submission: { by: { id: crew.author.id }, message: 'Mind the seam.' },
    });
    const vetted = await review.vet(crew.reviewer, 2, 'Clean.');
    expect(vetted.headers.etag).toBe('"3"');
    expect(reviewSchema.parse(done(vetted))).toMatchObject({
      state: 'vetted',
      verdict: { verdict: 'vetted', by: { id: crew.reviewer.id, name: 'Rhea Sound' }, note: 'Clean.' },
      hindrances: { submit: 'state', judge: 'state', withdraw: null },
    });
    const withdrawn = await review.withdraw(secondReviewer, 3, 'The seam clicks.');
    expect(withdrawn.headers.etag).toBe('"4"');
    expect(reviewSchema.parse(done(withdrawn))).toMatchObject({
      state: 'withdrawn',
      submission: { message: 'Mind the seam.' },
      verdict: { verdict: 'vetted', note: 'Clean.' },
      withdrawal: { by: { id: secondReviewer.id }, reason: 'The seam clicks.' },
      hindrances: { submit: 'state', judge: 'state', withdraw: 'state' },
      version: 4,
    });
    const { hindrances: _, ...told } = withdrawn.body;
    expect(await review.read(crew.viewer)).toMatchObject(told);
  });

  it('shows in the table, its list and its revisions, each step as a new version of the table', async () => {
    const review = await fresh(crew.author, 'Shown everywhere');
    const table = `/teams/${crew.team.slug}/tables/${review.slug}`;
    const shown = async () => {
      const [{ body }, { body: list }, { body: revision }] = await Promise.all([
        asPerson(test, crew.viewer).get(table),
        asPerson(test, crew.viewer).get(`/teams/${crew.team.slug}/tables?search=shown+everywhere`),
        asPerson(test, crew.viewer).get(`${table}/revisions/1`),
      ]);
      return [body.version, body.state, body.revisions.at(-1).state, list.items[0].state, revision.state];
    };
    expect(await shown()).toEqual([1, 'draft', 'draft', 'draft', 'draft']);
    await review.submit(crew.author);
    expect(await shown()).toEqual([2, 'in-review', 'in-review', 'in-review', 'in-review']);
    await review.vet(crew.reviewer, 2);
    expect(await shown()).toEqual([3, 'vetted', 'vetted', 'vetted', 'vetted']);
    const { body } = await asPerson(test, crew.viewer).get(
      `/teams/${crew.team.slug}/tables?search=shown+everywhere&state=vetted`,
    );
    expect(body.items).toMatchObject([{ changedBy: { id: crew.reviewer.id } }]);

    // With a newer draft, the table is that one's; the older one goes on by itself.
    const newer = { definition: sineDefinition('Newer') };
    done(await asPerson(test, crew.author).post(`${table}/revisions`, newer).set('If-Match', '"3"'), 201);
    expect(await shown()).toEqual([4, 'draft', 'vetted', 'draft', 'vetted']);
    expect((await reviewOf(test, crew.team, review.slug, 2).read(crew.viewer)).lastVetted).toBe(1);
    await review.withdraw(crew.reviewer, 3);
    expect(await shown()).toEqual([5, 'draft', 'withdrawn', 'draft', 'withdrawn']);
    expect((await reviewOf(test, crew.team, review.slug, 2).read(crew.viewer)).lastVetted).toBeNull();
  });

  it('does not touch what is exported; a header says the state', async () => {
    const review = await fresh(crew.author, 'Exported');
    const get = async (query: string, tag = '"none"') => {
      const path = `${review.revision}/export?target=c99${query}`;
      const { status, headers, text } = await asPerson(test, crew.viewer).get(path).set('If-None-Match', tag);
      return { status, etag: headers.etag, state: headers['stepwell-revision-state'], text };
    };
    const before = [await get(''), await get('&file=exported.c')];
    expect(before.map(({ status, state }) => [status, state])).toEqual([
      [200, 'draft'],
      [200, 'draft'],
    ]);
    await bring(review, 'withdrawn');
    const after = [await get(''), await get('&file=exported.c')];
    expect(after).toEqual(before.map((answer) => ({ ...answer, state: 'withdrawn' })));
    expect(await get('', before[0].etag)).toMatchObject({ status: 304, state: 'withdrawn' });
    const revision = await asPerson(test, crew.viewer).get(review.revision);
    expect(revision.body).toMatchObject({ state: 'withdrawn', codes: expect.any(Array) });
  });

  it('cannot begin on an archived table, but goes on there', async () => {
    const review = await fresh();
    const table = `/teams/${crew.team.slug}/tables/${review.slug}`;
    await asPerson(test, crew.author).post(`${table}/archive`);
    expect((await review.read(crew.author)).hindrances.submit).toBe('state');
    expect((await review.submit(crew.author)).status).toBe(409);
    await asPerson(test, crew.author).post(`${table}/restore`);
    await review.submit(crew.author);
    await asPerson(test, crew.author).post(`${table}/archive`);
    done(await review.vet(crew.reviewer, 2));
    done(await review.withdraw(crew.reviewer, 3));
  });

  it('is one for each revision: there is none of what is not there', async () => {
    const review = await fresh();
    for (const number of ['2', '0', 'x', '10001']) {
      const path = `/teams/${crew.team.slug}/tables/${review.slug}/revisions/${number}`;
      const as = asPerson(test, crew.admin);
      const answers = [
        await as.get(`${path}/review`),
        await as.get(`${path}/comments`),
        await as.post(`${path}/submit`, { message: 'x' }),
        await as.post(`${path}/verdict`, { verdict: 'vetted' }).set('If-Match', '"2"'),
        await as.post(`${path}/comments`, { text: 'x' }),
      ];
      expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404, 404]);
    }
  });
});

describe('a verdict', () => {
  it('needs the state that was seen (428), and is refused with the state of now where that has changed (412)', async () => {
    const review = await fresh();
    await review.submit(crew.author);
    const verdict = () =>
      asPerson(test, crew.reviewer).post(`${review.revision}/verdict`, { verdict: 'vetted' });
    expect((await verdict()).status).toBe(428);
    expect((await verdict().set('If-Match', '*')).status).toBe(428);
    const seen = await review.read(crew.reviewer);
    done(await review.giveBack(secondReviewer, 2, 'Later.'));
    const late = await verdict().set('If-Match', `"${seen.version}"`);
    expect([late.status, late.body.type]).toEqual([412, '/problems/precondition-failed']);
    expect(late.body.current).toEqual(await review.read(crew.reviewer));
    expect(late.body.current).toMatchObject({ state: 'returned', verdict: { note: 'Later.' } });
    const withdrawal = () =>
      asPerson(test, crew.reviewer).post(`${review.revision}/withdraw`, { reason: 'x' });
    expect((await withdrawal()).status).toBe(428);
    expect((await withdrawal().set('If-Match', '"2"')).status).toBe(412);
  });

  it('is one of all that come in the same moment; the others are told whose it is', async () => {
    const judges = [crew.reviewer, secondReviewer, crew.admin];
    for (let round = 0; round < 8; round++) {
      const review = await fresh(crew.author, `Race ${round}`);
      await review.submit(crew.author);
      const answers = await Promise.all(
        judges.flatMap((judge) => [
          review.vet(judge, 2, `by ${judge.name}`),
          review.giveBack(judge, 2, `by ${judge.name}`),
        ]),
      );
      const won = answers.filter(({ status }) => status === 200);
      expect(answers.map(({ status }) => status).sort()).toEqual([200, 412, 412, 412, 412, 412]);
      for (const { status, body } of answers) {
        if (status === 412) expect(body.current.verdict).toEqual(won[0].body.verdict);
      }
      expect((await review.read(crew.viewer)).verdict).toEqual(won[0].body.verdict);
    }
    const events = await test.database.db
      .select()
      .from(auditEvents)
      .where(eq(auditEvents.teamId, crew.team.id));
    for (let round = 0; round < 8; round++) {
      const verdicts = events.filter(
        ({ action, subject }) =>
          subject === `table:race-${round}` && /^revision\.(vetted|returned)$/.test(action),
      );
      expect(verdicts).toHaveLength(1);
    }
  });

  it('that returns needs reasons, and so does a withdrawal', async () => {
    const review = await fresh();
    await review.submit(crew.author);
    const silent = await review.giveBack(crew.reviewer, 2, '   ');
    expect([silent.status, silent.body.errors]).toEqual([
      422,
      [{ path: 'note', value: '""', allowed: '1 to 2000 characters: the reasons' }],
    ]);
    expect((await review.read(crew.viewer)).state).toBe('in-review');
    done(await review.vet(crew.reviewer, 2));
    expect((await review.withdraw(crew.reviewer, 3, ' ')).body.errors).toMatchObject([{ path: 'reason' }]);
    expect((await review.giveBack(crew.reviewer, 3)).status).toBe(409);
  });
});

describe('a submission', () => {
  it('happens once however often it is asked for, at once or later, under one key', async () => {
    const review = await fresh();
    const send = () => review.submit(crew.author).set('Idempotency-Key', `submit-${review.slug}`);
    const answers = [...(await Promise.all([send(), send(), send()])), await send()];
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200, 200]);
    expect(new Set(answers.map(({ text, headers }) => `${headers.etag} ${text}`)).size).toBe(1);
    expect((await review.submit(crew.author)).status).toBe(409);
    const events = await test.database.db
      .select()
      .from(auditEvents)
      .where(and(eq(auditEvents.teamId, crew.team.id), eq(auditEvents.subject, `table:${review.slug}`)));
    expect(events.filter(({ action }) => action === 'revision.submitted')).toHaveLength(1);
  });

  it('is one of all that come in the same moment without a key', async () => {
    const review = await fresh();
    const answers = await Promise.all([1, 2, 3, 4].map(() => review.submit(crew.author)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409]);
  });

  it('says what to look at', async () => {
    const review = await fresh();
    for (const body of [{}, { message: '' }, { message: 'm'.repeat(2001) }, { message: 'x', note: 'y' }]) {
      const answer = await asPerson(test, crew.author).post(`${review.revision}/submit`, body);
      expect(answer.status, answer.text).toBe(422);
    }
  });
});

it('all stands in the team’s unbroken chain of audit events, by the words the audit trail knows', async () => {
  const own = await makeCrew(test);
  const review = await draftOf(test, own.team, own.author, 'Chained');
  await review.submit(own.author, 'See.');
  await review.comment(own.reviewer, { text: 'Seen.', path: 'table.bits' });
  await review.vet(own.reviewer, 2, 'Good.');
  await review.withdraw(own.reviewer, 3, 'Bad.');
  const { db } = test.database;
  const events = await db
    .select()
    .from(auditEvents)
    .where(eq(auditEvents.teamId, own.team.id))
    .orderBy(auditEvents.sequence);
  const { digest } = (await asPerson(test, own.viewer).get(review.revision)).body;
  const of = { title: 'Chained', number: 1 };
  expect(events.slice(1).map(({ action, actorName, details }) => [action, actorName, details])).toEqual([
    ['revision.submitted', 'Aldo Brine', { ...of, digest, message: 'See.', failedLimits: 0 }],
    ['comment.added', 'Rhea Sound', { ...of, path: 'table.bits', text: 'Seen.' }],
    ['revision.vetted', 'Rhea Sound', { ...of, digest, note: 'Good.', failedLimits: 0 }],
    ['revision.withdrawn', 'Rhea Sound', { ...of, digest, reason: 'Bad.' }],
  ]);
  expect(new Set(events.map(({ subject }) => subject))).toEqual(new Set(['table:chained']));
  for (const team of [own.team, crew.team]) {
    const chain = await verifyChain(db, test.deps.config.auditKey, team.id);
    expect(chain).toMatchObject({ events: expect.any(Number) });
  }
});
