import { setTimeout as delay } from 'node:timers/promises';

/** Asks again until the answer is neither false, undefined nor an error; fails after `seconds`. */
export async function waitUntil<Answer>(
  what: string,
  ask: () => Answer | Promise<Answer>,
  seconds = 20,
): Promise<NonNullable<Answer>> {
  const end = Date.now() + seconds * 1000;
  let last: unknown;
  while (Date.now() < end) {
    try {
      last = await ask();
      if (last) return last as NonNullable<Answer>;
    } catch (error) {
      last = error;
    }
    await delay(25);
  }
  throw new Error(`Waited ${seconds} s in vain: ${what} (last: ${String(last)})`);
}
