import type { FiguresJob, FiguresMessage } from './figures-messages.ts';

export interface FiguresRun {
  /** Asks for one thing; while it is worked on only the newest further request waits. */
  ask(job: FiguresJob): void;
  /** Ends the work at once. */
  stop(): void;
}

/** Starts a worker for figures that take longer than a frame. Nothing comes after `stop`. */
export function startFigures(onMessage: (message: FiguresMessage) => void): FiguresRun {
  const worker = new Worker(new URL('./figures.worker.ts', import.meta.url), {
    type: 'module',
    name: 'figures',
  });
  let isBusy = false;
  let waiting: FiguresJob | null = null;
  const next = () => {
    isBusy = waiting !== null;
    if (waiting !== null) worker.postMessage(waiting);
    waiting = null;
  };
  worker.onmessage = ({ data }: MessageEvent<FiguresMessage>) => {
    if (data.kind !== 'cells') next();
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
