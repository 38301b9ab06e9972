import { againstSignal, isConstant, spreadOf, strongestLineOf, type SignalFacts } from '../analysis/index.ts';
import type { Report, TableSettings } from '../contract/index.ts';
import { ditherOf, errorInto, quantise, storedWords, tableBytesOf, valuesOf } from '../quantiser/index.ts';

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
  readonly #error: Float64Array;
  readonly #signal: SignalFacts;

  /** @param table the settings of that cycle's table, whatever its bits */
  constructor(cycle: Float64Array, table: TableSettings) {
    const { variance } = spreadOf(cycle);
    this.#cycle = cycle;
    this.#table = table;
    this.#dither = ditherOf(cycle.length, table);
    this.#error = new Float64Array(cycle.length);
    this.#signal = { variance, isConstant: isConstant(cycle, variance), strongest: strongestLineOf(cycle) };
  }

  /** @throws {Refusal} where the codes at this depth cannot be folded as asked. */
  at(bits: number): SizeFigures {
    const table = { ...this.#table, bits };
    const error = this.#error;
    // Shaping and folding look at the codes themselves; all others need no more than their error.
    if (table.shaping !== 0 || table.fold !== 'none') this.#throughCodes(table);
    else errorInto(error, this.#cycle, table, this.#dither);
    const { variance } = spreadOf(error);
    const { snrDb, unwantedDb, exact } = againstSignal(this.#signal, variance, strongestLineOf(error));
    const storedCount = table.fold === 'quarter' ? table.length / 4 : table.length;
    return { snrDb, unwantedDb, exact, tableBytes: tableBytesOf(storedCount, bits) };
  }

  #throughCodes(table: TableSettings): void {
    const { codes } = quantise(this.#cycle, table);
    storedWords(codes, table);
    const values = valuesOf(codes, table);
    for (let k = 0; k < values.length; k += 1) this.#error[k] = values[k] - this.#cycle[k];
  }
}
