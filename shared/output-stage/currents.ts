import type { Ladder } from '../contract/index.ts';
import { eliminated } from './ladder-volts.ts';
import { resistorsOf } from './resistors.ts';

export interface CurrentOptions {
  /** The output is shorted to the low rail. */
  readonly shorted?: boolean;
}

/** The largest currents over all codes, in A, each with a code that has it. */
export interface LadderCurrents {
  readonly worstPinAmps: number;
  readonly worstPin: { readonly code: number; readonly bit: number };
  /** Largest sum over the high pins of one code: what the supply gives. */
  readonly worstSupplyAmps: number;
  readonly worstSupplyCode: number;
  /** Largest sum over the low pins of one code: what flows into them. */
  readonly worstSinkAmps: number;
  readonly worstSinkCode: number;
}

/** Currents through all rungs of one code after another: fills `amps` by bit, positive out of the pin. */
function rungCurrents(ladder: Ladder, { shorted = false }: CurrentOptions) {
  const elimination = eliminated(ladder);
  const { bits, volts, ohms, lowSiemens, highSiemens, span } = elimination;
  const { series } = resistorsOf(ladder);
  // What share of the distance to the node above a node keeps.
  const share = new Float64Array(ohms.length);
  for (let node = 0; node < bits - 1; node += 1) {
    const from = 2 ** (node + 1) - 2;
    for (let place = from; place < 2 * from + 2; place += 1)
      share[place] = ohms[place] / (ohms[place] + series[node]);
  }
  const outputs = new Float64Array(2 ** bits);
  if (!shorted) elimination.outputs(outputs);
  const amps = new Float64Array(bits);
  const fill = (code: number): void => {
    // Back substitution, from the output down: the source behind node i pulls it towards itself.
    let node = outputs[code];
    for (let bit = bits - 1; bit >= 0; bit -= 1) {
      amps[bit] = (code >> bit) & 1 ? (span - node) * highSiemens[bit] : -node * lowSiemens[bit];
      if (bit === 0) return;
      const below = 1 << bit;
      const place = below - 2 + (code & (below - 1));
      node = volts[place] + (node - volts[place]) * share[place];
    }
  };
  return { amps, fill };
}

/** Current of each pin for one code, in A, least significant bit first, positive out of the pin. */
export function pinAmpsOf(ladder: Ladder, code: number, options: CurrentOptions = {}): Float64Array {
  const { amps, fill } = rungCurrents(ladder, options);
  fill(code);
  return amps;
}

/** What the supply gives through the high pins, in A, for every code. */
export function supplyAmpsOf(ladder: Ladder, options: CurrentOptions = {}): Float64Array {
  const { amps, fill } = rungCurrents(ladder, options);
  const supply = new Float64Array(2 ** ladder.bits);
  for (let code = 0; code < supply.length; code += 1) {
    fill(code);
    for (let bit = 0; bit < amps.length; bit += 1) if ((code >> bit) & 1) supply[code] += amps[bit];
  }
  return supply;
}

/** Mean supply current over the entries of a table, in A. */
export function meanSupplyAmps(
  ladder: Ladder,
  codes: ArrayLike<number>,
  options: CurrentOptions = {},
): number {
  const supply = supplyAmpsOf(ladder, options);
  let sum = 0;
  for (let k = 0; k < codes.length; k += 1) sum += supply[codes[k]];
  return sum / codes.length;
}

/**
 * The largest currents of a ladder (engine specification §6). What a pin and a port may carry stands in the
 * controller's data sheet.
 */
export function currentsOf(ladder: Ladder, options: CurrentOptions = {}): LadderCurrents {
  const { amps, fill } = rungCurrents(ladder, options);
  const worst = {
    worstPinAmps: 0,
    worstSupplyAmps: 0,
    worstSupplyCode: 0,
    worstSinkAmps: 0,
    worstSinkCode: 0,
  };
  let worstPin = { code: 0, bit: 0 };
  for (let code = 0; code < 2 ** ladder.bits; code += 1) {
    fill(code);
    let supply = 0;
    let sink = 0;
    for (let bit = 0; bit < amps.length; bit += 1) {
      const own = amps[bit];
      if ((code >> bit) & 1) supply += own;
      else sink -= own;
      if (Math.abs(own) > worst.worstPinAmps) {
        worst.worstPinAmps = Math.abs(own);
        worstPin = { code, bit };
      }
    }
    if (supply > worst.worstSupplyAmps) {
      worst.worstSupplyAmps = supply;
      worst.worstSupplyCode = code;
    }
    if (sink > worst.worstSinkAmps) {
      worst.worstSinkAmps = sink;
      worst.worstSinkCode = code;
    }
  }
  return { ...worst, worstPin };
}
