// The command line: builds itself where its sources are newer, then runs in this very process. Only what the
// command has to say goes to standard output.
import { existsSync } from 'node:fs';
import { isBuilt } from './build.mjs';
import { inRoot } from './paths.mjs';

if (!existsSync(inRoot('node_modules')) || !isBuilt('cli')) {
  const { prepareCli } = await import('./prepare-cli.mjs');
  await prepareCli();
}
await import('../../dist/cli/stepwell.js');
