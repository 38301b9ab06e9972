import { readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { databasePlace } from './database-place.mjs';
import { ensureServer, serverPid, stopServer } from './database-server.mjs';
import { withLock } from './lock.mjs';
import { isAlive, processName } from './processes.mjs';

/** How often a holder looks whether the server still lives, in ms. */
const watchInterval = 1000;

/**
 * Starts or joins the private MariaDB in `folder`. The server runs as long as any process holds it: the last one
 * to let go stops it. A server that dies while held is started again.
 *
 * Answers `urlOf(name)`, the URL of one database on it, and `release()`.
 */
export async function holdDatabase(folder) {
  const place = databasePlace(folder);
  const ticket = join(place.users, `${processName(process.pid)}-${ticketsDrawn++}`);
  const locked = (work) => withLock(`database ${place.folder}`, work);

  await locked(async () => {
    await ensureServer(place);
    writeFileSync(ticket, '');
  });

  let released = false;
  let mending = false;
  const watch = setInterval(async () => {
    if (mending || released || serverPid(place) !== undefined) return;
    mending = true;
    try {
      await locked(() => (released ? undefined : ensureServer(place)));
    } catch (error) {
      console.error(error.message);
    } finally {
      mending = false;
    }
  }, watchInterval);
  watch.unref();

  return {
    socket: place.socket,
    pid: () => serverPid(place),
    urlOf: (name) =>
      `mysql://${encodeURIComponent(place.user)}@localhost/${name}?socketPath=${encodeURIComponent(place.socket)}`,
    release: async () => {
      if (released) return;
      released = true;
      clearInterval(watch);
      await locked(async () => {
        rmSync(ticket, { force: true });
        if (!othersHold(place)) await stopServer(place);
      });
    },
  };
}

/** `holdDatabase` until the script ends, also where it ends while the server is still on its way. */
export function holdDatabaseUntilEnd(folder, onStop) {
  const holding = holdDatabase(folder);
  onStop(() =>
    holding.then(
      (database) => database.release(),
      () => {},
    ),
  );
  return holding;
}

let ticketsDrawn = 0;

function othersHold(place) {
  let held = false;
  for (const ticket of readdirSync(place.users)) {
    if (isAlive(ticket.split('-', 2).join('-'))) held = true;
    else rmSync(join(place.users, ticket), { force: true });
  }
  return held;
}
