import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  sortDirections,
  tablesPageSchema,
  tablesQuerySchema,
  tableSorts,
  type TablesQuery,
  type TableSummary,
} from '../../shared/contract/index.ts';
import { waveTables } from '../../server/db/schema/index.ts';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { findTables } from '../../server/features/tables/find-tables.ts';
import { insertTable, storeArchived } from '../../server/features/tables/store.ts';
import { pick, randomFrom } from '../bench/random.ts';
import { sineDefinition } from '../support/library.ts';
import { asPerson, makeCrew, makePerson, makeTeam } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const states = ['draft', 'in-review', 'vetted', 'returned', 'withdrawn'] as const;
const words = [
  'fog',
  'foghorn',
  'Signal',
  'signál',
  'SIGNALLING',
  'lamp',
  'Überlagerung',
  'tone',
  'Øre',
  '12',
  '128',
  'ток',
];
const tags = ['harbour', 'fog bank', 'tone', 'x-1', 'über'];
const count = 70;

/** A table as the oracle knows it. */
interface Known {
  readonly id: number;
  readonly title: string;
  readonly tags: readonly string[];
  readonly state: string;
  readonly isArchived: boolean;
  readonly summary: Pick<TableSummary, 'slug' | 'bits' | 'length' | 'snrDb' | 'tableBytes'>;
  readonly changedAt: number;
}

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let known: Known[];
const path = (query: Record<string, string> = {}) =>
  `/teams/${crew.team.slug}/tables?${new URLSearchParams(query)}`;

beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  known = await fillLibrary();
});
afterAll(() => test.close());

/** Seeded: the same library in every run, with equal titles, equal figures and figures that do not exist. */
async function fillLibrary(): Promise<Known[]> {
  const { db } = test.database;
  const random = randomFrom('tables of the list');
  const built = [4, 8, 10].flatMap((bits) =>
    [16, 64, 100].map((length) => buildRevision(sineDefinition('List', { bits, length }))),
  );
  // Two samples, both on a code: no error at all, so no SNR.
  built.push(buildRevision(sineDefinition('Exact', { bits: 1, length: 4, sampleAt: 'centre' })));
  const made: Known[] = [];
  for (let index = 0; index < count; index += 1) {
    const title = Array.from({ length: 1 + Math.floor(3 * random()) }, () => pick(random, words)).join(
      pick(random, [' ', '-', '_/']),
    );
    const own = [
      ...new Set(Array.from({ length: Math.floor(3 * random()) }, () => pick(random, tags))),
    ].sort();
    const place = { teamId: crew.team.id, userId: crew.author.id };
    const slug = await insertTable(
      db,
      place,
      { title, tags: own },
      { built: pick(random, built), playback: null, note: '' },
    );
    const [row] = await db
      .select()
      .from(waveTables)
      .where(and(eq(waveTables.teamId, crew.team.id), eq(waveTables.slug, slug)));
    const isArchived = random() < 0.25;
    if (isArchived) await storeArchived(db, place, row, true);
    const state = pick(random, states);
    // Few moments, so that many are equal.
    const changedAt = new Date(
      Date.UTC(2026, 0, 1 + Math.floor(9 * random()), 12, 0, 0, Math.floor(3 * random())),
    );
    await db.update(waveTables).set({ state, changedAt }).where(eq(waveTables.id, row.id));
    made.push({
      id: row.id,
      title,
      tags: own,
      state,
      isArchived,
      summary: { ...row, slug },
      changedAt: changedAt.getTime(),
    });
  }
  return made;
}

const folded = (text: string) =>
  text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase().replaceAll('ø', 'o');

