import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';

const execute = promisify(execFile);

/** Runs another program; fails with all that it said where its exit status is not 0. */
export async function run(program: string, args: readonly string[], folder: string): Promise<string> {
  try {
    const { stdout } = await execute(program, [...args], { cwd: folder, maxBuffer: 64 * 1024 * 1024 });
    return stdout;
  } catch (error) {
    const said = error instanceof Error && 'stderr' in error ? `\n${String(error.stderr)}` : '';
    throw new Error(`${program} ${args.join(' ')} failed.${said}`, { cause: error });
  }
}

/** Does some work in a folder of its own, which is gone afterwards. */
export async function inFolder<Result>(
  files: readonly { readonly name: string; readonly text: string }[],
  work: (folder: string) => Promise<Result>,
): Promise<Result> {
  const folder = await mkdtemp(join(tmpdir(), 'stepwell-proof-'));
  try {
    await Promise.all(files.map(({ name, text }) => writeFile(join(folder, name), text)));
    return await work(folder);
  } finally {
    await rm(folder, { recursive: true });
  }
}
