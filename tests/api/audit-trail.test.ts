import { spawnSync } from 'node:child_process';
import type { Readable } from 'node:stream';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { auditEvents } from '../../server/db/schema/index.ts';
import type { AuditEvent } from '../../shared/contract/index.ts';
import { asPerson, makeCrew, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  await test.database.db
    .insert(auditEvents)
    .values([
      event(1, crew.admin, 'team.created', `team:${crew.team.slug}`, '2026-03-30T09:00:00.000Z'),
      event(2, crew.author, 'table.created', 'table:fog-signal', '2026-03-30T23:59:59.999Z'),
      event(3, crew.author, 'revision.submitted', 'table:fog-signal', '2026-03-31T00:00:00.000Z'),
      event(4, crew.reviewer, 'revision.vetted', 'table:fog-signal', '2026-03-31T12:00:00.000Z'),
      event(5, crew.author, 'table.created', 'table:fog-signal-2', '2026-03-31T23:59:59.999Z'),
      event(6, crew.reviewer, 'revision.returned', 'table:fog-signal-2', '2026-04-01T00:00:00.000Z'),
      event(7, crew.author, 'revisions.looked-at', 'table:fog-signal', '2026-04-02T00:00:00.000Z'),
    ]);
});
afterAll(() => test.close());

/** A row that is only listed, so that its MAC need not fit. */
function event(
  sequence: number,
  actor: TestPerson,
  action: string,
  subject: string,
  at: string,
  details = {},
) {
  const { id: actorId, name: actorName } = actor;
  return {
    ...{ teamId: crew.team.id, sequence, actorId, actorName, action, subject, details },
    at: new Date(at),
    mac: '0'.repeat(64),
  };
}

const get = (query = '', person = crew.reviewer, team = crew.team.slug) =>
  asPerson(test, person).get(`/teams/${team}/audit${query}`);
const found = async (query: string) =>
  ((await get(query).expect(200)).body.items as AuditEvent[]).map(({ sequence }) => sequence);

describe('the audit trail', () => {
  it('lists events newest first, each with who did what to what when', async () => {
    const { body } = await get();
    expect(body.nextCursor).toBeNull();
    expect((body.items as AuditEvent[]).map(({ sequence }) => sequence)).toEqual([7, 6, 5, 4, 3, 2, 1]);
    expect(body.items[3]).toEqual({
      sequence: 4,
      at: '2026-03-31T12:00:00.000Z',
      actor: { id: crew.reviewer.id, name: 'Rhea Sound' },
      action: 'revision.vetted',
      subject: 'table:fog-signal',
      details: {},
    });
  });

  it.each([
    ['action=revision.vetted', [4]],
    // With its dot, so that `revisions.` is another kind.
    ['action=revision.', [6, 4, 3]],
    ['subject=table:fog-signal', [7, 4, 3, 2]],
    ['from=2026-03-31', [7, 6, 5, 4, 3]],
    ['to=2026-03-31', [5, 4, 3, 2, 1]],
    ['from=2026-03-31&to=2026-03-31', [5, 4, 3]],
    ['action=revision.&subject=table:fog-signal&from=2026-03-31&to=2026-03-31', [4, 3]],
    ['subject=table:fog', []],
    ['from=0001-01-01&to=9999-12-31&action=team.', [1]],
  ])('finds by %s', async (query, sequences) => {
    expect(await found(`?${query}`)).toEqual(sequences);
  });

  it('finds by person, alone and with the other filters', async () => {
    expect(await found(`?actor=${crew.author.id}`)).toEqual([7, 5, 3, 2]);
    expect(await found(`?actor=${crew.author.id}&action=table.created&to=2026-03-30`)).toEqual([2]);
    expect(await found('?actor=999999999999999')).toEqual([]);
  });

  it('goes on page by page, for the same filters only', async () => {
    const seen: number[] = [];
    let cursor = '';
    for (let page = 0; page < 4; page++) {
      const { body } = await get(`?limit=2&to=2026-04-01${cursor && `&cursor=${cursor}`}`).expect(200);
      seen.push(...(body.items as AuditEvent[]).map(({ sequence }) => sequence));
      if (body.nextCursor === null) break;
      cursor = body.nextCursor;
    }
    expect(seen).toEqual([6, 5, 4, 3, 2, 1]);
    expect((await get(`?limit=2&cursor=${cursor}`)).status).toBe(422);
    const other = await makeTeam(test, [{ person: crew.reviewer, role: 'reviewer' }]);
    expect((await get('', crew.reviewer, other.slug)).body).toEqual({ items: [], nextCursor: null });
    expect((await get(`?actor=${crew.author.id}`, crew.reviewer, other.slug)).body.items).toEqual([]);
    expect((await get(`?limit=2&to=2026-04-01&cursor=${cursor}`, crew.reviewer, other.slug)).status).toBe(
      422,
    );
  });

  it.each([
    ['actor=me', 'actor'],
    ['action=Revision', 'action'],
    ['action=revision', 'action'],
    ['from=2026-02-30', 'from'],
    ['to=tomorrow', 'to'],
    ['from=2026-04-02&to=2026-04-01', 'to'],
    ['limit=0', 'limit'],
    ['kind=all', 'kind'],
  ])('refuses %s and says where', async (query, path) => {
    for (const file of ['audit', 'audit.csv']) {
      const response = await asPerson(test, crew.admin).get(`/teams/${crew.team.slug}/${file}?${query}`);
      expect(response.status).toBe(422);
      expect((response.body.errors as { path: string }[]).map((error) => error.path)).toEqual([path]);
    }
  });
});

