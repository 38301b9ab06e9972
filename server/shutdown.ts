import type { Server } from 'node:http';

/** How long requests under way may still take, in ms. */
const grace = 10_000;

/**
 * Ends the process in order at SIGTERM, SIGINT or when the process that started it is gone: no new requests, the
 * ones under way to their end, then the steps one after the other.
 */
export function endInOrder(server: Server, steps: readonly (() => Promise<void>)[]): void {
  let ending = false;
  const end = async () => {
    if (ending) return;
    ending = true;
    const closed = new Promise((resolve) => server.close(resolve));
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), grace).unref();
    await closed;
    for (const step of steps)
      await step().catch((error: unknown) => process.stderr.write(`${String(error)}\n`));
    process.exit(0);
  };
  for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP', 'disconnect'] as const)
    process.on(signal, () => void end());
  // It may have gone while we were starting.
  if (process.connected === false) void end();
}
