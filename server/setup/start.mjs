// npm start and, with --dev, npm run dev: all the set-up, then the application, then one address to open.
import { join } from 'node:path';
import { startApp } from './app-process.mjs';
import { ensureBuilt } from './build.mjs';
import { holdDatabaseUntilEnd } from './database.mjs';
import { restartOnChange } from './dev-restart.mjs';
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { databasePackages, ensurePackages } from './packages.mjs';
import { dataFolder, inRoot, root } from './paths.mjs';
import { localSecret } from './secrets.mjs';

const dev = process.argv.includes('--dev');
const ownServer = Boolean(process.env.DATABASE_URL);
let open = false;

await mainScript(start, { signalStatus: () => (open ? 0 : undefined) });

async function start(onStop) {
  await withLock(`set-up ${root}`, setUp, {
    onWait: () => console.error('Another set-up is at work in this folder; waiting for it …'),
  });
  const environment = await surroundings(onStop);
  const app = startApp(
    dev ? ['--import', 'tsx', inRoot('server/main.ts'), '--dev'] : [inRoot('dist/server/main.js')],
    environment,
  );
  onStop(app.stop);
  const address = await app.ready;
  open = true;
  console.log(`Stepwell is open at ${address}`);
  return dev ? keepFresh(app, { ...environment, PORT: new URL(address).port }, onStop) : app.ended;
}

async function setUp() {
  if (!ownServer) await ensurePackages(databasePackages);
  await ensureNodeModules();
  if (!dev) await Promise.all([ensureBuilt('client'), ensureBuilt('server')]);
}

/** With the private database the application needs nothing from outside; with another one, all of it. */
async function surroundings(onStop) {
  if (ownServer) return {};
  const database = await holdDatabaseUntilEnd(join(dataFolder, 'mariadb'), onStop);
  return {
    PRIVATE_DATABASE_URL: database.urlOf('stepwell'),
    AUTH_SECRET: process.env.AUTH_SECRET || localSecret(dataFolder),
    DEMO_FILE: join(dataFolder, 'demo-accounts.txt'),
  };
}

/** In development the server is started anew when its sources change; a broken one waits for the next change. */
function keepFresh(first, environment, onStop) {
  let app = first;
  const stopWatching = restartOnChange([inRoot('server'), inRoot('shared')], async () => {
    await app.stop();
    app = startApp(['--import', 'tsx', inRoot('server/main.ts'), '--dev'], environment);
    await app.ready.then(
      (address) => console.log(`Started anew at ${address}`),
      () => console.error('Waiting for the next change …'),
    );
  });
  onStop(() => app.stop());
  onStop(stopWatching);
  return new Promise(() => {});
}
