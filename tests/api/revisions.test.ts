import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { revisionsPageSchema } from '../../shared/contract/index.ts';
import { saveTable, sineDefinition } from '../support/library.ts';
import { asPerson, makeCrew, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let tables: string;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  tables = `/teams/${crew.team.slug}/tables`;
});
afterAll(() => test.close());

const save = (person: TestPerson, slug: string, seen: string, body: object = {}) =>
  asPerson(test, person)
    .post(`${tables}/${slug}/revisions`, { definition: sineDefinition('Saved'), ...body })
    .set('If-Match', seen);
const read = (path: string) => asPerson(test, crew.viewer).get(`${tables}/${path}`);

describe('a further revision', () => {
  it('is computed and numbered by the server and becomes what the list shows', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Grows', {
      playback: { mode: 'once', by: 'sampleRate', toneHz: 440, sampleRateHz: 8000 },
    });
    const before = (await read(`${slug}/revisions/1`)).body;
    const saved = await save(crew.reviewer, slug, '"1"', {
      definition: sineDefinition('Grows', { bits: 12, length: 128 }),
      note: 'finer',
    });
    expect(saved.status, saved.text).toBe(201);
    expect(saved.headers.location).toBe(`/api/v1${tables}/${slug}/revisions/2`);
    expect(saved.headers.etag).toBe('"2"');
    expect(saved.body).toMatchObject({
      latestRevision: 2,
      bits: 12,
      length: 128,
      tableBytes: 256,
      changedBy: { id: crew.reviewer.id },
      createdBy: { id: crew.author.id },
    });
    expect(saved.body.revisions).toMatchObject([
      { number: 2, note: 'finer', madeBy: { id: crew.reviewer.id } },
      { number: 1, note: '', madeBy: { id: crew.author.id } },
    ]);
    const { body: list } = await read('?search=grows');
    expect(list.items).toMatchObject([{ slug, bits: 12, latestRevision: 2 }]);
    expect((await read(`${slug}/revisions/1`)).body).toEqual(before);
    expect((await read(`${slug}/revisions/2`)).body).toMatchObject({
      playback: null,
      codes: expect.any(Array),
    });
  });

  it('needs the state that was seen: 428 without, 412 with the state of now after a lost race, nothing lost', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Raced');
    const body = { definition: sineDefinition('Raced') };
    expect((await asPerson(test, crew.author).post(`${tables}/${slug}/revisions`, body)).status).toBe(428);

    const answers = await Promise.all(
      [1, 2, 3, 4, 5].map((number) => save(crew.author, slug, '"1"', { note: `by ${number}` })),
    );
    const won = answers.filter(({ status }) => status === 201);
    const lost = answers.filter(({ status }) => status === 412);
    expect([won.length, lost.length]).toEqual([1, 4]);
    for (const { body: problem } of lost) {
      expect(problem).toMatchObject({ type: '/problems/precondition-failed', current: won[0].body });
    }
    const again = await save(crew.author, slug, '"2"', { note: 'second try' });
    expect(again.body.revisions.map(({ number }: { number: number }) => number)).toEqual([3, 2, 1]);
  });

  it('is saved once however often the request comes, and does not fail for its own first success', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Repeated');
    const send = () => save(crew.author, slug, '"1"').set('Idempotency-Key', 'revision-once');
    const answers = [...(await Promise.all([send(), send()])), await send()];
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
    expect((await read(slug)).body.latestRevision).toBe(2);
  });

  it('that is refused names the field in the request, and nothing is stored', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Refused');
    const refused = await save(crew.author, slug, '"1"', {
      definition: sineDefinition('Refused', { length: 1 }),
      playback: { mode: 'loop', by: 'tone', toneHz: 0, sampleRateHz: 1 },
    });
    expect(refused.status).toBe(422);
    expect(refused.body.errors).toMatchObject([
      { path: 'playback.toneHz', value: '0', allowed: 'a frequency above 0 Hz' },
    ]);
    const deeper = await save(crew.author, slug, '"1"', {
      definition: sineDefinition('Refused', { length: 1 }),
    });
    expect(deeper.body.errors).toMatchObject([{ path: 'definition.table.length', value: '1' }]);
    const titled = await save(crew.author, slug, '"1"', { title: 'New' });
    expect(titled.body.errors).toEqual([{ path: 'title', value: '"New"', allowed: 'no such field' }]);
    expect((await read(slug)).body.latestRevision).toBe(1);
  });
});

describe('the revisions of a table', () => {
  it('come newest first, page by page, and 20 of them with the table', async () => {
    const { slug, version: one } = await saveTable(test, crew.team, crew.author, 'Many');
    let version = one;
    for (let number = 2; number <= 23; number += 1) {
      ({ version } = (await save(crew.author, slug, `"${version}"`, { note: `no. ${number}` })).body);
    }
    const table = (await read(slug)).body;
    expect([table.revisions.length, table.revisions[0].number, table.moreRevisions]).toEqual([20, 23, true]);
    expect(table.version).toBe(version);

    const numbers: number[] = [];
    let cursor = '';
    do {
      const answer = await read(`${slug}/revisions?limit=10${cursor && `&cursor=${cursor}`}`);
      const page = revisionsPageSchema.parse(answer.body);
      numbers.push(...page.items.map(({ number }) => number));
      cursor = page.nextCursor ?? '';
    } while (cursor);
    expect(numbers).toEqual(Array.from({ length: 23 }, (_, index) => 23 - index));

    const other = await saveTable(test, crew.team, crew.author, 'Other');
    const first = await read(`${slug}/revisions?limit=10`);
    expect((await read(`${other.slug}/revisions?cursor=${first.body.nextCursor}`)).status).toBe(422);
  });

  it('that are not there are 404, whatever stands for the number', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Single');
    for (const number of ['0', '2', '-1', '1.0', 'one', '1e0', '99999999999999999999', '%31%30']) {
      expect((await read(`${slug}/revisions/${number}`)).status, number).toBe(404);
      expect((await read(`${slug}/revisions/${number}/export?target=c99`)).status, number).toBe(404);
    }
    expect((await read('no-such-table/revisions')).status).toBe(404);
  });
});
