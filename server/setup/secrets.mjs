import { randomBytes } from 'node:crypto';
import { linkSync, mkdirSync, readFileSync, unlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** The secret that signs sessions on this machine: made once, 256 random bits, readable by its owner only. */
export function localSecret(folder) {
  const file = join(folder, 'auth-secret');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const kept = keptSecret(folder);
  if (kept !== undefined) return kept;
  // Written whole before it has its name: another start at the same moment must not read an empty file.
  const own = `${file}.${process.pid}`;
  writeFileSync(own, randomBytes(32).toString('base64url'), { mode: 0o600 });
  try {
    linkSync(own, file);
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
  } finally {
    unlinkSync(own);
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
