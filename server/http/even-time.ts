import { setTimeout as delay } from 'node:timers/promises';

/** Longer than any of the work it covers takes on an idle machine, in ms. */
const floorMs = 400;

/**
 * Does the work and answers no sooner than after a fixed time, so that how long it took does not tell whether an
 * address is known here.
 */
export async function inEvenTime<Result>(work: () => Promise<Result>): Promise<Result> {
  const [result] = await Promise.all([work(), delay(floorMs)]);
  return result;
}
