import {
  chmodSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  realpathSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir, userInfo } from 'node:os';
import { join } from 'node:path';
import { SetupFault } from './run.mjs';

/** sun_path holds 108 bytes with the closing zero (unix(7)); a little is left for what appends to it. */
const longestSocketPath = 100;

const fits = (path) => Buffer.byteLength(path) <= longestSocketPath;

/** The files of one private server, all in `folder`, which only its owner may enter. */
export function databasePlace(folder) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  chmodSync(folder, 0o700);
  const real = realpathSync(folder);
  for (const name of ['users', 'tmp']) mkdirSync(join(real, name), { recursive: true });
  return {
    folder: real,
    data: join(real, 'data'),
    marker: join(real, 'ready'),
    pidFile: join(real, 'pid'),
    // Its own: a server that starts clears the temporary tables of every other one it shares the folder with.
    tmp: join(real, 'tmp'),
    log: join(real, 'error.log'),
    users: join(real, 'users'),
    socket: socketPath(real),
    user: userName(),
  };
}

/** In the folder itself; where that path is too long, in a 0700 folder of the system's temporary one. */
function socketPath(folder) {
  const inside = join(folder, 's.sock');
  if (fits(inside)) return inside;
  const note = join(folder, 'socket-folder');
  const noted = ownFolder(read(note));
  if (noted) return join(noted, 's.sock');
  const base = fits(join(tmpdir(), 'stepwell-XXXXXX', 's.sock')) ? tmpdir() : '/tmp';
  const made = mkdtempSync(join(base, 'stepwell-'));
  writeFileSync(note, made);
  return join(made, 's.sock');
}

/** The folder if it is still there and nobody else could have put it there. */
function ownFolder(path) {
  if (!path) return undefined;
  try {
    const stat = lstatSync(path);
    return stat.isDirectory() && stat.uid === process.getuid() && (stat.mode & 0o077) === 0
      ? path
      : undefined;
  } catch {
    return undefined;
  }
}

function read(file) {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return undefined;
  }
}

function userName() {
  try {
    return userInfo().username;
  } catch {
    throw new SetupFault(
      `This user (number ${process.getuid()}) has no name in /etc/passwd, and the private MariaDB knows people by name. ` +
        'Give the user a name, or point DATABASE_URL at a server of your own.',
    );
  }
}
