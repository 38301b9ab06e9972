import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

const running = new Set();
let isStopping = false;

/** A fault to print as it is, without a stack: the person at the terminal can act on it. */
export class SetupFault extends Error {}

/**
 * Runs a program to its end and answers its exit status (128 + signal number is not told apart from 1).
 * `output: 'stderr'` sends all it prints to standard error, `'collect'` answers it as `text` instead.
 */
export function run(command, args, { output = 'inherit', env, cwd = root } = {}) {
  if (isStopping)
    return Promise.reject(new SetupFault(`${command} is not started any more: this script is ending.`));
  const stdout = output === 'stderr' ? 2 : output === 'collect' ? 'pipe' : 'inherit';
  const stderr = output === 'collect' ? 'pipe' : 'inherit';
  const child = spawn(command, args, {
    cwd,
    env: { ...process.env, ...env },
    stdio: ['ignore', stdout, stderr],
  });
  running.add(child);
  let text = '';
  for (const stream of [child.stdout, child.stderr])
    stream?.setEncoding('utf8').on('data', (part) => (text += part));
  return new Promise((resolve, reject) => {
    child.once('error', (error) => {
      running.delete(child);
      reject(new SetupFault(`${command} does not run: ${error.message}`));
    });
    child.once('close', (code) => {
      running.delete(child);
      resolve({ status: code ?? 1, text });
    });
  });
}

/** As `run`, but anything other than exit status 0 is a fault. */
export async function mustRun(command, args, options) {
  const { status, text } = await run(command, args, options);
  if (status === 0) return text;
  throw new SetupFault(`${text}${command} ${args.join(' ')} ended with exit status ${status}.`);
}

export const node = (script, args = [], options = {}) => run(process.execPath, [script, ...args], options);
export const mustNode = (script, args = [], options = {}) =>
  mustRun(process.execPath, [script, ...args], options);

/** Ends what `run` has started and waits for it; for Ctrl-C in the middle of the set-up. */
export async function stopRunning(signal = 'SIGTERM') {
  isStopping = true;
  await Promise.all(
    [...running].map((child) => {
      const closed = new Promise((resolve) => child.once('close', resolve));
      child.kill(signal);
      return closed;
    }),
  );
}
