import type { Definition, Source, TableSettings, Warning } from '../contract/index.ts';
import { harmonicsCycle } from './harmonics.ts';
import { pointsCycle } from './points.ts';
import { samplesCycle } from './samples.ts';

/** A source at the table's phases, before it is levelled. */
export interface Synthesis {
  readonly cycle: Float64Array;
  /** The source's largest amplitude, offset, y or value: what a "zero signal" is measured against (§3.1). */
  readonly largestInput: number;
  readonly warnings: readonly Warning[];
}

/** Samples the definition's source at each entry of the table (§2). */
export function synthesise({ source, table }: Definition): Synthesis {
  const warnings: Warning[] = [];
  const cycle = sourceCycle(source, table, 'source', warnings);
  return { cycle, largestInput: largestInputOf(source), warnings };
}

function sourceCycle(source: Source, table: TableSettings, path: string, warnings: Warning[]): Float64Array {
  switch (source.kind) {
    case 'harmonics':
      return harmonicsCycle(source, table, path, warnings);
    case 'points':
      return pointsCycle(source, table);
    case 'samples':
      return samplesCycle(source, table);
    case 'mix': {
      const isProduct = source.operation === 'product';
      const mixed = new Float64Array(table.length).fill(isProduct ? 1 : 0);
      source.parts.forEach(({ gain, source: inner }, index) => {
        const part = sourceCycle(inner, table, `${path}.parts[${index}].source`, warnings);
        for (let k = 0; k < mixed.length; k += 1) {
          if (isProduct) mixed[k] *= gain * part[k];
          else mixed[k] += gain * part[k];
        }
      });
      return mixed;
    }
  }
}

function largestInputOf(source: Source): number {
  const largest = (numbers: Iterable<number>, start = 0) => {
    let most = start;
    for (const number of numbers) most = Math.max(most, Math.abs(number));
    return most;
  };
  switch (source.kind) {
    case 'harmonics':
      return largest(
        source.partials.map(({ amplitude }) => amplitude),
        Math.abs(source.offset),
      );
    case 'points':
      return largest(source.points.map(({ y }) => y));
    case 'samples':
      return largest(source.values);
    case 'mix':
      return largest(source.parts.map((part) => largestInputOf(part.source)));
  }
}
