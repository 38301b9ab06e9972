import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { digestOf } from '../../shared/firmware/index.ts';
import { engineVersion } from '../../shared/engine-version.ts';
import { asPerson, makeCrew } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';
import { sineDefinition } from '../support/library.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
beforeAll(async () => {
  test = makeTestApp(process.env.TRY ? { logger: pino({ level: 'error' }) } : {});
  crew = await makeCrew(test);
});
afterAll(() => test.close());

const tablesPath = () => `/teams/${crew.team.slug}/tables`;

describe('a new table', () => {
  it('is computed here and stored as revision 1', async () => {
    const definition = sineDefinition('Fog signal');
    const made = await asPerson(test, crew.author).post(tablesPath(), {
      title: 'Fog signal',
      tags: ['Fog', 'harbour'],
      definition,
      note: 'first',
    });
    expect(made.status, made.text).toBe(201);
    expect(made.headers.location).toBe(`/api/v1${tablesPath()}/fog-signal`);
    expect(made.headers.etag).toBe('"1"');
    const built = buildTable(definition);
    expect(made.body).toMatchObject({
      slug: 'fog-signal',
      title: 'Fog signal',
      tags: ['fog', 'harbour'],
      latestRevision: 1,
      state: 'draft',
      bits: 8,
      length: 64,
      changedBy: { id: crew.author.id, name: 'Aldo Brine' },
    });
    const revision = await asPerson(test, crew.viewer).get(`${tablesPath()}/fog-signal/revisions/1`);
    expect(revision.status).toBe(200);
    expect(revision.body.codes).toEqual(Array.from(built.codes));
    expect(revision.body.definition).toEqual(built.definition);
    expect(revision.body.report).toEqual(built.report);
    expect(revision.body.engineVersion).toBe(engineVersion);
    expect(revision.body.digest).toBe(
      digestOf({ definition: revision.body.definition, engineVersion, codes: revision.body.codes }),
    );
    const list = await asPerson(test, crew.viewer).get(`${tablesPath()}?search=fo+sig&tag=harbour&state=draft`);
    expect(list.body.items.map((item: { slug: string }) => item.slug)).toEqual(['fog-signal']);
    const exported = await asPerson(test, crew.viewer).get(`${tablesPath()}/fog-signal/revisions/1/export?target=c99`);
    expect(exported.status, exported.text).toBe(200);
    console.log(exported.headers, exported.body.files[0].text.slice(0, 500));
  });
});
