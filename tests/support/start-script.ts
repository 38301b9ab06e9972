import { spawn, type ChildProcess } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectFolder } from '../../server/project-folder.ts';
import { waitUntil } from './wait-until.ts';

export interface StartScript {
  readonly child: ChildProcess;
  readonly output: () => string;
  readonly errors: () => string;
  /** The address it printed, once it has. */
  address(): Promise<string>;
  ended(): Promise<number | null>;
}

/** A script of server/setup as npm runs it, with a data folder of its own and no port of anybody else's. */
export function startScript(
  dataFolder: string,
  env: Record<string, string> = {},
  args: readonly string[] = ['start.mjs'],
): StartScript {
  const child = spawn(process.execPath, [join(projectFolder, 'server/setup', args[0]), ...args.slice(1)], {
    cwd: projectFolder,
    env: { ...process.env, DATABASE_URL: '', STEPWELL_DATA: dataFolder, PORT: '0', ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  let errors = '';
  child.stdout.setEncoding('utf8').on('data', (part: string) => (output += part));
  child.stderr.setEncoding('utf8').on('data', (part: string) => (errors += part));
  const exit = new Promise<number | null>((resolve) => child.once('exit', resolve));
  return {
    child,
    output: () => output,
    errors: () => errors,
    address: async () => {
      const address = waitUntil('an address', () => /http:\/\/\S+/.exec(output)?.[0], 50);
      const over = exit.then(() => Promise.reject(new Error(`It ended without an address:\n${errors}`)));
      return Promise.race([address, over]);
    },
    ended: () => exit,
  };
}

/** Numbers of all processes that carry `text` in their command line or environment. */
export function processesWith(text: string): number[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .filter((pid) =>
      ['cmdline', 'environ'].some((file) => readOrNothing(`/proc/${pid}/${file}`).includes(text)),
    )
    .map(Number);
}

function readOrNothing(file: string): string {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return '';
  }
}
