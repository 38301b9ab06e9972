import { spawn } from 'node:child_process';
import { root } from './paths.mjs';
import { SetupFault } from './run.mjs';

/** After this the application is ended by force, in ms; it gives its own requests 10 s. */
const patience = 15_000;

/**
 * The application as a child process. `ready` answers the address it is open at, `ended` its exit status. It ends by
 * itself when this process goes, even by `kill -9`: the channel between the two closes.
 */
export function startApp(args, env) {
  const child = spawn(process.execPath, args, {
    cwd: root,
    env: { ...process.env, ...env },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
  const ended = new Promise((resolve) => {
    child.once('exit', (code) => resolve(code ?? 1)).once('error', () => resolve(1));
  });
  const ready = new Promise((resolve, reject) => {
    child.once('message', ({ address }) => resolve(address));
    // The application has said on standard error why it did not start.
    ended.then((status) =>
      reject(Object.assign(new SetupFault('The application did not start.'), { status })),
    );
  });
  ready.catch(() => {});

  async function stop() {
    child.kill('SIGTERM');
    const force = setTimeout(() => child.kill('SIGKILL'), patience);
    await ended;
    clearTimeout(force);
  }
  return { ready, ended, stop };
}
