import type { Ladder } from '../contract/index.ts';
import { Elimination } from './elimination.ts';
import { resistorsOf } from './resistors.ts';

/** A ladder's elimination, run. */
export function eliminated(ladder: Ladder): Elimination {
  const elimination = new Elimination(ladder);
  elimination.run(resistorsOf(ladder));
  return elimination;
}

/** Output voltage of every code, in V, by exact nodal solution (engine specification §6). */
export function voltsOf(ladder: Ladder): Float64Array {
  const volts = new Float64Array(2 ** ladder.bits);
  eliminated(ladder).outputs(volts);
  if (ladder.vLow !== 0) for (let code = 0; code < volts.length; code += 1) volts[code] += ladder.vLow;
  return volts;
}

/** Output resistance of every code, the load included, in Ω. Codes differ where high and low pins do. */
export function outputOhmsOf(ladder: Ladder): Float64Array {
  const { ohms, bits } = eliminated(ladder);
  const own = ohms.slice(Elimination.placeOf(bits - 1));
  const { load } = ladder;
  return load === undefined ? own : own.map((r) => (r * load) / (r + load));
}
