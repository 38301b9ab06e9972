import { createHash } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import { inRoot } from './paths.mjs';
import { mustRun } from './run.mjs';

const stampFile = inRoot('node_modules', '.stepwell-stamp');

const read = (file) => {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return undefined;
  }
};

/** Installs the npm packages of the lock file unless exactly these, for this Node.js, are there. */
export async function ensureNodeModules() {
  const lock = readFileSync(inRoot('package-lock.json'), 'utf8');
  const wanted = `${process.version} ${createHash('sha256').update(lock).digest('hex')}`;
  const stamp = read(stampFile);
  if (stamp === wanted) return;
  const otherNode = stamp !== undefined && !stamp.startsWith(`${process.version} `);
  if (otherNode || !holdsAll(lock)) {
    console.error('Installing the npm packages …');
    // Development packages, too: the build and the tests need them, whatever NODE_ENV says.
    await mustRun('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { output: 'stderr' });
  }
  writeFileSync(stampFile, wanted);
}

/** Whether npm's own note of what it installed agrees with the lock: true after `npm install` by hand. */
function holdsAll(lock) {
  const note = read(inRoot('node_modules', '.package-lock.json'));
  if (note === undefined) return false;
  const installed = JSON.parse(note).packages;
  const locked = Object.fromEntries(
    Object.entries(JSON.parse(lock).packages).filter(([path]) => path !== ''),
  );
  return (
    Object.entries(locked).every(([path, entry]) =>
      installed[path] ? installed[path].version === entry.version : entry.optional || entry.devOptional,
    ) && Object.keys(installed).every((path) => path in locked)
  );
}
