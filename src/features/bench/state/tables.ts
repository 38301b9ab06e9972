import { calmed, joined, lasting, partOf, useLive, type Live } from '../../../live/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { liveBench } from './use-bench.ts';
import { sampleRateOf } from './wave.ts';

/** Figures are for reading: while something is dragged they change at most this often, in milliseconds. */
const calmMs = 100;

/** Most tables are there before anybody could read that they are being built. */
const lateMs = 400;

const made = () => {
  const table = liveBench((state) => state.table);
  const playback = liveBench(({ history }) => history.present.playback);
  const firstTable = partOf(table, thereIs);
  return {
    table: firstTable,
    sampleRateHz: joined(firstTable, playback, ({ definition }, how) => sampleRateOf(how, definition.table)),
    calmTable: calmed(table, calmMs),
    isLate: lasting(
      liveBench((state) => state.isBuilding),
      lateMs,
    ),
  };
};

let tables: ReturnType<typeof made> | null = null;

function theTables() {
  return (tables ??= made());
}

/** The newest table and the rate it is played at, for drawings. There must be a table by then. */
export function liveTable(): { table: Live<TableAnswer>; sampleRateHz: Live<number> } {
  return theTables();
}

/** The newest table for figures and whatever else may follow a drag a little later. */
export function useCalmTable(): TableAnswer | null {
  return useLive(theTables().calmTable);
}

/** Whether the table on its way has been long in coming. */
export function useIsLate(): boolean {
  return useLive(theTables().isLate);
}

function thereIs(table: TableAnswer | null): TableAnswer {
  if (table === null) throw new Error('No table has been built yet.');
  return table;
}
