import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { auditEvents } from '../../server/db/schema/index.ts';
import {
  boardRevisionSchema,
  boardRevisionsPageSchema,
  boardsPageSchema,
  libraryBoardSchema,
  parseBoard,
  type BoardInput,
  type LibraryBoard,
} from '../../shared/contract/index.ts';
import { boardDigestOf } from '../../shared/output-stage/index.ts';
import { boardWith } from '../engine/support/boards.ts';
import { asPerson, makeCrew, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let boards: string;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  boards = `/teams/${crew.team.slug}/boards`;
});
afterAll(() => test.close());

const named = (name: string, output: Parameters<typeof boardWith>[0] = {}): BoardInput =>
  boardWith(output, { name });

async function save(name: string, person = crew.author): Promise<LibraryBoard> {
  const response = await asPerson(test, person).post(boards, { board: named(name), note: 'first' });
  expect(response.status, response.text).toBe(201);
  return libraryBoardSchema.parse(response.body);
}
const revise = (person: TestPerson, slug: string, seen: string, board: BoardInput, note = '') =>
  asPerson(test, person).post(`${boards}/${slug}/revisions`, { board, note }).set('If-Match', seen);
const read = (path: string) => asPerson(test, crew.viewer).get(`${boards}${path}`);

describe('a new board', () => {
  it('is stored as parsed, with its digest, under an address made of its name', async () => {
    const made = await asPerson(test, crew.author).post(boards, { board: named('Boje, groß') });
    expect(made.status, made.text).toBe(201);
    expect(made.headers.location).toBe(`/api/v1${boards}/boje-gross`);
    expect(made.headers.etag).toBe('"1"');
    const board = parseBoard(named('Boje, groß'));
    expect(libraryBoardSchema.parse(made.body)).toMatchObject({
      slug: 'boje-gross',
      name: 'Boje, groß',
      outputKind: 'ladder',
      bits: 8,
      isRetired: false,
      latestRevision: 1,
      version: 1,
      board,
      createdBy: { id: crew.author.id },
      revisions: [{ number: 1, digest: boardDigestOf(board), madeBy: { id: crew.author.id } }],
      moreRevisions: false,
    });
    const again = await read('/boje-gross');
    expect([again.body, again.headers.etag]).toEqual([made.body, '"1"']);
  });

  it('of a name that another has takes the next free address, at one moment too', async () => {
    const answers = await Promise.all(Array.from({ length: 4 }, () => save('Same name')));
    expect(answers.map(({ slug }) => slug).sort()).toEqual([
      'same-name',
      'same-name-2',
      'same-name-3',
      'same-name-4',
    ]);
  });

  it('is refused by the place of its fault', async () => {
    const faultsOf = async (body: object) => {
      const response = await asPerson(test, crew.author).post(boards, body);
      expect(response.status, response.text).toBe(422);
      return response.body.errors;
    };
    expect(await faultsOf({ board: named('Wrong', { R: 0 }) })).toEqual([
      { path: 'board.output.R', value: '0', allowed: 'a number from 1e-9 to 1e12 Ω' },
    ]);
    const portMap = { bits: [{ port: 'A', pin: 0 }], ports: [{ name: 'A', reserved: [{ pin: 0 }] }] };
    expect(await faultsOf({ board: named('Wrong', { bits: 1, portMap }) })).toMatchObject([
      { path: 'board.output.portMap.bits[0].pin', allowed: 'a pin of port A that is not reserved' },
    ]);
    expect(await faultsOf({ board: 7 })).toMatchObject([{ path: 'board', allowed: 'a board' }]);
    expect(await faultsOf({ board: [] })).toMatchObject([{ path: 'board' }]);
    expect(await faultsOf({})).toMatchObject([{ path: 'board' }]);
  });

  it('is saved once however often the request comes', async () => {
    const send = () =>
      asPerson(test, crew.author)
        .post(boards, { board: named('Once') })
        .set('Idempotency-Key', 'board-once');
    const answers = [...(await Promise.all([send(), send()])), await send()];
    expect(answers.map(({ status, body }) => [status, body.slug])).toEqual([
      [201, 'once'],
      [201, 'once'],
      [201, 'once'],
    ]);
  });
});

