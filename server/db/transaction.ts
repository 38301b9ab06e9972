import { setTimeout as delay } from 'node:timers/promises';
import type { Database } from './client.ts';
import { errno, errnoOf } from './errors.ts';

type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

const attempts = 5;
/** Longest pause before the first retry, in ms; it doubles each time. */
const firstPause = 10;

const isTransient = (error: unknown) => {
  const number = errnoOf(error);
  return number === errno.deadlock || number === errno.lockWaitTimeout;
};

/**
 * Runs the whole command in one transaction, and all of it again after a deadlock or a lock-wait timeout, five times
 * at most. The command must therefore do nothing outside the transaction.
 */
export async function withTransaction<Result>(
  db: Database,
  command: (transaction: Transaction) => Promise<Result>,
): Promise<Result> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await db.transaction(command);
    } catch (error) {
      if (attempt === attempts || !isTransient(error)) throw error;
      // At random, so that the two that met do not meet again.
      await delay(Math.random() * firstPause * 2 ** attempt);
    }
  }
}
