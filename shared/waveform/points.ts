import { lowLinesOf } from '../dft/index.ts';
import type { PointsSource, TableSettings } from '../contract/index.ts';
import { bandlimitedCycle, nyquistHarmonic } from './bandlimit.ts';
import { closedCurve } from './interpolate.ts';
import { phasesOf } from './phases.ts';

/** Points of one cycle that are taken for each table entry before the harmonics above the limit are removed. */
const oversampling = 16;

/** A curve through points at the table's phases. */
export function pointsCycle(source: PointsSource, table: TableSettings): Float64Array {
  const curve = closedCurve(source);
  if (!source.bandlimit) return phasesOf(table).map(curve);

  const count = oversampling * table.length;
  const dense = new Float64Array(count);
  for (let j = 0; j < count; j += 1) dense[j] = curve(j / count);
  return bandlimitedCycle(lowLinesOf(dense, oversampling), count, nyquistHarmonic(table), table);
}
