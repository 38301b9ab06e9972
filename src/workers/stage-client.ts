import type { StageJob, StageMessage } from './stage-messages.ts';

export interface StageRun {
  /** Asks for one thing; while it is worked on only the newest further request waits. */
  ask(job: StageJob): void;
  /** Ends the work at once. */
  stop(): void;
}

/**
 * Starts a worker for the output stage. Nothing comes after `stop`.
 *
 * @param onMessage is told for which job, null where the worker broke
 */
export function startStage(onMessage: (message: StageMessage, job: StageJob | null) => void): StageRun {
  const worker = new Worker(new URL('./stage.worker.ts', import.meta.url), { type: 'module', name: 'stage' });
  let working: StageJob | null = null;
  let waiting: StageJob | null = null;
  const next = () => {
    working = waiting;
    if (waiting !== null) worker.postMessage(waiting);
    waiting = null;
  };
  worker.onmessage = ({ data }: MessageEvent<StageMessage>) => {
    const job = working;
    if (data.kind !== 'trials' || data.isDone) next();
    onMessage(data, job);
  };
  worker.onerror = (event) => {
    event.preventDefault();
    worker.terminate();
    const message = event.message || 'The program for it could not be loaded.';
    onMessage({ kind: 'failed', message }, null);
  };
  return {
    ask(job) {
      waiting = job;
      if (working === null) next();
    },
    stop() {
      worker.onmessage = null;
      worker.onerror = null;
      worker.terminate();
    },
  };
}