const csv = (query = '', person = crew.admin, team = crew.team.slug) =>
  asPerson(test, person).get(`/teams/${team}/audit.csv${query}`);

/** As another program reads it: Python's csv module, strict. */
function readCsv(text: string): string[][] {
  const program = 'import csv,json,sys; print(json.dumps(list(csv.reader(sys.stdin, strict=True))))';
  const { stdout, stderr, status } = spawnSync('python3', ['-c', program], { input: text, encoding: 'utf8' });
  if (status !== 0) throw new Error(stderr);
  return JSON.parse(stdout) as string[][];
}

describe('the audit trail as CSV', () => {
  it('is an attachment with the same events for the same filters', async () => {
    const response = await csv('?action=revision.&to=2026-03-31').expect(200);
    expect(response.headers).toMatchObject({
      'content-type': 'text/csv; charset=utf-8; header=present',
      'content-disposition': `attachment; filename=audit-${crew.team.slug}.csv`,
      'x-content-type-options': 'nosniff',
      'cache-control': 'no-store',
    });
    expect(response.text.endsWith('\r\n')).toBe(true);
    expect(response.text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    expect(readCsv(response.text)).toEqual([
      ['sequence', 'at', 'actorId', 'actor', 'action', 'subject', 'details'],
      [
        '4',
        '2026-03-31T12:00:00.000Z',
        String(crew.reviewer.id),
        'Rhea Sound',
        'revision.vetted',
        'table:fog-signal',
        '{}',
      ],
      [
        '3',
        '2026-03-31T00:00:00.000Z',
        String(crew.author.id),
        'Aldo Brine',
        'revision.submitted',
        'table:fog-signal',
        '{}',
      ],
    ]);
    const none = await csv('?action=nothing.').expect(200);
    expect(readCsv(none.text)).toHaveLength(1);
  });

  it('keeps every text, and none that a spreadsheet would take for a formula', async () => {
    const names = [
      '=1+1',
      '+1',
      '-1',
      '@SUM(A1)',
      '\t=1',
      '\r=1',
      '=1\n+2',
      'Ines "the Ear", \r\nMarlow',
      "'=1",
      'é\u{1f6a2}',
    ];
    const people = await Promise.all(names.map((name) => makePerson(test, name)));
    const team = await makeTeam(test, [{ person: crew.admin, role: 'admin' }]);
    await test.database.db.insert(auditEvents).values(
      people.map((person, index) => ({
        ...event(index + 1, person, 'table.created', 'table:x', '2026-03-30T09:00:00.000Z', {
          change: -1 - index,
          text: '=1',
        }),
        teamId: team.id,
      })),
    );
    const { text } = await csv('', crew.admin, team.slug).expect(200);
    const rows = readCsv(text).slice(1).reverse();
    expect(rows.map((row) => row[3])).toEqual(
      names.map((name) => (/^[=+\-@\t\r]/.test(name) ? `'${name}` : name)),
    );
    expect(rows.map((row) => row[0])).toEqual(names.map((_name, index) => String(index + 1)));
    expect(rows.map((row) => JSON.parse(row[6]))).toEqual(
      names.map((_name, index) => ({ change: -1 - index, text: '=1' })),
    );
  });

  it('is whole beyond what is read at once, and is left off where nobody takes it', async () => {
    const team = await makeTeam(test, [{ person: crew.admin, role: 'admin' }]);
    const count = 2_500;
    const rows = Array.from({ length: count }, (_none, index) => ({
      ...event(index + 1, crew.author, 'table.created', `table:t-${index}`, '2026-03-30T09:00:00.000Z', {
        title: 'Fog signal '.repeat(5),
      }),
      teamId: team.id,
    }));
    await test.database.db.insert(auditEvents).values(rows);
    const { text } = await csv('', crew.admin, team.slug).expect(200);
    const sequences = readCsv(text)
      .slice(1)
      .map(([sequence]) => Number(sequence));
    expect(sequences).toEqual(Array.from({ length: count }, (_none, index) => count - index));
    const some = await csv('?subject=table:t-7', crew.admin, team.slug);
    expect(readCsv(some.text)).toHaveLength(2);

    const request = csv('', crew.admin, team.slug);
    request.buffer(false).parse((response: unknown) => (response as Readable).destroy());
    await request.then(
      () => undefined,
      () => undefined,
    );
    expect(await found('?action=team.')).toEqual([1]);
  });
});
