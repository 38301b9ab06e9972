import { inRoot } from './paths.mjs';

// Not by `import`: that would load all streams along with it, time that each call of the command line would wait.
const { existsSync, readdirSync, readFileSync, statSync } = process.getBuiltinModule('node:fs');

/** What the parts of `dist/` are made from: folders and files. */
const sourcesOf = {
  client: ['src', 'shared', 'public', 'index.html', 'vite.config.ts', 'package-lock.json'],
  server: ['server', 'shared', 'package-lock.json'],
};

/** The command line's build names its sources itself: they are few, and each call has to look at all of them. */
export const cliSourcesFile = inRoot('dist', 'cli.sources');

export const stampFileOf = (name) => inRoot('dist', `${name}.stamp`);

function* filesOf(name) {
  if (name === 'cli')
    yield* existsSync(cliSourcesFile) ? readFileSync(cliSourcesFile, 'utf8').split('\n') : [];
  else for (const source of sourcesOf[name]) yield* filesBelow(source);
}

function* filesBelow(path) {
  const stat = statSync(inRoot(path), { throwIfNoEntry: false });
  if (stat?.isDirectory())
    for (const entry of readdirSync(inRoot(path)).sort()) yield* filesBelow(`${path}/${entry}`);
  else if (stat) yield path;
}

/** Every source's path, time and size, and the Node.js it is for; equal text means that nothing has changed. */
export function stampOf(name) {
  const lines = [process.version];
  for (const path of filesOf(name)) {
    const stat = statSync(inRoot(path), { throwIfNoEntry: false });
    lines.push(stat ? `${path} ${stat.mtimeMs} ${stat.size}` : `${path} gone`);
  }
  return lines.join('\n');
}

/** Whether `dist/NAME` was built from the sources as they are. */
export function isBuilt(name) {
  const file = stampFileOf(name);
  return existsSync(file) && readFileSync(file, 'utf8') === stampOf(name);
}

/** When the last of the sources was changed, in ms since 1970. */
export const newestSource = (name) =>
  Math.max(
    0,
    ...[...filesOf(name)].map((path) => statSync(inRoot(path), { throwIfNoEntry: false })?.mtimeMs ?? 0),
  );
