import { SetupFault, stopRunning } from './run.mjs';

/**
 * Runs a script's work with an orderly end: `onStop(step)` registers what to undo, last first, at the end, at a
 * fault and at Ctrl-C alike. The work answers the exit status. `signalStatus` answers the one for an end by signal,
 * where it is not the usual 128 + signal number.
 */
export async function mainScript(work, { signalStatus } = {}) {
  const steps = [];
  let ending;
  const end = (status) =>
    (ending ??= (async () => {
      let result = status;
      await stopRunning();
      for (const step of steps.reverse()) {
        try {
          await step();
        } catch (error) {
          report(error);
          result ||= 1;
        }
      }
      process.exit(result);
    })());

  // A terminal signals the whole group at Ctrl-C; `kill` only this process: both come here.
  for (const [signal, usual] of [
    ['SIGINT', 130],
    ['SIGTERM', 143],
    ['SIGHUP', 129],
  ]) {
    process.on(signal, () => void end(signalStatus?.() ?? usual));
  }
  // Where nobody reads any more (`| head`), what was started must end all the same.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => void end(1));
  process.on('uncaughtException', (error) => {
    report(error);
    void end(1);
  });
  try {
    await end(await work((step) => steps.push(step)));
  } catch (error) {
    if (!ending) report(error);
    await end(error.status ?? 1);
  }
}

const report = (error) => console.error(error instanceof SetupFault ? error.message : error);
