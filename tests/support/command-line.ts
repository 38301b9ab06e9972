import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { expect } from 'vitest';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { projectFolder } from '../../server/project-folder.ts';

export interface CommandResult {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** A definition that both kinds of command tests start from. */
export const fogSignal: DefinitionInput = {
  schema: 1,
  name: 'Fog signal',
  source: {
    kind: 'harmonics',
    partials: [
      { harmonic: 1, amplitude: 1, phaseDeg: 0 },
      { harmonic: 3, amplitude: 0.4, phaseDeg: 30 },
    ],
  },
  table: { length: 100, bits: 10 },
};

/** That definition as a document, with other fields in the place of some. */
export const fogJson = (change: object = {}) => JSON.stringify({ ...fogSignal, ...change });

/** Runs the command line as `npm run stepwell -- …` does, with a text on its standard input. */
export function stepwell(
  args: readonly string[],
  {
    input = '',
    folder = projectFolder,
    env = {},
  }: { input?: string; folder?: string; env?: NodeJS.ProcessEnv } = {},
): Promise<CommandResult> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [join(projectFolder, 'server', 'setup', 'stepwell.mjs'), ...args], {
      cwd: folder,
      env: { ...process.env, ...env },
    });
    const parts = { stdout: [] as Buffer[], stderr: [] as Buffer[] };
    child.stdout.on('data', (part: Buffer) => parts.stdout.push(part));
    child.stderr.on('data', (part: Buffer) => parts.stderr.push(part));
    // What is refused need not be read to its end.
    child.stdin.on('error', () => undefined);
    child.on('error', reject);
    child.on('close', (status) =>
      resolve({
        status,
        stdout: Buffer.concat(parts.stdout).toString('utf8'),
        stderr: Buffer.concat(parts.stderr).toString('utf8'),
      }),
    );
    child.stdin.end(input);
  });
}

/** Wrong input or usage: status 2, one line on standard error, nothing on standard output. */
export function expectOneLine(result: CommandResult, line: RegExp): void {
  expect(result).toMatchObject({ status: 2, stdout: '' });
  expect(result.stderr).toMatch(/^[^\n]+\n$/);
  expect(result.stderr.trimEnd()).toMatch(line);
}
