import type { StageJob, StageMessage } from './stage-messages.ts';

export interface StageRun {
  /** Asks for one thing; while it is worked on only the newest further request waits. */
  ask(job: StageJob): void;
  /** Ends the work at once. */
  stop(): void;
}

/** Starts a worker for the output stage. Nothing comes after `stop`. */
export function startStage(onMessage: (message: StageMessage) => void): StageRun {
  const worker = new Worker(new URL('./stage.worker.ts', import.meta.url), { type: 'module', name: 'stage' });
  let isBusy = false;
  let waiting: StageJob | null = null;
  const next = () => {
    isBusy = waiting !== null;
    if (waiting !== null) worker.postMessage(waiting);
    waiting = null;
  };
  worker.onmessage = ({ data }: MessageEvent<StageMessage>) => {
    if (data.kind !== 'trials' || data.isDone) next();
    onMessage(data);
  };
  worker.onerror = (event) => {
    event.preventDefault();
    worker.terminate();
    onMessage({ kind: 'failed', message: event.message || 'The program for it could not be loaded.' });
  };
  return {
    ask(job) {
      waiting = job;
      if (!isBusy) next();
    },
    stop() {
      worker.onmessage = null;
      worker.onerror = null;
      worker.terminate();
    },
  };
}
