// npm run proof: the tools that judge the targets, then every proof as a matrix.
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { ensurePackages, proofPackages } from './packages.mjs';
import { inRoot, root } from './paths.mjs';
import { run } from './run.mjs';

await mainScript(async () => {
  await withLock(`set-up ${root}`, async () => {
    await ensurePackages(proofPackages);
    await ensureNodeModules();
  });
  const args = ['--import', 'tsx', inRoot('tests/outside/proofs/main.ts'), ...process.argv.slice(2)];
  return (await run(process.execPath, args)).status;
});
