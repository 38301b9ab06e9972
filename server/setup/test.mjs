// npm test: all the set-up, then every test, fast ones first, then one line with the counts.
import { mkdirSync, rmSync } from 'node:fs';
import { ensureBuilt } from './build.mjs';
import { add, nothing, playwrightCounts, vitestCounts } from './counts.mjs';
import { holdDatabaseUntilEnd } from './database.mjs';
import { withLock } from './lock.mjs';
import { mainScript } from './main-script.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { databasePackages, ensurePackages, testPackages } from './packages.mjs';
import { inRoot, root } from './paths.mjs';
import { node } from './run.mjs';

const reports = inRoot('.cache', 'test-reports');
const vitest = inRoot('node_modules/vitest/vitest.mjs');
const playwright = inRoot('node_modules/@playwright/test/cli.js');

await mainScript(async (onStop) => {
  const ownServer = Boolean(process.env.DATABASE_URL);
  await withLock(`set-up ${root}`, async () => {
    await ensurePackages([...(ownServer ? [] : databasePackages), ...testPackages]);
    await ensureNodeModules();
    await Promise.all(['client', 'server', 'cli'].map(ensureBuilt));
  });
  if (!ownServer) {
    // Held from here on, so that it is not started and stopped once for each runner.
    await holdDatabaseUntilEnd(inRoot('.data', 'tests', 'mariadb'), onStop);
  }
  rmSync(reports, { recursive: true, force: true });
  mkdirSync(reports, { recursive: true });

  let total = nothing;
  for (const project of ['engine', 'client', 'outside', 'api']) total = add(total, await runVitest(project));
  for (const project of ['pages', 'sound']) total = add(total, await runPlaywright(project));
  return conclude(total);
});

async function runVitest(project) {
  console.log(`\n── ${project} ──`);
  const report = `${reports}/${project}.json`;
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const { status } = await node(vitest, ['run', '--project', project, ...reporters]);
  return vitestCounts(report, status);
}

async function runPlaywright(project) {
  console.log(`\n── browser: ${project} ──`);
  const report = `${reports}/browser-${project}.json`;
  const { status } = await node(playwright, ['test', `--project=${project}`, '--reporter=list,json'], {
    env: { PLAYWRIGHT_JSON_OUTPUT_NAME: report },
  });
  return playwrightCounts(report, status);
}

/** A test that did not run proves nothing: where the counts decide (CI), it has failed. */
function conclude({ passed, failed, unrun }) {
  const strict = Boolean(process.env.CI);
  if (unrun > 0) console.log(`\n${unrun} did not run${strict ? ', which counts as failed' : ''}.`);
  const allFailed = failed + (strict ? unrun : 0);
  console.log(`\n${passed} passed, ${allFailed} failed`);
  return allFailed > 0 ? 1 : 0;
}
