import type { KeepJob, KeepMessage } from './keep-sound-messages.ts';

/**
 * Makes a sound file in a worker of its own, which ends with it.
 *
 * @returns what stops it at once: nothing comes after that
 */
export function keepSound(job: KeepJob, onMessage: (message: KeepMessage) => void): () => void {
  const worker = new Worker(new URL('./keep-sound.worker.ts', import.meta.url), {
    type: 'module',
    name: 'keep sound',
  });
  const end = () => {
    worker.onmessage = null;
    worker.onerror = null;
    worker.terminate();
  };
  worker.onmessage = ({ data }: MessageEvent<KeepMessage>) => {
    if (data.kind !== 'progress') end();
    onMessage(data);
  };
  worker.onerror = (event) => {
    event.preventDefault();
    end();
    onMessage({ kind: 'failed', message: event.message || 'The program for it could not be loaded.' });
  };
  worker.postMessage(job);
  return end;
}
