import {
  againstSignal,
  isConstant,
  momentsOf,
  strongestLineOf,
  type SignalFacts,
} from '../analysis/index.ts';
import type { Report, TableSettings } from '../contract/index.ts';
import { ditherOf, quantise, roundInto, storedWords, tableBytesOf, valuesInto } from '../quantiser/index.ts';

/** Figures of one size, as `tabulate` reports them. */
export type SizeFigures = Pick<Report, 'snrDb' | 'unwantedDb' | 'exact' | 'tableBytes'>;

/**
 * One levelled cycle at any depth. What does not depend on the depth, the cycle's own figures and the dither, is done
 * once, and each depth works in the same arrays: nothing is made in the loop over sizes but its results.
 */
export class Depths {
  readonly #cycle: Float64Array;
  readonly #table: TableSettings;
  readonly #dither: Float64Array | null;
  readonly #codes: Uint16Array;
  readonly #error: Float64Array;
  readonly #signal: SignalFacts;

  /** @param table the settings of that cycle's table, whatever its bits */
  constructor(cycle: Float64Array, table: TableSettings) {
    const { variance } = momentsOf(cycle);
    this.#cycle = cycle;
    this.#table = table;
    this.#dither = ditherOf(cycle.length, table);
    this.#codes = new Uint16Array(cycle.length);
    this.#error = new Float64Array(cycle.length);
    this.#signal = { variance, isConstant: isConstant(cycle, variance), strongest: strongestLineOf(cycle) };
  }

  /** @throws {Refusal} where the codes at this depth cannot be folded as asked. */
  at(bits: number): SizeFigures {
    const table = { ...this.#table, bits };
    const codes = this.#codesOf(table);
    if (table.fold === 'quarter') storedWords(codes, table);
    const error = this.#error;
    const cycle = this.#cycle;
    valuesInto(error, codes, table);
    for (let k = 0; k < error.length; k += 1) error[k] -= cycle[k];
    const { variance } = momentsOf(error);
    const storedCount = table.fold === 'quarter' ? codes.length / 4 : codes.length;
    return {
      ...againstSignal(this.#signal, variance, strongestLineOf(error)),
      tableBytes: tableBytesOf(storedCount, bits),
    };
  }

  #codesOf(table: TableSettings): Uint16Array {
    // Shaping runs around the loop until it closes: it is the quantiser's own business.
    if (table.shaping !== 0) return quantise(this.#cycle, table).codes;
    roundInto(this.#codes, this.#cycle, table, this.#dither);
    return this.#codes;
  }
}
