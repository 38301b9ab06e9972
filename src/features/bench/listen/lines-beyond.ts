import { linesOf } from '../../../../shared/dft/index.ts';

/** Lines weaker than this beside the strongest are not counted: −60 dB. */
const leastCounted = 1e-3;

/**
 * Counts the lines of a loop that lie at or above half of the context's rate, and so are not played.
 *
 * @param cycle one value an entry
 * @param sampleRateHz rate at which the table is stepped through
 */
export function linesBeyond(cycle: Float64Array, sampleRateHz: number, contextRateHz: number): number {
  const { re, im } = linesOf(cycle);
  let strongest = 0;
  for (let m = 1; m < re.length; m += 1) strongest = Math.max(strongest, Math.hypot(re[m], im[m]));
  let count = 0;
  for (let m = 1; m < re.length; m += 1) {
    const isBeyond = (m * sampleRateHz) / cycle.length >= contextRateHz / 2;
    if (isBeyond && Math.hypot(re[m], im[m]) > strongest * leastCounted) count += 1;
  }
  return count;
}
