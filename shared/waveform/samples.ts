import { linesOf } from '../dft/index.ts';
import type { SamplesSource, TableSettings } from '../contract/index.ts';
import { bandlimitedCycle, nyquistHarmonic } from './bandlimit.ts';
import { phasesOf, stepFraction } from './phases.ts';

/** One recorded cycle, resampled to the table's phases. */
export function samplesCycle(source: SamplesSource, table: TableSettings): Float64Array {
  const values = Float64Array.from(source.values);
  switch (source.resampling) {
    case 'bandlimited':
      return bandlimitedCycle(
        linesOf(values),
        values.length,
        Math.min(values.length / 2, nyquistHarmonic(table)),
        table,
      );
    case 'linear':
      return linearCycle(values, table);
    case 'hold':
      return heldCycle(values, table);
  }
}

function linearCycle(values: Float64Array, table: TableSettings): Float64Array {
  const count = values.length;
  return phasesOf(table).map((t) => {
    const at = t * count;
    const before = Math.floor(at);
    const left = values[before % count];
    const right = values[(before + 1) % count];
    return left + (right - left) * (at - before);
  });
}

function heldCycle(values: Float64Array, table: TableSettings): Float64Array {
  const count = values.length;
  const { length, cycles, startPhaseDeg } = table;
  if (cycles !== 1 || startPhaseDeg !== 0) return phasesOf(table).map((t) => values[Math.floor(t * count)]);

  // In whole numbers, so that an entry on the edge between two values takes the later one on every machine.
  const twiceFraction = 2 * stepFraction(table);
  const held = new Float64Array(length);
  for (let k = 0; k < length; k += 1) {
    held[k] = values[Math.floor(((2 * k + twiceFraction) * count) / (2 * length))];
  }
  return held;
}
