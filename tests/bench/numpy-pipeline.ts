import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { pythonFlags, pythonPath } from '../outside/numpy/python.ts';

export interface NumpyTable {
  codes: number[];
  stored: number[];
  report: Record<string, unknown>;
  spectrum: number[];
}

/** A NumPy program of this folder in a process of its own, asked line by line. */
export class NumpyPipeline<Result = NumpyTable> {
  readonly #process;
  readonly #answers;

  constructor(program = 'pipeline.py') {
    this.#process = spawn(pythonPath, [...pythonFlags, fileURLToPath(new URL(program, import.meta.url))], {
      stdio: ['pipe', 'pipe', 'inherit'],
    });
    this.#answers = createInterface({ input: this.#process.stdout })[Symbol.asyncIterator]();
  }

  /** Takes a task, a definition or another, and answers its result. */
  open(task: unknown): Promise<Result> {
    return this.#ask<Result>({ open: task });
  }

  /** Milliseconds of each of `count` runs of the task taken last. */
  run(count: number): Promise<number[]> {
    return this.#ask<number[]>({ run: count });
  }

  close(): void {
    this.#process.stdin.end();
  }

  async #ask<Answer>(question: object): Promise<Answer> {
    this.#process.stdin.write(`${JSON.stringify(question)}\n`);
    const { value, done } = await this.#answers.next();
    if (done) throw new Error('The NumPy pipeline has ended.');
    return JSON.parse(value) as Answer;
  }
}
