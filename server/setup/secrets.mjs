import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** The secret that signs sessions on this machine: made once, 256 random bits, readable by its owner only. */
export function localSecret(folder) {
  const file = join(folder, 'auth-secret');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  try {
    writeFileSync(file, randomBytes(32).toString('base64url'), { flag: 'wx', mode: 0o600 });
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
  }
  return readFileSync(file, 'utf8');
}

/** That secret if there is one. */
export function keptSecret(folder) {
  try {
    return readFileSync(join(folder, 'auth-secret'), 'utf8');
  } catch {
    return undefined;
  }
}
