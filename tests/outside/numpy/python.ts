import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

/** Debian's own interpreter, which sees Debian's NumPy and SciPy whatever else stands on the path. */
export const pythonPath = '/usr/bin/python3';

/** Own variables and folders of the person who runs the tests stay out of it, and no bytecode into the tree. */
export const pythonFlags = ['-E', '-s', '-B'];

export const numpyProgram = (name: string) => fileURLToPath(new URL(name, import.meta.url));

/**
 * Runs a program of this folder on a JSON value and gives back its JSON answer.
 *
 * @throws where Python, NumPy or SciPy is missing or the program fails: an outside check is never skipped.
 */
export function askPython<Answer>(program: string, question: unknown): Answer {
  const { status, stdout, stderr, error } = spawnSync(pythonPath, [...pythonFlags, numpyProgram(program)], {
    input: JSON.stringify(question),
    encoding: 'utf8',
    maxBuffer: 512 * 1024 * 1024,
  });
  if (error !== undefined) {
    throw new Error(`${pythonPath} does not run (Debian: apt-get install python3-numpy python3-scipy)`, {
      cause: error,
    });
  }
  if (status !== 0) throw new Error(`${program} ended with ${status}:\n${stderr}`);
  return JSON.parse(stdout) as Answer;
}
