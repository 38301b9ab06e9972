import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { waveTables } from '../../server/db/schema/index.ts';
import { slugFrom } from '../../server/features/tables/slugs.ts';
import { buildTable } from '../../shared/build-table.ts';
import { libraryTableSchema, revisionSchema } from '../../shared/contract/index.ts';
import { engineVersion } from '../../shared/engine-version.ts';
import { digestOf } from '../../shared/firmware/index.ts';
import { saveTable, sineDefinition } from '../support/library.ts';
import { asPerson, makeCrew } from '../support/people.ts';
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

const author = () => asPerson(test, crew.author);
const viewer = () => asPerson(test, crew.viewer);

describe('a new table', () => {
  it('is computed by the server and stored as revision 1', async () => {
    const definition = sineDefinition('Fog signal', { dither: 'triangular', seed: 7 });
    const playback = { mode: 'loop', by: 'tone', toneHz: 220, sampleRateHz: 32_000 };
    const made = await author().post(tables, {
      title: ' Fog signal ',
      tags: ['Fog', 'harbour', 'fog'],
      definition,
      playback,
      note: 'first',
    });
    expect(made.status, made.text).toBe(201);
    expect(made.headers.location).toBe(`/api/v1${tables}/fog-signal`);
    expect(made.headers.etag).toBe('"1"');
    const table = libraryTableSchema.parse(made.body);
    expect(table).toMatchObject({
      slug: 'fog-signal',
      title: 'Fog signal',
      tags: ['fog', 'harbour'],
      isArchived: false,
      latestRevision: 1,
      state: 'draft',
      createdBy: { id: crew.author.id, name: 'Aldo Brine' },
      version: 1,
      moreRevisions: false,
      revisionsAtMost: 10_000,
    });
    expect((await viewer().get(`${tables}/fog-signal`)).body).toEqual(made.body);

    const built = buildTable(definition);
    const answer = await viewer().get(`${tables}/fog-signal/revisions/1`);
    const revision = revisionSchema.parse(answer.body);
    expect(revision).toMatchObject({ number: 1, note: 'first', playback, engineVersion });
    expect(revision.codes).toEqual(Array.from(built.codes));
    expect(revision.definition).toEqual(built.definition);
    expect(revision.report).toEqual(built.report);
    expect(revision.digest).toBe(
      digestOf({ definition: built.definition, engineVersion, codes: revision.codes }),
    );
  });

  it('takes all a table can hold: 65,536 entries of 16 bits', async () => {
    const definition = sineDefinition('Long', { length: 65_536, bits: 16 });
    const { slug } = await saveTable(test, crew.team, crew.author, 'Long', { definition });
    const { body } = await viewer().get(`${tables}/${slug}/revisions/1`);
    expect(body.codes).toEqual(Array.from(buildTable(definition).codes));
  });

  it('keeps warnings', async () => {
    const source = {
      kind: 'harmonics',
      partials: [1, 40].map((harmonic) => ({ harmonic, amplitude: 1, phaseDeg: 0 })),
    };
    const { slug } = await saveTable(test, crew.team, crew.author, 'Too high', {
      definition: { ...sineDefinition('Too high'), source },
    });
    const { body } = await viewer().get(`${tables}/${slug}/revisions/1`);
    expect(body.warnings).toMatchObject([
      { code: 'partial-above-nyquist', path: 'source.partials[1].harmonic' },
    ]);
  });

  it('has an address of its own under the same title, also when many are saved at once', async () => {
    const saved = await Promise.all(
      Array.from({ length: 6 }, () => saveTable(test, crew.team, crew.author, 'Same title')),
    );
    const slugs = saved.map(({ slug }) => slug).sort();
    expect(slugs).toEqual(['same-title', ...[2, 3, 4, 5, 6].map((number) => `same-title-${number}`)]);
  });

  it('is refused by field, value and what is allowed, and nothing is stored', async () => {
    const before = await test.database.db.$count(waveTables);
    const refusal = async (body: object) => {
      const response = await author().post(tables, body);
      expect(response.status, response.text).toBe(422);
      return response.body.errors;
    };
    const definition = sineDefinition('Wrong', { bits: 17 });
    expect(await refusal({ title: 'Wrong', definition })).toEqual([
      { path: 'definition.table.bits', value: '17', allowed: 'a whole number from 1 to 16' },
    ]);
    expect(await refusal({ title: 'Wrong', definition: 'sine' })).toEqual([
      { path: 'definition', value: '"sine"', allowed: 'a definition' },
    ]);
    expect(await refusal({ title: 'Wrong', definition: [] })).toMatchObject([{ path: 'definition' }]);
    expect(await refusal({ title: 'Wrong', definition: { ...sineDefinition('Wrong'), codes: [1] } })).toEqual(
      [{ path: 'definition.codes', value: 'a list of 1', allowed: 'no such field' }],
    );
    const silent = { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 0, phaseDeg: 0 }] };
    expect(
      (await refusal({ title: 'Wrong', definition: { ...sineDefinition('Wrong'), source: silent } }))[0].path,
    ).toMatch(/^definition\./);
    expect(await refusal({ title: ' ', definition: sineDefinition('Wrong') })).toEqual([
      { path: 'title', value: '" "', allowed: '1 to 64 characters' },
    ]);
    expect(await refusal({ title: 'Half \ud83d', definition: sineDefinition('Wrong') })).toMatchObject([
      { path: 'title' },
    ]);
    expect(await refusal({ title: 'Wrong', definition: sineDefinition('Half \ud83d') })).toMatchObject([
      { path: 'definition.name' },
    ]);
    expect(
      await refusal({ title: 'Wrong', tags: ['<b>'], definition: sineDefinition('Wrong') }),
    ).toMatchObject([{ path: 'tags[0]' }]);
    expect(
      await refusal({ title: 'Wrong', note: 'n'.repeat(2001), definition: sineDefinition('Wrong') }),
    ).toMatchObject([{ path: 'note' }]);
    expect(
      await refusal({ title: 'Wrong', codes: [1, 2], definition: sineDefinition('Wrong') }),
    ).toMatchObject([{ path: 'codes', allowed: 'no such field' }]);
    expect(await test.database.db.$count(waveTables)).toBe(before);
  });

  it('is saved once however often the same request comes, at once or later', async () => {
    const body = { title: 'Only once', definition: sineDefinition('Only once') };
    const send = () => author().post(tables, body).set('Idempotency-Key', '"save-1"');
    const answers = [...(await Promise.all([send(), send(), send()])), await send()];
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    expect(new Set(answers.map(({ headers }) => `${headers.etag} ${headers.location}`)).size).toBe(1);
    const { body: list } = await viewer().get(`${tables}?search=only+once`);
    expect(list.items).toHaveLength(1);
    const other = await author()
      .post(tables, { ...body, title: 'Another' })
      .set('Idempotency-Key', 'save-1');
    expect(other.status).toBe(422);
  });
});

