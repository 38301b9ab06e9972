import {
  limits,
  type Definition,
  type Ladder,
  type OutputFilter,
  type TrialSettings,
} from '../contract/index.ts';
import { tabulate } from '../tabulate.ts';
import { filterGain, holdGain } from './filter.ts';
import { Trials } from './trials.ts';

export interface SinadOfBits {
  readonly bits: number;
  /** Of the codes by themselves, and median over ladders behind hold and filter, in dB. */
  readonly codesDb: number | null;
  readonly outputDb: number | null;
}

export interface BitsThatMatter {
  readonly byBits: readonly SinadOfBits[];
  /** The fewest bits whose SINAD at the output is within 1 dB of the best; null where there is no SINAD. */
  readonly enough: number | null;
}

const enoughDb = 1;

/**
 * SINAD of a table against the bits of its ladder: how many bits still matter behind these resistors and this
 * filter. Each number of bits quantises the table anew and plays it through ladders drawn within the tolerance.
 * Measured levels of the definition, and the ladder's own resistors, belong to one number of bits and are left out.
 */
export function sinadAgainstBits(
  definition: Definition,
  { rungs: _rungs, series: _series, terminator: _terminator, ...ladder }: Ladder,
  settings: TrialSettings,
  { filter, sampleRateHz }: { filter: OutputFilter; sampleRateHz: number },
): BitsThatMatter {
  const { levels: _levels, ...table } = definition.table;
  const gains = Float64Array.from({ length: Math.floor(table.length / 2) + 1 }, (_, bin) => {
    const hz = (bin * sampleRateHz) / table.length;
    return holdGain(hz, sampleRateHz) * filterGain(filter, hz);
  });
  const byBits: SinadOfBits[] = [];
  for (let bits = limits.bits.min; bits <= limits.bits.max; bits += 1) {
    const { codes, cycle, report } = tabulate({ ...definition, table: { ...table, bits, fold: 'none' } });
    const trials = new Trials({ ...ladder, bits }, settings, { codes, cycle, range: table.range, gains });
    trials.run(settings.trials);
    byBits.push({ bits, codesDb: report.sinadDb, outputDb: trials.summary().sinadDb.p50 });
  }
  const best = Math.max(...byBits.map(({ outputDb }) => outputDb ?? -Infinity));
  const enough = byBits.find(({ outputDb }) => outputDb !== null && outputDb >= best - enoughDb);
  return { byBits, enough: enough?.bits ?? null };
}
