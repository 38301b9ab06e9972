import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startApp } from '../../server/setup/app-process.mjs';
import { ensureBuilt } from '../../server/setup/build.mjs';
import { projectFolder } from '../../server/project-folder.ts';
import { withLock } from '../../server/setup/lock.mjs';
import { holdTestServer, makeTestDatabase } from './databases.ts';

/** Playwright's global set-up: the built application, as people run it, on a database of its own and a free port. */
export default async function setup(): Promise<() => Promise<void>> {
  await withLock(`set-up ${projectFolder}`, () =>
    Promise.all([ensureBuilt('client'), ensureBuilt('server')]),
  );
  const server = await holdTestServer();
  const database = await makeTestDatabase(server, { migrated: false });
  const data = await mkdtemp(join(tmpdir(), 'stepwell-browser-'));
  const app = startApp([join(projectFolder, 'dist', 'server', 'main.js')], {
    HOST: '127.0.0.1',
    PORT: '0',
    DATABASE_URL: '',
    PRIVATE_DATABASE_URL: database.url,
    AUTH_SECRET: 'for the tests only, and known to everybody',
    STEPWELL_DATA: data,
  });
  process.env.STEPWELL_TEST_ADDRESS = await app.ready;
  return async () => {
    await app.stop();
    await database.drop();
    await server.release();
    await rm(data, { recursive: true });
  };
}
