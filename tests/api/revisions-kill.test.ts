import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { verifyChain } from '../../server/audit/verify-chain.ts';
import { deriveAuditKey } from '../../server/audit/mac.ts';
import { openDatabase, type OpenDatabase } from '../../server/db/client.ts';
import { revisions, waveTables } from '../../server/db/schema/index.ts';
import { unpackCodes } from '../../server/features/tables/stored-codes.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { ensureBuilt } from '../../server/setup/build.mjs';
import { holdDatabase, type HeldDatabase } from '../../server/setup/database.mjs';
import { withLock } from '../../server/setup/lock.mjs';
import type { Definition, LibraryTable } from '../../shared/contract/index.ts';
import { digestOf } from '../../shared/firmware/index.ts';
import { killableApp, type KillableApp } from '../support/killable-app.ts';
import { sineDefinition } from '../support/library.ts';
import { makePerson, makeTeam, type TestPerson, type TestTeam } from '../support/people.ts';
import { testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

const savers = 4;
const savesOfEach = 50;

let folder: string;
let server: HeldDatabase;
let database: OpenDatabase;
let app: KillableApp;
let url: string;
let person: TestPerson;
let team: TestTeam;

beforeAll(async () => {
  await withLock(`set-up ${projectFolder}`, () =>
    Promise.all([ensureBuilt('client'), ensureBuilt('server')]),
  );
  folder = mkdtempSync(join(tmpdir(), 'stepwell-kill-'));
  server = await holdDatabase(join(folder, 'mariadb'));
  url = server.urlOf('stepwell_test_kill');
  app = killableApp(url);
  await app.start();
  database = openDatabase(url);
  person = await makePerson({ database });
  team = await makeTeam({ database }, [{ person, role: 'author' }]);
});
afterAll(async () => {
  await database.close();
  await app.kill();
  await server.release();
  rmSync(folder, { recursive: true, force: true });
});

/** The holder of the database starts it again. */
async function killDatabase(): Promise<void> {
  const pid = server.pid();
  if (pid === undefined) throw new Error('The database is down already.');
  process.kill(pid, 'SIGKILL');
  await waitUntil('another database process', () => server.pid() !== undefined && server.pid() !== pid);
}

async function insist(path: string, body: object, headers: Record<string, string>): Promise<LibraryTable> {
  const answer = await app.insist(person, `/teams/${team.slug}/tables${path}`, body, headers);
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body as LibraryTable;
}

it(
  'keeps every acknowledged save, once, through kill -9 of the application and of MariaDB',
  { timeout: 180_000 },
  async () => {
    const acknowledged: { slug: string; number: number; digest: string; note: string }[] = [];
    const note = (saver: number, save: number) => `saver ${saver}, save ${save}`;

    async function saveAll(saver: number): Promise<void> {
      let table: LibraryTable | undefined;
      for (let save = 1; save <= savesOfEach; save += 1) {
        const body = {
          definition: sineDefinition('Kill', { seed: 100 * saver + save, dither: 'triangular' }),
          note: note(saver, save),
        };
        const key = { 'Idempotency-Key': `kill-${saver}-${save}` };
        table = table
          ? await insist(`/${table.slug}/revisions`, body, { ...key, 'If-Match': `"${table.version}"` })
          : await insist('', { ...body, title: `Saver ${saver}` }, key);
        const [{ number, digest }] = table.revisions;
        acknowledged.push({ slug: table.slug, number, digest, note: body.note });
      }
    }

    /** In the middle: while others are being sent. */
    const reach = (count: number) => waitUntil(`${count} saves`, () => acknowledged.length >= count, 60);

    async function disturb(): Promise<void> {
      await reach(40);
      await killDatabase();
      await reach(90);
      await app.kill();
      await app.start();
      await reach(140);
      await Promise.all([killDatabase(), app.kill()]);
      await app.start();
    }
    await Promise.all([...Array.from({ length: savers }, (_, saver) => saveAll(saver)), disturb()]);
    expect(acknowledged).toHaveLength(savers * savesOfEach);

    const { db } = database;
    for (let saver = 0; saver < savers; saver += 1) {
      const slug = `saver-${saver}`;
      const [table] = await db.select().from(waveTables).where(eq(waveTables.slug, slug));
      const saved = await db
        .select()
        .from(revisions)
        .where(eq(revisions.tableId, table.id))
        .orderBy(asc(revisions.number));
      expect(saved.map(({ number }) => number)).toEqual(
        Array.from({ length: savesOfEach }, (_, index) => index + 1),
      );
      expect(table.latestRevision).toBe(savesOfEach);
      for (const { number, digest, definition, engineVersion, codes, note: kept } of saved) {
        expect(kept).toBe(note(saver, number));
        expect(acknowledged).toContainEqual({ slug, number, digest, note: kept });
        expect(digest).toBe(
          digestOf({ definition: definition as Definition, engineVersion, codes: unpackCodes(codes) }),
        );
      }
    }
    expect(await verifyChain(db, deriveAuditKey(testSecret), team.id)).toMatchObject({
      events: savers * savesOfEach,
    });
  },
);