describe('the address of a table', () => {
  it.each([
    ['Fog signal', 'fog-signal'],
    ['  Ærø & Ålesund — Süd  ', 'aero-alesund-sud'],
    ['Straße № 5', 'strasse-no-5'],
    ['ﬁlter ２', 'filter-2'],
    ['音', 'table'],
    ['-- // --', 'table'],
    ['x'.repeat(64), 'x'.repeat(50)],
    [`${'x'.repeat(49)} y`, 'x'.repeat(49)],
  ])('made of %j is %j', (title, slug) => {
    expect(slugFrom(title)).toBe(slug);
  });

  it('stays when the title changes, and numbers go on behind those that are taken', async () => {
    const first = await saveTable(test, crew.team, crew.author, 'Beacon');
    await saveTable(test, crew.team, crew.author, 'Beacon 7');
    await saveTable(test, crew.team, crew.author, 'Beacon x');
    expect((await saveTable(test, crew.team, crew.author, 'Beacon')).slug).toBe('beacon-8');
    const renamed = await author().patch(`${tables}/${first.slug}`, { title: 'Buoy' }).set('If-Match', '"1"');
    expect(renamed.body).toMatchObject({ slug: 'beacon', title: 'Buoy' });
  });
});

describe('changing title and tags', () => {
  it('needs the state that was seen (428), refuses another (412) and says what there is now', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Contested', { tags: ['one'] });
    const change = (body: object) => author().patch(`${tables}/${slug}`, body);
    expect((await change({ title: 'Without' })).status).toBe(428);
    expect((await change({ title: 'Any' }).set('If-Match', '*')).status).toBe(428);
    expect((await change({ title: 'Broken' }).set('If-Match', 'yes')).status).toBe(400);

    const first = await change({ title: 'First', tags: ['two'] }).set('If-Match', '"1"');
    expect([first.status, first.headers.etag, first.body.title]).toEqual([200, '"2"', 'First']);
    const late = await change({ title: 'Late' }).set('If-Match', '"1"');
    expect(late.status).toBe(412);
    expect(late.headers['content-type']).toMatch('application/problem+json');
    expect(late.body.current).toEqual(first.body);
    expect((await viewer().get(`${tables}?search=first`)).body.items).toHaveLength(1);
    expect((await viewer().get(`${tables}?search=contested`)).body.items).toHaveLength(0);
    expect((await viewer().get(`${tables}?search=first&tag=one`)).body.items).toHaveLength(0);
    expect((await viewer().get(`${tables}?search=first&tag=two`)).body.items).toHaveLength(1);
  });

  it('lets exactly one of many who change the same state win', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Race');
    const answers = await Promise.all(
      Array.from({ length: 8 }, (_, index) =>
        author()
          .patch(`${tables}/${slug}`, { title: `Race ${index}` })
          .set('If-Match', '"1"'),
      ),
    );
    const won = answers.filter(({ status }) => status === 200);
    expect(won).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 412)).toHaveLength(7);
    expect((await viewer().get(`${tables}/${slug}`)).body.title).toBe(won[0].body.title);
  });

  it('changes nothing where nothing is different', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Same', { tags: ['b', 'a'] });
    const answer = await author()
      .patch(`${tables}/${slug}`, { title: 'Same', tags: ['a', 'b'] })
      .set('If-Match', '"1"');
    expect([answer.status, answer.headers.etag]).toEqual([200, '"1"']);
  });
});

