// The command line: builds itself where its sources are newer, then runs in this very process. Only what the
// command has to say goes to standard output.
import { isBuilt } from './freshness.mjs';
import { runCli } from './run-cli.mjs';

if (!isBuilt('cli')) {
  const { prepareCli } = await import('./prepare-cli.mjs');
  await prepareCli();
}
runCli();
