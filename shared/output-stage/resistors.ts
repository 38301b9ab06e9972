import type { Ladder } from '../contract/index.ts';

/** The resistors of one ladder, in Ω. */
export interface Resistors {
  /** From pin i to node i, least significant bit first. */
  readonly rungs: Float64Array;
  /** From node i to node i + 1. */
  readonly series: Float64Array;
  /** From node 0 to the low rail. */
  readonly terminator: number;
}

/** Each resistor of a ladder: as named, else R and 2R. */
export function resistorsOf({ bits, R, rungs, series, terminator }: Ladder): Resistors {
  return {
    rungs: rungs ? Float64Array.from(rungs) : new Float64Array(bits).fill(2 * R),
    series: series ? Float64Array.from(series) : new Float64Array(bits - 1).fill(R),
    terminator: terminator ?? 2 * R,
  };
}

/** The same ladder with every resistor of its own to scale with another R; pins and load stay as they are. */
export function scaledLadder(ladder: Ladder, ohms: number): Ladder {
  const by = ohms / ladder.R;
  return {
    ...ladder,
    R: ohms,
    ...(ladder.rungs && { rungs: ladder.rungs.map((value) => value * by) }),
    ...(ladder.series && { series: ladder.series.map((value) => value * by) }),
    ...(ladder.terminator !== undefined && { terminator: ladder.terminator * by }),
  };
}
