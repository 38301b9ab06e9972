import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startApp } from '../../server/setup/app-process.mjs';
import { ensureBuilt } from '../../server/setup/build.mjs';
import { projectFolder } from '../../server/project-folder.ts';
import { withLock } from '../../server/setup/lock.mjs';
import { holdTestServer, makeTestDatabase } from './databases.ts';

/** The built application on this machine alone: private database, mailbox; port 0 is any free one. */
export const startBuiltApp = (databaseUrl: string, data: string, port = '0') =>
  startApp([join(projectFolder, 'dist', 'server', 'main.js')], {
    HOST: '127.0.0.1',
    PORT: port,
    DATABASE_URL: '',
    PRIVATE_DATABASE_URL: databaseUrl,
    AUTH_SECRET: 'for the tests only, and known to everybody',
    STEPWELL_DATA: data,
    // People of different tests come from different networks, each with its own quota of sign-ups.
    TRUSTED_PROXIES: 'loopback',
  });

/** Playwright's global set-up: the built application, as people run it, on a database of its own and a free port. */
export default async function setup(): Promise<() => Promise<void>> {
  await withLock(`set-up ${projectFolder}`, () =>
    Promise.all([ensureBuilt('client'), ensureBuilt('server')]),
  );
  const server = await holdTestServer();
  const database = await makeTestDatabase(server, { migrated: false });
  const data = await mkdtemp(join(tmpdir(), 'stepwell-browser-'));
  const app = startBuiltApp(database.url, data);
  process.env.STEPWELL_TEST_ADDRESS = await app.ready;
  return async () => {
    await app.stop();
    await database.drop();
    await server.release();
    await rm(data, { recursive: true });
  };
}
