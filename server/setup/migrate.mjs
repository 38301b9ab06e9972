// npm run migrate: the schema of DATABASE_URL, or of the private database, to this version's state.
import { join } from 'node:path';
import { holdDatabaseUntilEnd } from './database.mjs';
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { databasePackages, ensurePackages } from './packages.mjs';
import { dataFolder, inRoot, root } from './paths.mjs';
import { run } from './run.mjs';

await mainScript(async (onStop) => {
  const ownServer = Boolean(process.env.DATABASE_URL);
  await withLock(`set-up ${root}`, async () => {
    if (!ownServer) await ensurePackages(databasePackages);
    await ensureNodeModules();
  });
  const env = {};
  if (!ownServer) {
    const database = await holdDatabaseUntilEnd(join(dataFolder, 'mariadb'), onStop);
    env.PRIVATE_DATABASE_URL = database.urlOf('stepwell');
  }
  const { status } = await run(process.execPath, ['--import', 'tsx', inRoot('server/migrate.ts')], { env });
  return status;
});
