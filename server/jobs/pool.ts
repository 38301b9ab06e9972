import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { Refusal } from '../../shared/contract/index.ts';
import { JobOverrun, JobQueueFull } from './faults.ts';
import type { JobAnswer, JobRegistry } from './messages.ts';
import type { jobs } from './registry.ts';

export interface JobPoolOptions {
  /** The worker's entry; this program's own jobs by default. */
  readonly entry?: URL;
  readonly size?: number;
  /** Time one job may take from the moment a worker has it, in ms. */
  readonly timeLimit?: number;
  /** JavaScript heap of one worker, in MiB. Array buffers are not in it: the contract bounds those. */
  readonly memoryLimit?: number;
  /** Jobs that may wait for a worker. */
  readonly queueLimit?: number;
}

export interface JobPool<Jobs extends JobRegistry> {
  /**
   * Runs a job in a worker thread.
   *
   * @throws {Refusal} as the job threw it
   * @throws {JobOverrun} where it took too much time or memory
   * @throws {JobQueueFull} where too many jobs wait already
   */
  run<Name extends keyof Jobs & string>(
    name: Name,
    input: Parameters<Jobs[Name]>[0],
  ): Promise<Awaited<ReturnType<Jobs[Name]>>>;
  close(): Promise<void>;
}

interface Task {
  readonly name: string;
  readonly input: unknown;
  readonly resolve: (result: unknown) => void;
  readonly reject: (error: unknown) => void;
}

interface Slot {
  readonly worker: Worker;
  isReady: boolean;
  task: Task | undefined;
  timer: NodeJS.Timeout | undefined;
}

/** A small pool of worker threads: the event loop stays free, and a job that overruns takes only its worker along. */
export function createJobPool<Jobs extends JobRegistry = typeof jobs>({
  entry = ownEntry(),
  size = Math.min(4, Math.max(1, availableParallelism() - 1)),
  timeLimit = 5000,
  memoryLimit = 256,
  queueLimit = 64,
}: JobPoolOptions = {}): JobPool<Jobs> {
  const slots = new Set<Slot>();
  const queue: Task[] = [];
  let isClosed = false;

  function addSlot(): void {
    const slot: Slot = {
      worker: startWorker(entry, memoryLimit),
      isReady: false,
      task: undefined,
      timer: undefined,
    };
    slots.add(slot);
    slot.worker.on('message', (answer: JobAnswer) => take(slot, answer));
    // An answer that cannot be cloned, or a job that threw outside of its own promise.
    slot.worker.on('messageerror', (error) => drop(slot, error));
    slot.worker.on('error', (error) => drop(slot, isOutOfMemory(error) ? tooMuch('memory') : error));
    slot.worker.on('exit', () => drop(slot, new Error('The worker ended by itself.')));
  }

  function take(slot: Slot, answer: JobAnswer): void {
    slot.isReady = true;
    const { task } = slot;
    slot.task = undefined;
    clearTimeout(slot.timer);
    if (answer.kind === 'done') task?.resolve(answer.result);
    if (answer.kind === 'refused') task?.reject(new Refusal(...answer.problems));
    if (answer.kind === 'failed') {
      const { name, message, stack } = answer;
      task?.reject(Object.assign(new Error(message), { name, stack }));
    }
    serve();
  }

  /** Ends a worker; its job fails, the waiting ones get a new worker. */
  function drop(slot: Slot, error: unknown): void {
    if (!slots.delete(slot)) return;
    clearTimeout(slot.timer);
    void slot.worker.terminate();
    slot.task?.reject(error);
    // A worker that dies before it is ready may do so each time: one job goes with it, or all would wait for ever.
    if (!slot.isReady) queue.shift()?.reject(error);
    serve();
  }

  function serve(): void {
    if (isClosed) return;
    for (const slot of slots) {
      if (slot.task || !slot.isReady) continue;
      const task = queue.shift();
      if (!task) return;
      start(slot, task);
    }
    const starting = [...slots].filter((slot) => !slot.isReady).length;
    if (queue.length > starting && slots.size < size) addSlot();
  }

  function start(slot: Slot, task: Task): void {
    slot.task = task;
    slot.timer = setTimeout(() => drop(slot, tooMuch('time')), timeLimit);
    try {
      slot.worker.postMessage({ name: task.name, input: task.input });
    } catch (error) {
      // The input cannot be cloned; the worker is none the worse for it.
      slot.task = undefined;
      clearTimeout(slot.timer);
      task.reject(error);
      queueMicrotask(serve);
    }
  }

  const tooMuch = (what: 'time' | 'memory') =>
    new JobOverrun(
      what === 'time'
        ? `The work was ended after ${timeLimit / 1000} s.`
        : `The work was ended because it needs more than ${memoryLimit} MiB of memory.`,
    );

  return {
    run: (name, input) =>
      new Promise((resolve, reject) => {
        if (isClosed) throw new Error('The job pool is closed.');
        if (queue.length >= queueLimit) throw new JobQueueFull('Too many jobs are waiting.');
        queue.push({ name, input, resolve: resolve as (result: unknown) => void, reject });
        serve();
      }),
    async close() {
      isClosed = true;
      const closing = [...slots];
      for (const task of queue.splice(0)) task.reject(new Error('The job pool is closed.'));
      for (const slot of closing) drop(slot, new Error('The job pool is closed.'));
      await Promise.all(closing.map(({ worker }) => worker.terminate()));
    },
  };
}

const isOutOfMemory = (error: unknown) =>
  error instanceof Error && 'code' in error && error.code === 'ERR_WORKER_OUT_OF_MEMORY';

/** Beside this file: as TypeScript in development, as a bundle under `npm start`. */
function ownEntry(): URL {
  return new URL(import.meta.url.endsWith('.ts') ? './worker.ts' : './worker.js', import.meta.url);
}

function startWorker(entry: URL, memoryLimit: number): Worker {
  const resourceLimits = { maxOldGenerationSizeMb: memoryLimit, maxYoungGenerationSizeMb: 32 };
  return entry.pathname.endsWith('.ts')
    ? new Worker(new URL('./from-source.mjs', import.meta.url), {
        workerData: { entry: entry.href },
        resourceLimits,
      })
    : new Worker(entry, { resourceLimits });
}
