import { setTimeout as delay } from 'node:timers/promises';
import type { Logger } from 'pino';

/**
 * Does the work again and again, at once for the first time, with a pause between that differs by up to a fifth:
 * processes started together must not always meet. An error is logged, and the work goes on the next time.
 */
export function repeat(
  work: () => Promise<void>,
  pauseMs: number,
  logger: Logger,
): { close(): Promise<void> } {
  const stop = new AbortController();
  const running = (async () => {
    while (!stop.signal.aborted) {
      await work().catch((error: unknown) => logger.error({ err: error }, 'upkeep'));
      const pause = pauseMs * (0.9 + 0.2 * Math.random());
      await delay(pause, undefined, { signal: stop.signal }).catch(() => undefined);
    }
  })();
  return {
    close: async () => {
      stop.abort();
      await running;
    },
  };
}
