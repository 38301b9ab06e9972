import { analyseTable, type Spectrum } from './analysis/index.ts';
import type { Definition, Report, Warning } from './contract/index.ts';
import { quantise, storedWords } from './quantiser/index.ts';
import { levelCycle, synthesise } from './waveform/index.ts';

/** What a definition becomes. All arrays belong to the caller. */
export interface BuiltTable {
  /** The definition as parsed, defaults filled in. */
  readonly definition: Definition;
  /** The levelled, clipped cycle `r`: one value an entry, in −1…1 (bipolar) or 0…1 (unipolar). */
  readonly cycle: Float64Array;
  /** What the codes stand for, `q`, in the units of `cycle` (§3.5). */
  readonly values: Float64Array;
  /** One code an entry, 0…2^bits − 1, before complement and coding. */
  readonly codes: Uint16Array;
  /** The words that are stored: complemented, coded and folded as asked (§3.6); negative in two's complement. */
  readonly stored: Int32Array;
  readonly report: Report;
  readonly spectrum: Spectrum;
  readonly warnings: readonly Warning[];
}

/**
 * The line from a parsed definition to its table: synthesise, level, quantise, analyse. A module apart from the
 * parser, so that the browser's worker, which gets definitions already parsed, does not carry it.
 *
 * @throws {Refusal} where the signal cannot be levelled or folded.
 */
export function tabulate(definition: Definition): BuiltTable {
  const synthesis = synthesise(definition);
  const levelled = levelCycle(synthesis, definition);
  const quantised = quantise(levelled.cycle, definition.table);
  const stored = storedWords(quantised.codes, definition.table);
  const { report, spectrum, values } = analyseTable(levelled, quantised, definition.table);
  return {
    definition,
    cycle: levelled.cycle,
    values,
    codes: quantised.codes,
    stored,
    report,
    spectrum,
    warnings: [...synthesis.warnings, ...levelled.warnings, ...quantised.warnings],
  };
}
