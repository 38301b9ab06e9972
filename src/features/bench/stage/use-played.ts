import { useMemo } from 'react';
import type { Played } from '../../../workers/stage-messages.ts';
import { useCalmTable } from '../state/tables.ts';
import { useBench } from '../state/use-bench.ts';
import { sampleRateOf, toneOf } from '../state/wave.ts';

/** The table on the bench as it is played; null until one is built. The same object while nothing changes. */
export function usePlayed(): Played | null {
  const table = useCalmTable();
  const playback = useBench(({ history }) => history.present.playback);
  return useMemo(() => {
    if (table === null) return null;
    const { codes, cycle, definition } = table;
    const sampleRateHz = sampleRateOf(playback, definition.table);
    if (!(sampleRateHz > 0) || !Number.isFinite(sampleRateHz)) return null;
    return {
      table: definition.table,
      codes,
      cycle,
      sampleRateHz,
      toneHz: toneOf(playback, definition.table),
    };
  }, [table, playback]);
}
