import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { inRoot } from './paths.mjs';
import { mustNode } from './run.mjs';

const vite = inRoot('node_modules', 'vite', 'bin', 'vite.js');

const builds = {
  client: {
    title: 'the client',
    sources: ['src', 'shared', 'public', 'index.html', 'vite.config.ts', 'package-lock.json'],
    build: () => mustNode(vite, ['build', '--logLevel', 'warn'], { output: 'stderr' }),
  },
  server: {
    title: 'the server',
    sources: ['server', 'shared', 'package-lock.json'],
    build: () => mustNode(inRoot('server/setup/bundle.mjs'), ['server'], { output: 'stderr' }),
  },
  cli: {
    title: 'the command line',
    sources: ['server/cli', 'server/setup/bundle.mjs', 'shared', 'templates', 'package-lock.json'],
    build: () => mustNode(inRoot('server/setup/bundle.mjs'), ['cli'], { output: 'stderr' }),
  },
};

const stampFileOf = (name) => inRoot('dist', `${name}.stamp`);

/** Whether `dist/NAME` was built from the files as they are, going by path, time and size. */
export const isBuilt = (name) =>
  existsSync(inRoot('dist', name)) && read(stampFileOf(name)) === stampOf(builds[name].sources);

/** Builds `dist/NAME` unless `isBuilt`. */
export async function ensureBuilt(name) {
  if (isBuilt(name)) return;
  const { title, sources, build } = builds[name];
  const stampFile = stampFileOf(name);
  const wanted = stampOf(sources);
  console.error(`Building ${title} …`);
  rmSync(stampFile, { force: true });
  await build();
  writeFileSync(stampFile, wanted);
}

function stampOf(sources) {
  const hash = createHash('sha256').update(process.version);
  const walk = (path) => {
    const stat = statSync(inRoot(path), { throwIfNoEntry: false });
    if (!stat) return;
    if (!stat.isDirectory()) {
      hash.update(`${path}\0${stat.mtimeMs}\0${stat.size}\0`);
      return;
    }
    for (const entry of readdirSync(inRoot(path)).sort()) walk(join(path, entry));
  };
  sources.forEach(walk);
  return hash.digest('hex');
}

function read(file) {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return undefined;
  }
}
