import type { Definition, Source } from '../../../../shared/contract/index.ts';
import { fitsTable } from '../../../../shared/waveform/index.ts';

/** Whether a table of some length leaves out a partial that is heard: it would then not be the same wave. */
export function leavesOut({ source, table }: Definition, tableLength: number): boolean {
  return !fitsTable(highestHeard(source), { length: tableLength, cycles: table.cycles });
}

/** The highest harmonic with an amplitude, in all parts of a mix; 0 where there is none. */
function highestHeard(source: Source): number {
  switch (source.kind) {
    case 'harmonics':
      return source.partials.reduce(
        (most, { harmonic, amplitude }) => (amplitude === 0 ? most : Math.max(most, harmonic)),
        0,
      );
    case 'mix':
      return source.parts.reduce((most, part) => Math.max(most, highestHeard(part.source)), 0);
    default:
      return 0;
  }
}