/** What the list should answer, by a plain reading of its rules. */
function expected({ search = '', tag, state, archived, sort, direction }: TablesQuery): number[] {
  const wanted = folded(search)
    .split(/[^\p{L}\p{N}]+/u)
    .filter(Boolean);
  const passing = known.filter((table) => {
    const own = [table.title, ...table.tags].flatMap((text) => folded(text).split(/[^\p{L}\p{N}]+/u));
    return (
      table.isArchived === (archived === 'yes') &&
      (state === undefined || table.state === state) &&
      (tag === undefined || table.tags.includes(tag)) &&
      wanted.every((word) => own.some((candidate) => candidate.startsWith(word)))
    );
  });
  const key = (table: Known): number | string => {
    if (sort === 'changed') return table.changedAt;
    if (sort === 'title') return table.title;
    if (sort === 'snr') return table.summary.snrDb ?? -Infinity;
    if (sort === 'bytes') return table.summary.tableBytes;
    return table.summary[sort];
  };
  const sign = direction === 'asc' ? 1 : -1;
  return passing.sort((a, b) => sign * (compare(key(a), key(b)) || a.id - b.id)).map(({ id }) => id);
}

// Unicode's own order (UCA) without case and accents, with punctuation counted, as the database's collation is.
const collator = new Intl.Collator('und', { sensitivity: 'base', ignorePunctuation: false });
const compare = (a: number | string, b: number | string) =>
  typeof a === 'string' ? collator.compare(a, String(b)) : a === b ? 0 : a < Number(b) ? -1 : 1;

async function allPages(query: TablesQuery, few?: number): Promise<number[]> {
  const ids: number[] = [];
  let cursor: string | undefined;
  do {
    const page = await findTables(test.database.db, crew.team.id, { ...query, cursor }, few);
    expect(page.ids.length).toBeLessThanOrEqual(query.limit);
    ids.push(...page.ids);
    cursor = page.nextCursor ?? undefined;
  } while (cursor !== undefined);
  return ids;
}

describe('the list of tables', () => {
  it('has every order and direction, page by page, without a gap or a table twice', async () => {
    expect(known.filter(({ summary }) => summary.snrDb === null).length).toBeGreaterThan(2);
    for (const sort of tableSorts) {
      for (const direction of sortDirections) {
        const query = tablesQuerySchema.parse({ sort, direction, limit: '7' });
        expect(await allPages(query), `${sort} ${direction}`).toEqual(expected(query));
      }
    }
  });

  it('finds the same by a narrow filter as by walking an index: 300 random questions against a plain reading', async () => {
    const random = randomFrom('questions to the list');
    const sometimes = <Value>(share: number, value: () => Value) => (random() < share ? value() : undefined);
    let found = 0;
    for (let round = 0; round < 300; round += 1) {
      const word = () => {
        const whole = pick(random, [...words, ...tags, 'nothing']);
        return random() < 0.5 ? whole : whole.slice(0, 1 + Math.floor(random() * whole.length));
      };
      const query = tablesQuerySchema.parse({
        search: sometimes(0.7, () => Array.from({ length: 1 + Math.floor(2 * random()) }, word).join(' ')),
        tag: sometimes(0.3, () => pick(random, tags)),
        state: sometimes(0.3, () => pick(random, states)),
        archived: random() < 0.3 ? 'yes' : 'no',
        sort: pick(random, tableSorts),
        direction: pick(random, sortDirections),
        limit: String(1 + Math.floor(9 * random())),
      });
      const right = expected(query);
      found += right.length;
      expect(await allPages(query), `led: ${JSON.stringify(query)}`).toEqual(right);
      expect(await allPages(query, 0), `walked: ${JSON.stringify(query)}`).toEqual(right);
    }
    expect(found).toBeGreaterThan(500);
  });

  it('answers what the contract says, also without a search', async () => {
    const response = await asPerson(test, crew.viewer).get(path({ limit: '100' }));
    const { items, nextCursor } = tablesPageSchema.parse(response.body);
    expect(nextCursor).toBeNull();
    expect(items).toHaveLength(known.filter(({ isArchived }) => !isArchived).length);
    expect(items[0].changedBy).toEqual({ id: crew.author.id, name: 'Aldo Brine' });
    for (const { drawing, length } of items) {
      expect(drawing.low).toHaveLength(Math.min(64, length));
      expect(drawing.high.every((high, column) => high >= drawing.low[column])).toBe(true);
    }
  });

  it('looks for nothing where a search has neither letter nor digit', async () => {
    const [all, odd] = await Promise.all(
      [{}, { search: '%_*"+' }].map((query: { search?: string }) =>
        asPerson(test, crew.viewer).get(path({ ...query, limit: '100' })),
      ),
    );
    expect(odd.body).toEqual(all.body);
  });

  it('never shows tables of another team', async () => {
    const stranger = await makePerson(test);
    const team = await makeTeam(test, [{ person: stranger, role: 'admin' }]);
    const response = await asPerson(test, stranger).get(`/teams/${team.slug}/tables?search=fog`);
    expect(response.body).toEqual({ items: [], nextCursor: null });
  });
});

