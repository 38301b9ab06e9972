import type { DefinitionInput, SourceInput } from '../../../shared/contract/index.ts';

export const sineSource: SourceInput = {
  kind: 'harmonics',
  partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }],
};

/** A definition of a source, a table and a level; a sine where no source is named. */
export function waveOf({
  source = sineSource,
  level,
  table,
}: Partial<Pick<DefinitionInput, 'source' | 'level' | 'table'>> = {}): DefinitionInput {
  return { schema: 1, name: 'wave', source, ...(level && { level }), ...(table && { table }) };
}

/** Values taken as they are: one sample an entry, not normalised. */
export function valuesOf(
  values: Iterable<number>,
  table: NonNullable<DefinitionInput['table']> = {},
  level: NonNullable<DefinitionInput['level']> = { normalise: 'none' },
): DefinitionInput {
  const list = Array.from(values);
  return waveOf({
    source: { kind: 'samples', resampling: 'hold', values: list },
    level,
    table: { length: list.length, ...table },
  });
}
