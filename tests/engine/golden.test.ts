import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { analyseAccumulator, type Accumulator } from '../../shared/playback/index.ts';

// Results of an independent model of the engine specification (NumPy, SciPy). The copy is held to its digest.
const folder = new URL('./golden/', import.meta.url);
const bytes = readFileSync(new URL('golden.json', folder));

interface GoldenTable {
  definition: { name: string };
  codes: number[];
  stored: number[];
  report: Record<string, unknown>;
  spectrum: number[];
  cycle: number[];
}
interface GoldenAccumulator extends Accumulator {
  definition: { table: { length: number } };
  period: number;
  carrierBin: number;
  worstOtherDbc: number;
  worstOtherBin: number;
  snrDb: number;
}
const golden = JSON.parse(bytes.toString('utf8')) as {
  tables: GoldenTable[];
  accumulators: GoldenAccumulator[];
};

/** 1e-6 relative or 1e-7 absolute. */
function isClose(actual: number, wanted: number): boolean {
  return Math.abs(actual - wanted) <= Math.max(1e-7, 1e-6 * Math.abs(wanted));
}

describe('golden tables', () => {
  it('are the copy whose digest is kept', () => {
    const kept = readFileSync(new URL('golden.json.sha256', folder), 'utf8').split(/\s/)[0];
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(kept);
  });

  it.each(golden.tables.map((table) => [table.definition.name, table] as const))('%s', (_name, wanted) => {
    const table = buildTable(wanted.definition);
    expect(Array.from(table.codes)).toEqual(wanted.codes);
    expect(Array.from(table.stored)).toEqual(wanted.stored);

    const off: string[] = [];
    for (const [figure, value] of Object.entries(wanted.report)) {
      const actual = table.report[figure as keyof typeof table.report];
      if (typeof value !== 'number') expect(actual, figure).toEqual(value);
      else if (typeof actual !== 'number') off.push(`${figure}: ${String(actual)}, wanted ${value}`);
      else if (figure.endsWith('Db') ? Math.abs(actual - value) > 0.001 : !isClose(actual, value)) {
        off.push(`${figure}: ${actual}, wanted ${value}`);
      }
    }
    wanted.cycle.forEach((value, k) => {
      if (!isClose(table.cycle[k], value)) off.push(`cycle[${k}]: ${table.cycle[k]}, wanted ${value}`);
    });
    wanted.spectrum.forEach((value, k) => {
      if (!isClose(table.spectrum.amplitudes[k], value)) {
        off.push(`spectrum[${k}]: ${table.spectrum.amplitudes[k]}, wanted ${value}`);
      }
    });
    expect(off).toEqual([]);
  });
});

describe('golden accumulators', () => {
  it.each(golden.accumulators)(
    '$definition.table.length entries, $accumulatorBits bits, step word $stepWord',
    ({ definition, accumulatorBits, stepWord, period, carrierBin, worstOtherDbc, worstOtherBin, snrDb }) => {
      const figures = analyseAccumulator(buildTable(definition).values, { accumulatorBits, stepWord });
      expect(figures).toMatchObject({ period, carrierBin, worstOtherBin });
      expect(figures.worstOtherDbc).toBeCloseTo(worstOtherDbc, 6);
      expect(figures.snrDb).toBeCloseTo(snrDb, 6);
    },
  );
});
