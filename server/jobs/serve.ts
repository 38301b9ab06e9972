import { parentPort } from 'node:worker_threads';
import { Refusal } from '../../shared/contract/index.ts';
import type { JobAnswer, JobRegistry, JobRequest } from './messages.ts';

/** The worker's side: does one request after the other and answers each. */
export function serveJobs(registry: JobRegistry): void {
  const port = parentPort;
  if (!port) throw new Error('serveJobs runs in a worker thread only.');
  const answer = (message: JobAnswer) => port.postMessage(message);

  port.on('message', ({ name, input }: JobRequest) => {
    void (async () => {
      try {
        const job = registry[name] as ((input: unknown) => unknown) | undefined;
        if (!job) throw new Error(`There is no job named ${name}.`);
        answer({ kind: 'done', result: await job(input) });
      } catch (error) {
        answer(describe(error));
      }
    })();
  });
  answer({ kind: 'ready' });
}

/** By hand: cloning keeps no error's class, and of a DOMException not even the message. */
function describe(error: unknown): JobAnswer {
  if (error instanceof Refusal) return { kind: 'refused', problems: error.problems };
  const { name, message, stack } = error instanceof Error ? error : new Error(String(error));
  return { kind: 'failed', name, message, stack };
}
