// npm run check: lint with the layer rules, types, format, and migrations that match the schema.
import { cpSync, mkdirSync, readdirSync, rmSync } from 'node:fs';
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { inRoot, root } from './paths.mjs';
import { node } from './run.mjs';

const bin = {
  eslint: inRoot('node_modules/eslint/bin/eslint.js'),
  tsc: inRoot('node_modules/typescript/bin/tsc'),
  prettier: inRoot('node_modules/prettier/bin/prettier.cjs'),
  drizzle: inRoot('node_modules/drizzle-kit/bin.cjs'),
};
const collect = { output: 'collect' };

/** By length, the longest first: two run at a time. */
const checks = [
  ['lint', () => node(bin.eslint, ['.', '--max-warnings', '0'], collect)],
  ['types', () => node(bin.tsc, ['-p', 'tsconfig.json', '--noEmit'], collect)],
  ['types of shared/ on its own', () => node(bin.tsc, ['-p', 'tsconfig.shared.json', '--noEmit'], collect)],
  ['format', () => node(bin.prettier, ['--check', '--log-level', 'warn', '.'], collect)],
  ['migrations fit together', () => node(bin.drizzle, ['check'], collect)],
  ['migrations hold the whole schema', wholeSchema],
];

await mainScript(async () => {
  await withLock(`set-up ${root}`, ensureNodeModules);
  const waiting = [...checks];
  let failed = 0;
  const lane = async () => {
    for (let next; (next = waiting.shift());) {
      const [title, check] = next;
      const start = performance.now();
      const { status, text } = await check();
      if (status !== 0) failed++;
      console.log(
        `${status === 0 ? 'ok    ' : 'FAILED'} ${title} (${((performance.now() - start) / 1000).toFixed(1)} s)`,
      );
      if (status !== 0) console.log(text.trimEnd());
    }
  };
  await Promise.all([lane(), lane()]);
  return failed > 0 ? 1 : 0;
});

/** Generates into a copy: what comes out new is what the migrations lack. */
async function wholeSchema() {
  const copy = '.cache/drizzle';
  rmSync(inRoot(copy), { recursive: true, force: true });
  mkdirSync(inRoot('.cache'), { recursive: true });
  cpSync(inRoot('drizzle'), inRoot(copy), { recursive: true });
  const before = readdirSync(inRoot(copy)).length;
  const args = ['generate', '--dialect', 'mysql', '--schema', './server/db/schema/index.ts', '--out', copy];
  const { status, text } = await node(bin.drizzle, args, collect);
  if (status !== 0) return { status, text };
  if (readdirSync(inRoot(copy)).length === before) return { status: 0, text: '' };
  return {
    status: 1,
    text: `${text}\nThe schema has changed; run: npm run db:generate -- --name WHAT_CHANGED`,
  };
}
