import { existsSync, lstatSync, mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { sql } from 'drizzle-orm';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readConfig } from '../../server/config.ts';
import { openDatabase } from '../../server/db/client.ts';
import { createDatabase, migrate } from '../../server/db/migrate.ts';
import { holdDatabase, type HeldDatabase } from '../../server/setup/database.mjs';
import { host, makeTestApp, testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

let folder: string;
const held: HeldDatabase[] = [];
const hold = async (where = join(folder, 'mariadb')) => {
  const database = await holdDatabase(where);
  held.push(database);
  return database;
};

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stepwell-db-'));
});
afterEach(async () => {
  for (const database of held.splice(0)) await database.release();
  rmSync(folder, { recursive: true });
});

const ask = async (url: string) => {
  const { db, close } = openDatabase(url);
  try {
    return await db.execute(sql`SELECT 1`);
  } finally {
    await close();
  }
};

describe('the private database', () => {
  it('lies in a folder of its owner alone and is gone when the last holder lets go', async () => {
    const [first, second] = await Promise.all([hold(), hold()]);
    expect(statSync(join(folder, 'mariadb')).mode & 0o777).toBe(0o700);
    expect(first.pid()).toBe(second.pid());
    await first.release();
    await ask(second.urlOf('mysql'));
    await second.release();
    expect(second.pid()).toBeUndefined();
    expect(existsSync(second.socket)).toBe(false);
  });

  it('keeps two projects apart', async () => {
    const [one, other] = await Promise.all([hold(join(folder, 'one')), hold(join(folder, 'other'))]);
    expect(one.pid()).not.toBe(other.pid());
    await one.release();
    await ask(other.urlOf('mysql'));
  });

  it('is laid out anew where the first try was cut off', async () => {
    const database = await hold();
    await database.release();
    rmSync(join(folder, 'mariadb', 'ready'));
    rmSync(join(folder, 'mariadb', 'data', 'ibdata1'));
    await ask((await hold()).urlOf('mysql'));
  });

  it('puts its socket elsewhere, in a private folder, where the path would be too long for one', async () => {
    const long = join(folder, 'a-folder-with-quite-a-long-name', 'x'.repeat(100), 'mariadb');
    const database = await hold(long);
    expect(database.socket.startsWith(long)).toBe(false);
    expect(lstatSync(dirname(database.socket)).mode & 0o777).toBe(0o700);
    await ask(database.urlOf('mysql'));
    await database.release();
    expect((await hold(long)).socket).toBe(database.socket);
    rmSync(dirname(database.socket), { recursive: true, force: true });
  });

  it('comes back after kill -9 with every row that was acknowledged, and the application goes on', async () => {
    const server = await hold();
    const url = server.urlOf('stepwell_test_recovery');
    await createDatabase(url);
    await migrate(url);
    const test = makeTestApp({
      config: readConfig({ PRIVATE_DATABASE_URL: url, AUTH_SECRET: testSecret }),
      database: openDatabase(url),
    });
    const { db } = test.database;
    await db.execute(sql`CREATE TABLE noted (number INT PRIMARY KEY)`);

    let acknowledged = 0;
    const killed = server.pid() ?? 0;
    const writing = (async () => {
      for (;;) {
        await db.execute(sql`INSERT INTO noted VALUES (${acknowledged})`);
        acknowledged++;
      }
    })().catch(() => 'the connection broke');
    await waitUntil('some rows', () => acknowledged > 50);
    process.kill(killed, 'SIGKILL');
    expect(await writing).toBe('the connection broke');

    await waitUntil('a new server', () => server.pid() !== undefined && server.pid() !== killed);
    await waitUntil('health', async () => {
      const { status, text } = await request(test.app).get('/api/v1/health').set('Host', host);
      if (status === 200) return true;
      throw new Error(text);
    });
    const [[row]] = (await db.execute(sql`SELECT COUNT(*) AS count FROM noted`)) as unknown as [
      [{ count: number }],
    ];
    // One more may have been written whose answer was lost.
    expect([acknowledged, acknowledged + 1]).toContain(row.count);
    await test.close();
  });
});
