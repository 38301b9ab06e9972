import type { Ladder } from '../contract/index.ts';
import type { Resistors } from './resistors.ts';

/** What does not change from one build of a ladder to the next. */
export type LadderDrive = Pick<Ladder, 'bits' | 'rHigh' | 'rLow' | 'vHigh' | 'vLow' | 'load'>;

/**
 * Gaussian elimination of the nodal equations of all 2^b codes at once.
 *
 * The matrix of a ladder is tridiagonal, so that elimination from node 0 upwards leaves at node i a Thevenin source
 * that the bits 0…i alone decide: 2^(i+1) of them. Each is made once from the one below it, 2^(b+1) steps for all
 * codes together. With `t = r + s`, s the resistor between the nodes, and y the conductance of rung and pin:
 *
 *     r' = t/(1 + y·t),   u' = (u + e·y·t)/(1 + y·t)
 *
 * Voltages u are those above the low rail, so that the low rail itself is exactly 0.
 */
export class Elimination {
  readonly bits: number;
  /** Voltage behind node i for the low bits `low`, at `2^(i+1) − 2 + low`, in V above the low rail. */
  readonly volts: Float64Array;
  /** Resistance behind node i, in Ω, in the same places. */
  readonly ohms: Float64Array;
  /** Conductances of rung and pin by bit, in S: the pin low, the pin high. */
  readonly lowSiemens: Float64Array;
  readonly highSiemens: Float64Array;
  /** Distance of the rails, in V. */
  readonly span: number;
  readonly #drive: LadderDrive;

  constructor(drive: LadderDrive) {
    const { bits } = drive;
    const places = 2 ** (bits + 1) - 2;
    this.bits = bits;
    this.volts = new Float64Array(places);
    this.ohms = new Float64Array(places);
    this.lowSiemens = new Float64Array(bits);
    this.highSiemens = new Float64Array(bits);
    this.span = drive.vHigh - drive.vLow;
    this.#drive = drive;
  }

  /** Where the sources behind node i begin. */
  static placeOf(node: number): number {
    return (1 << (node + 1)) - 2;
  }

  run({ rungs, series, terminator }: Resistors): void {
    const { bits, volts, ohms, lowSiemens, highSiemens, span } = this;
    const { rHigh, rLow } = this.#drive;
    for (let bit = 0; bit < bits; bit += 1) {
      lowSiemens[bit] = 1 / (rungs[bit] + rLow);
      highSiemens[bit] = 1 / (rungs[bit] + rHigh);
    }
    const whenLow = 1 / (1 / terminator + lowSiemens[0]);
    const whenHigh = 1 / (1 / terminator + highSiemens[0]);
    ohms[0] = whenLow;
    ohms[1] = whenHigh;
    volts[0] = 0;
    volts[1] = span * highSiemens[0] * whenHigh;

    for (let node = 1; node < bits; node += 1) {
      const below = 1 << node;
      if (rHigh === rLow) this.#stepOfLikePins(below, series[node - 1], lowSiemens[node]);
      else this.#step(below, series[node - 1], lowSiemens[node], highSiemens[node]);
    }
  }

  /** From the `below` sources behind one node to twice as many behind the next. */
  #step(below: number, between: number, low: number, high: number): void {
    const { volts, ohms, span } = this;
    const from = below - 2;
    const to = 2 * below - 2;
    const highAmps = span * high;
    for (let state = 0; state < below; state += 1) {
      const t = ohms[from + state] + between;
      const u = volts[from + state];
      // One division serves both.
      const lowPart = 1 + low * t;
      const highPart = 1 + high * t;
      const both = 1 / (lowPart * highPart);
      const whenLow = highPart * both;
      const whenHigh = lowPart * both;
      ohms[to + state] = t * whenLow;
      ohms[to + below + state] = t * whenHigh;
      volts[to + state] = u * whenLow;
      volts[to + below + state] = (u + highAmps * t) * whenHigh;
    }
  }

  /** The same where high and low pins are alike: all sources of a node have one resistance. */
  #stepOfLikePins(below: number, between: number, siemens: number): void {
    const { volts, ohms, span } = this;
    const from = below - 2;
    const to = 2 * below - 2;
    const t = ohms[from] + between;
    const share = 1 / (1 + siemens * t);
    const own = span * siemens * t * share;
    const behind = t * share;
    for (let state = 0; state < below; state += 1) {
      const u = volts[from + state] * share;
      volts[to + state] = u;
      volts[to + below + state] = u + own;
      ohms[to + state] = behind;
      ohms[to + below + state] = behind;
    }
  }

  /** Fills `out` with the output's voltage above the low rail for every code, the load taken into account. */
  outputs(out: Float64Array): void {
    const { volts, ohms, bits } = this;
    const { load } = this.#drive;
    const top = Elimination.placeOf(bits - 1);
    const codes = 2 ** bits;
    if (load === undefined) out.set(volts.subarray(top));
    else {
      for (let code = 0; code < codes; code += 1)
        out[code] = (volts[top + code] * load) / (load + ohms[top + code]);
    }
  }
}
