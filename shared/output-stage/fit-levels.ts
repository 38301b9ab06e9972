import { analyseTable } from '../analysis/index.ts';
import { parseDefinition, type Definition, type Report } from '../contract/index.ts';
import { tabulate } from '../tabulate.ts';

/** A field that measured levels do not go with, and what it became. */
export interface ChangedField {
  readonly path: string;
  readonly from: string | number;
  readonly to: string | number;
}

export interface FittedTable {
  /** The definition with the levels in `table.levels`. */
  readonly definition: Definition;
  readonly changed: readonly ChangedField[];
  /** Figures at the real output: of the codes as they were, and of codes chosen for these levels. */
  readonly before: Report;
  readonly after: Report;
}

/** Voltages are kept to nine digits: finer than anybody measures, and half as long in a file. */
const kept = (volts: number) => Number(volts.toPrecision(9));

/**
 * Fits a table to the real converter: each sample takes the code whose level is nearest (engine specification §3.4).
 * What cannot go with measured levels, dither, shaping, mid-tread, other roundings and the fold, is set aside.
 *
 * @param volts level of each code, measured or from measured resistors
 * @throws {Refusal} where levels and definition do not go together
 */
export function fitLevels(definition: Definition, volts: ArrayLike<number>): FittedTable {
  const own = { dither: 'none', shaping: 0, scale: 'full-span', rounding: 'half-up', fold: 'none' } as const;
  const changed: ChangedField[] = [];
  for (const [field, to] of Object.entries(own)) {
    const from = definition.table[field as keyof typeof own];
    if (from !== to) changed.push({ path: `table.${field}`, from, to });
  }
  const fitted = parseDefinition({
    ...definition,
    table: { ...definition.table, ...own, levels: Array.from(volts, kept) },
  });
  const built = tabulate(definition);
  const before = analyseTable(
    { cycle: built.cycle, clippedSamples: built.report.clippedSamples },
    { codes: built.codes, clippedCodes: built.report.clippedCodes },
    fitted.table,
  ).report;
  return { definition: fitted, changed, before, after: tabulate(fitted).report };
}

/**
 * Level of every code from measured bit weights, for converters whose bits add up.
 *
 * @param weights what each bit alone adds, in V, least significant first
 * @param lowVolts level of code 0, in V
 */
export function levelsFromWeights(weights: readonly number[], lowVolts: number): Float64Array {
  const levels = new Float64Array(2 ** weights.length).fill(lowVolts);
  weights.forEach((weight, bit) => {
    const below = 1 << bit;
    for (let code = 0; code < below; code += 1) levels[below + code] = levels[code] + weight;
  });
  return levels;
}
