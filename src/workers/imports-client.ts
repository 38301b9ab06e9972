import { Refusal } from '../../shared/contract/index.ts';
import type { ImportJobs, ImportReply } from './imports-messages.ts';

/** Longest that one piece of work may take, in milliseconds. */
const patienceMs = 10_000;

export interface ImportsWorker {
  /**
   * Does one piece of work off the main thread.
   *
   * @throws {Refusal} as it was refused
   * @throws {Error} where the program broke or took too long; the next request starts it anew
   */
  run<Name extends keyof ImportJobs>(
    name: Name,
    input: Parameters<ImportJobs[Name]>[0],
  ): Promise<ReturnType<ImportJobs[Name]>>;
  stop(): void;
}

interface Waiting {
  readonly resolve: (result: never) => void;
  readonly reject: (error: Error) => void;
  readonly alarm: ReturnType<typeof setTimeout>;
}

const start = () =>
  new Worker(new URL('./imports.worker.ts', import.meta.url), { type: 'module', name: 'imports' });

/** The parsers in a worker of their own: a file that hangs one of them ends the worker and nothing else. */
export function createImportsWorker(): ImportsWorker {
  const waiting = new Map<number, Waiting>();
  let worker: Worker | null = null;
  let lastId = 0;

  function open(): Worker {
    const opened = start();
    opened.onmessage = ({ data }: MessageEvent<ImportReply>) => {
      const one = waiting.get(data.id);
      if (one === undefined) return;
      waiting.delete(data.id);
      clearTimeout(one.alarm);
      if (data.kind === 'done') one.resolve(data.result as never);
      else if (data.kind === 'refused') one.reject(new Refusal(...data.problems));
      else one.reject(new Error(`The file could not be worked on: ${data.message}.`));
    };
    opened.onerror = (event) => {
      event.preventDefault();
      end('Its program could not be loaded or broke.');
    };
    return opened;
  }

  function end(why: string): void {
    worker?.terminate();
    worker = null;
    for (const { reject, alarm } of waiting.values()) {
      clearTimeout(alarm);
      reject(new Error(why));
    }
    waiting.clear();
  }

  return {
    run: (name, input) =>
      new Promise((resolve, reject) => {
        worker ??= open();
        const id = (lastId += 1);
        const alarm = setTimeout(() => end(`The work was ended after ${patienceMs / 1000} s.`), patienceMs);
        waiting.set(id, { resolve, reject, alarm });
        worker.postMessage({ id, name, input });
      }),
    stop: () => end('It was stopped.'),
  };
}
