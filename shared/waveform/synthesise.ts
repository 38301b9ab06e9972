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
  let largest = 0;
  const take = (number: number) => {
    largest = Math.max(largest, Math.abs(number));
  };
  switch (source.kind) {
    case 'harmonics':
      take(source.offset);
      for (const { amplitude } of source.partials) take(amplitude);
      return largest;
    case 'points':
      for (const { y } of source.points) take(y);
      return largest;
    case 'samples':
      source.values.forEach(take);
      return largest;
    case 'mix':
      for (const part of source.parts) take(largestInputOf(part.source));
      return largest;
  }
}
