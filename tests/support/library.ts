import type { DefinitionInput } from '../../shared/contract/index.ts';

/** A sine of 64 entries in 8 bits; `changes` go into its table. */
export const sineDefinition = (name: string, changes: DefinitionInput['table'] = {}): DefinitionInput => ({
  schema: 1,
  name,
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length: 64, bits: 8, ...changes },
});
