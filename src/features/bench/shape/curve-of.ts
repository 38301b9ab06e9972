import { tableSchema, type Source } from '../../../../shared/contract/index.ts';
import { synthesise } from '../../../../shared/waveform/index.ts';

const plainTable = tableSchema.parse({});

/** One cycle of any source at so many even places; a draft that cannot be computed gives `null`. */
export function curveOf(source: Source, count: number): Float64Array | null {
  const { cycle } = synthesise({
    schema: 1,
    name: '-',
    source,
    level: { removeMean: false, normalise: 'none', level: 1, transfer: 'none' },
    table: { ...plainTable, length: count },
  });
  return cycle.every(Number.isFinite) ? cycle : null;
}