describe('a further revision', () => {
  it('becomes what the board is, and leaves the one before as it was', async () => {
    const { slug } = await save('Grows');
    const before = boardRevisionSchema.parse((await read(`/${slug}/revisions/1`)).body);
    const output = { kind: 'on-chip', bits: 12 } as const;
    const revised = await revise(
      crew.reviewer,
      slug,
      '"1"',
      boardWith({}, { name: 'Grown', output }),
      'new stage',
    );
    expect(revised.status, revised.text).toBe(201);
    expect(revised.headers.location).toBe(`/api/v1${boards}/${slug}/revisions/2`);
    expect(revised.headers.etag).toBe('"2"');
    expect(revised.body).toMatchObject({
      slug,
      name: 'Grown',
      outputKind: 'on-chip',
      bits: 12,
      latestRevision: 2,
      changedBy: { id: crew.reviewer.id },
      createdBy: { id: crew.author.id },
      revisions: [
        { number: 2, note: 'new stage', outputKind: 'on-chip' },
        { number: 1, note: 'first', outputKind: 'ladder' },
      ],
    });
    expect((await read(`/${slug}/revisions/1`)).body).toEqual(before);
    expect((await read(`/${slug}/revisions/2`)).body.board).toEqual(revised.body.board);
    expect((await read(`/${slug}/revisions/3`)).status).toBe(404);
    expect((await read(`/${slug}/revisions/one`)).status).toBe(404);
  });

  it('needs the state that was seen: 428 without, 412 with the state of now after a lost race', async () => {
    const { slug } = await save('Raced');
    const bare = await asPerson(test, crew.author).post(`${boards}/${slug}/revisions`, {
      board: named('Raced'),
    });
    expect(bare.status).toBe(428);
    const answers = await Promise.all(
      [1, 2, 3, 4].map((number) => revise(crew.author, slug, '"1"', named('Raced'), `by ${number}`)),
    );
    const won = answers.filter(({ status }) => status === 201);
    const lost = answers.filter(({ status }) => status === 412);
    expect([won.length, lost.length]).toEqual([1, 3]);
    for (const { body } of lost)
      expect(body).toMatchObject({ type: '/problems/precondition-failed', current: won[0].body });
  });

  it('lists page by page, newest first', async () => {
    const { slug } = await save('Long');
    for (let version = 1; version <= 4; version += 1)
      expect((await revise(crew.author, slug, `"${version}"`, named('Long'))).status).toBe(201);
    const first = boardRevisionsPageSchema.parse((await read(`/${slug}/revisions?limit=2`)).body);
    expect(first.items.map(({ number }) => number)).toEqual([5, 4]);
    const second = (await read(`/${slug}/revisions?limit=3&cursor=${first.nextCursor}`)).body;
    expect(second.items.map(({ number }: { number: number }) => number)).toEqual([3, 2, 1]);
    expect(second.nextCursor).toBeNull();
  });
});

describe('a board out of use', () => {
  it('stays readable, takes no revision and comes back', async () => {
    const { slug } = await save('Old');
    const post = (action: string) => asPerson(test, crew.author).post(`${boards}/${slug}/${action}`);
    const retired = await post('retire');
    expect([retired.status, retired.body.isRetired, retired.headers.etag]).toEqual([200, true, '"2"']);
    expect((await post('retire')).headers.etag).toBe('"2"');
    const refused = await revise(crew.author, slug, '"2"', named('Old'));
    expect([refused.status, refused.body.detail]).toEqual([
      409,
      'The board is retired; restore it, then save.',
    ]);
    const slugsOf = async (retiredOnes: string) =>
      (await read(`?retired=${retiredOnes}&limit=100`)).body.items.map((item: { slug: string }) => item.slug);
    expect(await slugsOf('no')).not.toContain(slug);
    expect(await slugsOf('yes')).toContain(slug);
    expect((await read(`/${slug}`)).status).toBe(200);
    expect((await post('restore')).body).toMatchObject({ isRetired: false, version: 3 });
    expect(await slugsOf('no')).toContain(slug);
  });
});