describe('a question that cannot be answered', () => {
  const refused = async (query: Record<string, string>) => {
    const response = await asPerson(test, crew.viewer).get(path(query));
    expect(response.status, response.text).toBe(422);
    expect(response.headers['content-type']).toMatch('application/problem+json');
    return response.body.errors;
  };

  it('is refused by field, value and what is allowed', async () => {
    expect(await refused({ sort: 'colour' })).toEqual([
      {
        path: 'sort',
        value: '"colour"',
        allowed: 'one of "changed", "title", "snr", "bytes", "length", "bits"',
      },
    ]);
    expect(await refused({ limit: '101' })).toEqual([
      { path: 'limit', value: '"101"', allowed: 'a whole number from 1 to 100' },
    ]);
    expect(await refused({ limit: '1e1' })).toMatchObject([{ path: 'limit' }]);
    expect(await refused({ search: 'a'.repeat(101) })).toMatchObject([
      { path: 'search', allowed: 'at most 100 characters' },
    ]);
    expect(await refused({ search: 'a b c d e f g h i' })).toMatchObject([
      { path: 'search', allowed: 'at most 8 different words' },
    ]);
    expect(await refused({ tag: '<b>' })).toMatchObject([{ path: 'tag' }]);
    expect(await refused({ colour: 'red' })).toEqual([
      { path: 'colour', value: '"red"', allowed: 'no such field' },
    ]);
  });

  it('is one with a cursor of other filters, another order or team, or made up', async () => {
    const first = await asPerson(test, crew.viewer).get(path({ limit: '5' }));
    const cursor: string = first.body.nextCursor;
    expect((await asPerson(test, crew.viewer).get(path({ limit: '9', cursor }))).status).toBe(200);
    const where = { path: 'cursor', allowed: 'a nextCursor of the same list, filters and order' };
    expect(await refused({ cursor, sort: 'title' })).toMatchObject([where]);
    expect(await refused({ cursor, search: 'fog' })).toMatchObject([where]);
    expect(await refused({ cursor, archived: 'yes' })).toMatchObject([where]);
    expect(await refused({ cursor: 'made-up' })).toMatchObject([where]);
    expect(await refused({ cursor: Buffer.from('["x",{},1]').toString('base64url') })).toMatchObject([where]);

    const stranger = await makePerson(test);
    const team = await makeTeam(test, [{ person: stranger, role: 'admin' }]);
    const elsewhere = await asPerson(test, stranger).get(`/teams/${team.slug}/tables?cursor=${cursor}`);
    expect(elsewhere.status).toBe(422);
  });
});

describe('the tags in use', () => {
  it('come with how many tables that are not archived have each', async () => {
    const response = await asPerson(test, crew.viewer).get(`/teams/${crew.team.slug}/tags`);
    const counts = new Map<string, number>();
    for (const table of known) {
      if (!table.isArchived) for (const tag of table.tags) counts.set(tag, (counts.get(tag) ?? 0) + 1);
    }
    const told = response.body.tags as { tag: string; tables: number }[];
    expect(new Map(told.map(({ tag, tables }) => [tag, tables]))).toEqual(counts);
  });
});
