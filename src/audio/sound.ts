import type { Drive, Sound } from '../../shared/listening/sound.ts';

export type { Drive, Score, ScoreEvent, Sound, Voice } from '../../shared/listening/sound.ts';

/** A table as it comes from the engine, one value an entry. The arrays are read, never changed. */
export interface HeardTable {
  /** The levelled cycle before it was quantised. */
  readonly cycle: Float64Array;
  /** What the codes stand for, in the units of `cycle`. */
  readonly values: Float64Array;
  readonly range: 'bipolar' | 'unipolar';
  /** Cycles of the wave in the table, K. */
  readonly tableCycles: number;
  readonly drive: Drive;
}

/** The plain sound of a table: `ideal` is the smooth curve, `table` the staircase of what its codes stand for. */
export function tableSound({ cycle, values, range, tableCycles, drive }: HeardTable): Sound {
  // A unipolar table swings by half as much about its mean; doubled, its full scale is ±1 too.
  const full = (entries: Float64Array) =>
    range === 'unipolar' ? entries.map((value) => 2 * value) : entries;
  return {
    voices: {
      ideal: { values: full(cycle), cycles: tableCycles, form: 'curve' },
      table: { values: full(values), cycles: tableCycles, form: 'staircase' },
    },
    drive,
  };
}
