import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { auditEvents, revisions, uploads, waveTables } from '../../server/db/schema/index.ts';
import { originalLimits, originalsListSchema } from '../../shared/contract/index.ts';
import { toneOf, wavOf } from '../engine/support/recordings.ts';
import { saveTable } from '../support/library.ts';
import { asPerson, makeCrew, type TestPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
});
afterAll(() => test.close());

const freshPath = async (title: string) => {
  const { slug } = await saveTable(test, crew.team, crew.author, title);
  return `/teams/${crew.team.slug}/tables/${slug}/revisions/1/originals`;
};

const keep = (path: string, name: string, bytes: Uint8Array | string, person: TestPerson = crew.author) =>
  asPerson(test, person)
    .post(`${path}?name=${encodeURIComponent(name)}`)
    .set('Content-Type', 'application/octet-stream')
    .send(Buffer.from(bytes as Uint8Array));

const sound = wavOf(toneOf({ frequencyHz: 220, sampleRateHz: 8000, seconds: 0.1, partials: [[1, 0]] }), {
  bits: 16,
  isFloat: false,
  channels: 1,
  sampleRateHz: 8000,
});
const array = 'const uint8_t fog[] = { 1, 2, 3, 4 };\n';

describe('an original', () => {
  it('is kept with its revision and comes back byte by byte, as an attachment and nothing else', async () => {
    const path = await freshPath('Kept');
    const kept = await keep(path, 'fog "horn" ü.wav', sound);
    expect(kept.status, kept.text).toBe(201);
    const sha256 = createHash('sha256').update(sound).digest('hex');
    expect(kept.body).toMatchObject({
      name: 'fog "horn" ü.wav',
      kind: 'recording',
      bytes: sound.length,
      sha256,
    });
    expect(kept.headers.location).toBe(`/api/v1${path}/${kept.body.id}`);

    const sent = await asPerson(test, crew.viewer).get(`${path}/${kept.body.id}`).buffer(true);
    expect(sent.status).toBe(200);
    expect(Buffer.compare(sent.body, Buffer.from(sound))).toBe(0);
    expect(sent.headers).toMatchObject({
      'content-type': 'application/octet-stream',
      'x-content-type-options': 'nosniff',
    });
    expect(sent.headers['content-disposition']).toMatch(/^attachment; filename=/);
    expect(sent.headers['content-encoding']).toBeUndefined();

    const list = originalsListSchema.parse((await asPerson(test, crew.viewer).get(path)).body);
    expect(list.items).toEqual([kept.body]);
    expect(list.items[0].keptBy).toEqual({ id: crew.author.id, name: crew.author.name });
  });

  it.each([
    ['old.c', array, 'c'],
    ['old.s', 'fog: .byte 1, 2, 3\n', 'assembly'],
    ['old.hex', ':0300300002337A1E\n:00000001FF\n', 'intel-hex'],
    ['old.txt', 't;volts\n0;0.5\n1;0.75\n', 'columns'],
    ['named-wrongly.wav', array, 'c'],
  ])('is known by what is in it, not by its name: %s', async (name, text, kind) => {
    expect((await keep(await freshPath('Known'), name, text)).body).toMatchObject({ kind });
  });

  it.each([
    ['picture.png', Buffer.from('\x89PNG\r\n\x1a\n\0\0', 'latin1'), 'a NUL byte at offset 8'],
    ['empty.c', '', 'an empty file'],
    ['cut.wav', sound.slice(0, 100), 'a header that claims'],
    ['open.c', 'u8 a[] = { 1,\n 2', '"{" that is never closed'],
    ['sum.hex', ':0300300002337A1F\n:00000001FF\n', 'checksum "1F"'],
  ])('is refused where nothing can be made of it, and nothing is kept: %s', async (name, bytes, value) => {
    const path = await freshPath('Refused');
    const refused = await keep(path, name, bytes);
    expect(refused.status, refused.text).toBe(422);
    expect(refused.body.errors[0].value).toContain(value);
    expect((await asPerson(test, crew.viewer).get(path)).body.items).toEqual([]);
  });

  it('is refused with a name that is none, as another type, and over 8 MB', async () => {
    const path = await freshPath('Names');
    for (const name of ['', ' ', '../x.c', 'a\\b.c', 'two\nlines.c', 'x'.repeat(121)]) {
      expect((await keep(path, name, array)).status, name).toBe(422);
    }
    expect((await asPerson(test, crew.author).post(`${path}?name=x.c`, { text: array })).status).toBe(415);
    expect((await keep(path, 'x.c', Buffer.alloc(originalLimits.bytes + 1, 49))).status).toBe(413);
  });

  it('is kept once however often and at how many times it comes', async () => {
    const path = await freshPath('Once');
    const key = (by: string) => keep(path, 'old.c', array).set('Idempotency-Key', by);
    const answers = await Promise.all([
      key('first'),
      key('first'),
      keep(path, 'again.c', array),
      keep(path, 'old.c', array),
    ]);
    expect(answers.map(({ status }) => status).every((status) => status === 200 || status === 201)).toBe(
      true,
    );
    expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1);
    expect((await asPerson(test, crew.viewer).get(path)).body.items).toHaveLength(1);
    const other = await keep(path, 'new.c', `${array}\n`).set('Idempotency-Key', 'first');
    expect(other.status).toBe(422);
  });

  it('has an event for its coming and its going, in the same transaction', async () => {
    const path = await freshPath('Told');
    const slug = path.split('/')[4];
    const { body } = await keep(path, 'old.c', array);
    expect((await asPerson(test, crew.author).delete(`${path}/${body.id}`)).status).toBe(403);
    expect((await asPerson(test, crew.admin).delete(`${path}/${body.id}`)).status).toBe(204);
    expect((await asPerson(test, crew.admin).delete(`${path}/${body.id}`)).status).toBe(404);
    const events = await test.database.db
      .select({ action: auditEvents.action, details: auditEvents.details })
      .from(auditEvents)
      .where(and(eq(auditEvents.teamId, crew.team.id), eq(auditEvents.subject, `table:${slug}`)));
    expect(events.map(({ action }) => action)).toEqual([
      'table.created',
      'original.kept',
      'original.removed',
    ]);
    expect(events[1].details).toMatchObject({ number: 1, name: 'old.c', kind: 'c', bytes: array.length });
  });

  it('of another team, or of another revision, is none', async () => {
    const other = await makeCrew(test);
    const { slug } = await saveTable(test, other.team, other.author, 'Theirs');
    const theirs = `/teams/${other.team.slug}/tables/${slug}/revisions/1/originals`;
    const { body } = await keep(theirs, 'old.c', array, other.author);
    const own = await freshPath('Ours');
    for (const path of [own, theirs]) {
      expect((await asPerson(test, crew.admin).get(`${path}/${body.id}`)).status).toBe(404);
      expect((await asPerson(test, crew.admin).delete(`${path}/${body.id}`)).status).toBe(404);
    }
    expect((await asPerson(test, crew.admin).get(`${own}/x`)).status).toBe(404);
    expect((await asPerson(test, other.viewer).get(theirs)).body.items).toHaveLength(1);
  });

  it('finds no room where the team or the revision is full; two at once cannot share the last of it', async () => {
    const own = await makeCrew(test);
    const { slug } = await saveTable(test, own.team, own.author, 'Full');
    const path = `/teams/${own.team.slug}/tables/${slug}/revisions/1/originals`;
    const [{ id: revisionId }] = await test.database.db
      .select({ id: revisions.id })
      .from(revisions)
      .innerJoin(waveTables, eq(waveTables.id, revisions.tableId))
      .where(and(eq(waveTables.teamId, own.team.id), eq(waveTables.slug, slug)));
    // Its size as told by the row is what counts: half a gigabyte need not be sent.
    const row = { teamId: own.team.id, revisionId, name: 'x', kind: 'c' as const, content: Buffer.from('x') };
    await test.database.db
      .insert(uploads)
      .values({ ...row, bytes: originalLimits.teamBytes - 50, sha256: 'a' });
    const both = await Promise.all([
      keep(path, 'a.c', array, own.author),
      keep(path, 'b.c', `${array}\n`, own.author),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(both.find(({ status }) => status === 409)?.body.detail).toContain('An admin can remove old ones.');
    expect((await asPerson(test, own.viewer).get(path)).body).toMatchObject({ teamBytesAtMost: 524_288_000 });

    await test.database.db.delete(uploads).where(eq(uploads.sha256, 'a'));
    await test.database.db
      .insert(uploads)
      .values(Array.from({ length: 19 }, (_, i) => ({ ...row, bytes: 1, sha256: `b${i}` })));
    const full = await keep(path, 'c.c', `${array} `, own.author);
    expect([full.status, full.body.detail]).toEqual([
      409,
      'The revision has 20 originals, as many as it may.',
    ]);
  });
});
