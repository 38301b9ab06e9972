import { accessSync, constants } from 'node:fs';
import { join } from 'node:path';

/** Debian keeps servers in sbin folders, which an ordinary user's PATH leaves out. */
const sbin = ['/usr/local/sbin', '/usr/sbin', '/sbin'];

const isExecutable = (file) => {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

/** The full path of a program, or undefined where it is not installed. */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? '').split(':'), ...sbin].filter(Boolean);
  return folders.map((folder) => join(folder, name)).find(isExecutable);
}
