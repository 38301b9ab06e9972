import { readTemplates } from '../../../server/tables/read-templates.ts';
import { tabulate } from '../../../shared/build-table.ts';
import { parseDefinition, type DefinitionInput } from '../../../shared/contract/index.ts';
import { renderFiles } from '../../../shared/firmware/index.ts';

type TableInput = NonNullable<DefinitionInput['table']>;

/** A tone with some harmonics: neighbouring entries differ, so that a slip of one entry shows. */
export const tone = (table: TableInput, name = 'fog tone'): DefinitionInput => ({
  schema: 1,
  name,
  source: {
    kind: 'harmonics',
    partials: [
      { harmonic: 1, amplitude: 1, phaseDeg: 20 },
      { harmonic: 2, amplitude: 0.4, phaseDeg: 75 },
      { harmonic: 3, amplitude: 0.2, phaseDeg: 190 },
    ],
  },
  table,
});

/** A sine: the one wave here with the symmetry that a fold needs. */
export const sine = (table: TableInput): DefinitionInput => ({
  schema: 1,
  name: 'sine',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table,
});

/** Builds a table and renders its files, with an array `fog_tone` where no other name is asked for. */
export function exported(definition: DefinitionInput, target: string, options: object = {}) {
  const table = tabulate(parseDefinition(definition));
  return { table, files: renderFiles(table, target, { arrayName: 'fog_tone', ...options }, readTemplates()) };
}

/** The shortest table: low, high. */
export const pair: DefinitionInput = {
  ...sine({ length: 2 }),
  source: {
    kind: 'points',
    interpolation: 'step',
    points: [
      { x: 0, y: -1 },
      { x: 0.5, y: 1 },
    ],
  },
};
