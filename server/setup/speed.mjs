// npm run speed: what the benchmark needs, then the benchmark.
import { ensureBuilt } from './build.mjs';
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { databasePackages, ensurePackages, numpyPackages } from './packages.mjs';
import { inRoot, root } from './paths.mjs';
import { run } from './run.mjs';

await mainScript(async () => {
  await withLock(`set-up ${root}`, async () => {
    await ensurePackages([...databasePackages, ...numpyPackages, 'chromium']);
    await ensureNodeModules();
    await Promise.all(['client', 'server', 'cli'].map(ensureBuilt));
  });
  const args = ['--import', 'tsx', inRoot('tests/bench/main.ts'), ...process.argv.slice(2)];
  return (await run(process.execPath, args)).status;
});
