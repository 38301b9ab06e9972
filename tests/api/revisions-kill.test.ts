import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as delay } from 'node:timers/promises';
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
import { sineDefinition } from '../support/library.ts';
import { makePerson, makeTeam, type TestPerson, type TestTeam } from '../support/people.ts';
import { testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

const savers = 4;
const savesOfEach = 50;

let folder: string;
let server: HeldDatabase;
let database: OpenDatabase;
let app: ChildProcess;
let address: string;
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
  await startServer();
  database = openDatabase(url);
  person = await makePerson({ database });
  team = await makeTeam({ database }, [{ person, role: 'author' }]);
});
afterAll(async () => {
  await database.close();
  app.kill('SIGKILL');
  await server.release();
  rmSync(folder, { recursive: true, force: true });
});

/** The built application, as `npm start` runs it; its port is another one each time. */
async function startServer(): Promise<void> {
  app = spawn(process.execPath, [join(projectFolder, 'dist', 'server', 'main.js')], {
    cwd: projectFolder,
    env: {
      ...process.env,
      DATABASE_URL: '',
      PRIVATE_DATABASE_URL: url,
      AUTH_SECRET: testSecret,
      HOST: '127.0.0.1',
      PORT: '0',
      LOG_LEVEL: 'silent',
      DEMO_FILE: '',
    },
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
  });
  const told = new Promise<{ address: string }>((resolve, reject) => {
    app.once('message', (message) => resolve(message as { address: string }));
    app.once('exit', () => reject(new Error('The application did not start.')));
  });
  ({ address } = await told);
}

async function killServer(): Promise<void> {
  const gone = new Promise((resolve) => app.once('exit', resolve));
  app.kill('SIGKILL');
  await gone;
}

/** The holder of the database starts it again. */
async function killDatabase(): Promise<void> {
  const pid = server.pid();
  if (pid === undefined) throw new Error('The database is down already.');
  process.kill(pid, 'SIGKILL');
  await waitUntil('another database process', () => server.pid() !== undefined && server.pid() !== pid);
}

/** Sends the same request, under the same key, until it is answered: as a client does that loses nothing. */
async function insist(path: string, body: object, headers: Record<string, string>): Promise<LibraryTable> {
  for (;;) {
    try {
      const response = await fetch(`${address}/api/v1/teams/${team.slug}/tables${path}`, {
        method: 'POST',
        body: JSON.stringify(body),
        headers: { 'Content-Type': 'application/json', Origin: address, Cookie: person.cookie, ...headers },
      });
      if (response.status === 201) return (await response.json()) as LibraryTable;
      // What went down in the middle of a request is 500 or 503; anything else would be a wrong answer.
      if (response.status < 500)
        throw new Error(`${response.status} ${await response.text()}`, { cause: 'wrong' });
    } catch (error) {
      if (error instanceof Error && error.cause === 'wrong') throw error;
    }
    await delay(50);
  }
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
      await killServer();
      await startServer();
      await reach(140);
      await Promise.all([killDatabase(), killServer()]);
      await startServer();
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
