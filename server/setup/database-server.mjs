import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { connect } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import { isAlive, processName, runsWith } from './processes.mjs';
import { findProgram } from './programs.mjs';
import { run, SetupFault } from './run.mjs';

const asRoot = () => (process.getuid() === 0 ? ['--user=root'] : []);

/** Long enough for a crash recovery of a large database; a healthy start takes 0.2 s. */
const startSeconds = 120;
const stopSeconds = 60;

/** Whether a MariaDB greets on the socket: its first packet carries protocol version 10 after a 4-byte header. */
export const greets = (socketPath) =>
  new Promise((resolve) => {
    const socket = connect(socketPath);
    const answer = (value) => {
      socket.destroy();
      resolve(value);
    };
    socket.setTimeout(2000, () => answer(false));
    socket.on('error', () => answer(false)).on('close', () => resolve(false));
    socket.on('data', (packet) => answer(packet[4] === 10));
  });

/** The process number of the server on this data folder, or undefined where none lives. */
export function serverPid(place) {
  try {
    const pid = Number(readFileSync(place.pidFile, 'utf8'));
    return runsWith(pid, `--datadir=${place.data}`) ? pid : undefined;
  } catch {
    return undefined;
  }
}

/** Starts the server unless it is up; one that was left behind by a killed process is taken over. */
export async function ensureServer(place) {
  if (await greets(place.socket)) return;
  const left = serverPid(place);
  if (left !== undefined && (await comesUp(place, () => serverPid(place) === left))) return;
  await createData(place);
  await launch(place);
}

async function createData(place) {
  if (existsSync(place.marker)) return;
  // Without the marker an earlier try was cut off: what it left is not a database.
  rmSync(place.data, { recursive: true, force: true });
  const { status, text } = await run(
    findProgram('mariadb-install-db') ?? 'mariadb-install-db',
    [
      '--no-defaults',
      ...asRoot(),
      `--datadir=${place.data}`,
      '--auth-root-authentication-method=socket',
      `--auth-root-socket-user=${place.user}`,
      '--skip-test-db',
    ],
    { output: 'collect', env: { TMPDIR: place.tmp } },
  );
  if (status !== 0) throw new SetupFault(`${text}\nMariaDB could not lay out its data folder ${place.data}.`);
  writeFileSync(place.marker, 'The data folder beside this file is complete.\n');
}

async function launch(place) {
  const log = openSync(place.log, 'a');
  const server = spawn(
    findProgram('mariadbd') ?? 'mariadbd',
    [
      '--no-defaults',
      ...asRoot(),
      `--datadir=${place.data}`,
      `--socket=${place.socket}`,
      `--pid-file=${place.pidFile}`,
      `--tmpdir=${place.tmp}`,
      '--skip-networking',
      '--character-set-server=utf8mb4',
      '--collation-server=utf8mb4_uca1400_ai_ci',
      '--default-time-zone=+00:00',
      '--innodb-buffer-pool-size=256M',
      '--max-allowed-packet=64M',
      `--log-error=${place.log}`,
    ],
    // Detached: Ctrl-C in the terminal must not reach it before the application has let go of it.
    { detached: true, stdio: ['ignore', log, log] },
  );
  closeSync(log);
  let alive = true;
  server.once('exit', () => (alive = false)).once('error', () => (alive = false));
  server.unref();
  if (await comesUp(place, () => alive)) return;
  const tail = existsSync(place.log) ? readFileSync(place.log, 'utf8').split('\n').slice(-12).join('\n') : '';
  throw new SetupFault(
    `${tail}\nMariaDB did not start; its last words stand above, all of them in ${place.log}.`,
  );
}

/** Waits until the server greets (true) or `lives` says that there is nothing to wait for (false). */
async function comesUp(place, lives) {
  const end = Date.now() + startSeconds * 1000;
  while (Date.now() < end) {
    if (await greets(place.socket)) return true;
    if (!lives()) return false;
    await delay(15);
  }
  return false;
}

/** Ends the server in good order and waits until it is gone. */
export async function stopServer(place) {
  const pid = serverPid(place);
  if (pid === undefined) return;
  const name = processName(pid) ?? '';
  process.kill(pid, 'SIGTERM');
  const end = Date.now() + stopSeconds * 1000;
  while (isAlive(name)) {
    if (Date.now() > end) {
      throw new SetupFault(
        `MariaDB (process ${pid}) has not ended within ${stopSeconds} s; see ${place.log}.`,
      );
    }
    await delay(20);
  }
}
