import { ensureBuilt } from './build.mjs';
import { withLock } from './lock.mjs';
import { ensureNodeModules } from './node-modules.mjs';
import { root } from './paths.mjs';
import { SetupFault } from './run.mjs';

/** Packages and build of the command line; a fault ends the process with status 1. */
export async function prepareCli() {
  try {
    await withLock(`set-up ${root}`, async () => {
      await ensureNodeModules();
      // A refusal is one line on standard error, also where it is the first thing a fresh clone is asked.
      await ensureBuilt('cli', { quiet: true });
    });
  } catch (error) {
    console.error(error instanceof SetupFault ? error.message : error);
    process.exit(1);
  }
}