describe('an archived table', () => {
  it('leaves the list, is found among the archived ones, takes no revision and comes back', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Put away', { tags: ['attic'] });
    const find = async (archived: string) =>
      (await viewer().get(`${tables}?search=put+away&tag=attic&archived=${archived}`)).body.items.length;
    const archive = () => author().post(`${tables}/${slug}/archive`);
    const first = await archive();
    expect([first.status, first.body.isArchived, first.headers.etag]).toEqual([200, true, '"2"']);
    expect((await archive()).headers.etag).toBe('"2"');
    expect([await find('no'), await find('yes')]).toEqual([0, 1]);

    const save = await author()
      .post(`${tables}/${slug}/revisions`, { definition: sineDefinition('Put away') })
      .set('If-Match', '"2"');
    expect(save.status).toBe(409);
    const back = await author().post(`${tables}/${slug}/restore`);
    expect([back.body.isArchived, back.headers.etag]).toEqual([false, '"3"']);
    expect([await find('no'), await find('yes')]).toEqual([1, 0]);
  });
});

describe('a duplicate', () => {
  it('begins with the revision it was made of, as it was computed then', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Original', { tags: ['kept'] });
    await author()
      .post(`${tables}/${slug}/revisions`, { definition: sineDefinition('Second', { bits: 10 }) })
      .set('If-Match', '"1"');
    const newest = await asPerson(test, crew.reviewer).post(`${tables}/${slug}/duplicate`);
    expect([newest.status, newest.headers.location]).toEqual([201, `/api/v1${tables}/original-copy`]);
    expect(newest.body).toMatchObject({
      title: 'Original copy',
      tags: ['kept'],
      latestRevision: 1,
      bits: 10,
    });
    expect(newest.body.createdBy.id).toBe(crew.reviewer.id);

    const chosen = await author().post(`${tables}/${slug}/duplicate`, { title: 'Branch', revision: 1 });
    const [source, copy] = await Promise.all([
      viewer().get(`${tables}/${slug}/revisions/1`),
      viewer().get(`${tables}/branch/revisions/1`),
    ]);
    expect(chosen.body).toMatchObject({ slug: 'branch', bits: 8 });
    const { definition, codes, report, digest } = source.body;
    expect(copy.body).toMatchObject({ definition, codes, report, digest, note: '' });

    expect((await author().post(`${tables}/${slug}/duplicate`, { revision: 9 })).status).toBe(404);
    expect((await author().post(`${tables}/no-such/duplicate`)).status).toBe(404);
    const long = await saveTable(test, crew.team, crew.author, '😀'.repeat(32));
    const copied = await author().post(`${tables}/${long.slug}/duplicate`);
    expect(copied.status, copied.text).toBe(201);
    expect(copied.body.title).toBe(`${'😀'.repeat(29)} copy`);
  });
});

describe('everything that was done', () => {
  it('stands in an unbroken chain of the team’s audit events', async () => {
    const chain = await verifyChain(test.database.db, test.deps.config.auditKey, crew.team.id);
    expect(chain).toMatchObject({ events: expect.any(Number) });
    expect('events' in chain && chain.events).toBeGreaterThan(25);
  });
});