describe('a copy', () => {
  it('is a board of its own, of the newest or of a named revision', async () => {
    const { slug } = await save('Model');
    await revise(crew.author, slug, '"1"', named('Model', { bits: 4 }));
    const copy = (body?: object) => asPerson(test, crew.author).post(`${boards}/${slug}/copy`, body);
    const plain = await copy();
    expect(plain.status, plain.text).toBe(201);
    expect(plain.body).toMatchObject({ slug: 'model-copy', name: 'Model copy', bits: 4, latestRevision: 1 });
    expect(plain.body.board).toEqual({ ...parseBoard(named('Model', { bits: 4 })), name: 'Model copy' });
    const older = await copy({ revision: 1, name: 'Model of old' });
    expect(older.body).toMatchObject({ slug: 'model-of-old', bits: 8 });
    expect((await copy({ revision: 9 })).status).toBe(404);
    const long = await save('x'.repeat(64));
    const cut = await asPerson(test, crew.author).post(`${boards}/${long.slug}/copy`);
    expect(cut.body.name).toBe(`${'x'.repeat(59)} copy`);
  });
});

describe('the list', () => {
  it('goes by name, page by page, and a cursor is good for its own list only', async () => {
    const names: string[] = [];
    let cursor: string | null = null;
    do {
      const page = boardsPageSchema.parse(
        (await read(`?limit=3${cursor === null ? '' : `&cursor=${cursor}`}`)).body,
      );
      names.push(...page.items.map(({ name }) => name));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect(names.length).toBeGreaterThan(8);
    expect(names).toEqual([...names].sort((a, b) => a.localeCompare(b, 'en', { sensitivity: 'base' })));
    const { nextCursor } = (await read('?limit=1')).body;
    expect((await read(`?retired=yes&cursor=${nextCursor}`)).status).toBe(422);
    expect((await read('?retired=perhaps')).status).toBe(422);
  });
});

it('every change of a board is in the audit chain, in order', async () => {
  const { slug } = await save('Noted');
  await revise(crew.author, slug, '"1"', named('Noted'), 'why');
  for (const action of ['retire', 'restore', 'copy'])
    await asPerson(test, crew.author).post(`${boards}/${slug}/${action}`);
  const events = await test.database.db
    .select({ action: auditEvents.action, subject: auditEvents.subject, details: auditEvents.details })
    .from(auditEvents)
    .where(eq(auditEvents.teamId, crew.team.id));
  const own = events.filter(({ subject }) => /:noted(-copy)?$/.test(subject));
  const digest = expect.stringMatching(/^[0-9a-f]{64}$/);
  expect(own).toEqual([
    { action: 'board.created', subject: 'board:noted', details: { name: 'Noted', digest } },
    {
      action: 'board.revised',
      subject: 'board:noted',
      details: { name: 'Noted', number: 2, note: 'why', digest },
    },
    { action: 'board.retired', subject: 'board:noted', details: { name: 'Noted' } },
    { action: 'board.restored', subject: 'board:noted', details: { name: 'Noted' } },
    {
      action: 'board.copied',
      subject: 'board:noted-copy',
      details: { name: 'Noted copy', from: { slug: 'noted', number: 2 }, digest },
    },
  ]);
  expect(await verifyChain(test.database.db, test.deps.config.auditKey, crew.team.id)).toMatchObject({
    events: events.length,
  });
});
