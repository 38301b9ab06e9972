import { createRequire } from 'node:module';
import { dirname } from 'node:path';
import { Script } from 'node:vm';
import { inRoot } from './paths.mjs';

// Not by `import`, for the reason given in freshness.mjs.
const { readFileSync, writeFileSync } = process.getBuiltinModule('node:fs');

const file = inRoot('dist', 'cli', 'stepwell.cjs');
const cacheFile = inRoot('dist', 'cli', 'stepwell.v8');

/**
 * Runs the built command line in this process, from the compiled code that its build has kept (V8 refuses what is
 * not its own, and compiles again). `keep` writes that file when the process ends.
 */
export function runCli({ keep = false } = {}) {
  const wrapped = `(function (exports, require, module, __filename, __dirname) {${readFileSync(file, 'utf8')}\n})`;
  const script = new Script(wrapped, { filename: file, cachedData: keep ? undefined : compiled() });
  const module = { exports: {} };
  script.runInThisContext()(module.exports, createRequire(file), module, file, dirname(file));
  if (keep) process.on('exit', () => writeFileSync(cacheFile, script.createCachedData()));
}

function compiled() {
  try {
    return readFileSync(cacheFile);
  } catch {
    return undefined;
  }
}
