/** A stretch of whole rounds. */
export interface WholeRounds {
  readonly frames: number;
  readonly rounds: number;
  /** Pitch at which so many rounds take exactly so many frames. */
  readonly roundHz: number;
  /** What that is off, `1200·log2(roundHz/wanted)`. */
  readonly cents: number;
}

/** Lengths that are looked at about the wanted one, as a share of it. */
const lengthSlack = 0.02;
const roundsLookedAt = 2_000;

/**
 * The whole number of rounds near a length whose frames come nearest to a whole number, so that the pitch has to give way
 * by the least; of equal ones the nearest to the length.
 *
 * @param roundHz rounds a second, above 0
 * @param seconds wanted length; a round longer than that is taken whole
 */
export function wholeRounds(roundHz: number, rateHz: number, seconds: number): WholeRounds {
  const wanted = Math.max(1, Math.round(seconds * roundHz));
  const reach = Math.min(roundsLookedAt, Math.floor(lengthSlack * wanted));
  let best = wanted;
  let bestMiss = Infinity;
  for (let off = 0; off <= 2 * reach; off += 1) {
    const rounds = wanted + (off % 2 === 0 ? off / 2 : -(off + 1) / 2);
    const exact = (rounds * rateHz) / roundHz;
    const miss = Math.abs(Math.round(exact) - exact) / exact;
    if (miss < bestMiss - 1e-12) {
      best = rounds;
      bestMiss = miss;
    }
  }
  const frames = Math.max(1, Math.round((best * rateHz) / roundHz));
  const given = (best * rateHz) / frames;
  return { frames, rounds: best, roundHz: given, cents: 1200 * Math.log2(given / roundHz) };
}
