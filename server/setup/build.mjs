import { rmSync, writeFileSync } from 'node:fs';
import { isBuilt, newestSource, stampFileOf, stampOf } from './freshness.mjs';
import { inRoot } from './paths.mjs';
import { mustNode } from './run.mjs';

const vite = inRoot('node_modules', 'vite', 'bin', 'vite.js');
const bundle = inRoot('server', 'setup', 'bundle.mjs');
const quietly = { output: 'stderr' };

const builds = {
  client: ['the client', () => mustNode(vite, ['build', '--logLevel', 'warn'], quietly)],
  server: ['the server', () => mustNode(bundle, ['server'], quietly)],
  cli: ['the command line', () => mustNode(bundle, ['cli'], quietly)],
};

/** Builds `dist/NAME` unless it is there, from the sources as they are; `quiet` says nothing of it. */
export async function ensureBuilt(name, { quiet = false } = {}) {
  if (isBuilt(name)) return;
  const [title, build] = builds[name];
  if (!quiet) console.error(`Building ${title} …`);
  const before = stampOf(name);
  const begun = Date.now();
  rmSync(stampFileOf(name), { force: true });
  await build();
  // What changed while the build ran is built next time. Only the build itself knows the command line's files.
  if (name !== 'cli') writeFileSync(stampFileOf(name), before);
  else if (newestSource(name) < begun) writeFileSync(stampFileOf(name), stampOf(name));
}
