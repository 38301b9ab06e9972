import type { DefinitionInput, LibraryTable } from '../../shared/contract/index.ts';
import { asPerson, type TestPerson, type TestTeam } from './people.ts';
import type { TestApp } from './test-app.ts';

/** A sine of 64 entries in 8 bits; `changes` go into its table. */
export const sineDefinition = (name: string, changes: DefinitionInput['table'] = {}): DefinitionInput => ({
  schema: 1,
  name,
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length: 64, bits: 8, ...changes },
});

/** Saves a new table as a person would; `changes` go into the request's body. */
export async function saveTable(
  test: TestApp,
  team: TestTeam,
  person: TestPerson,
  title: string,
  changes: object = {},
): Promise<LibraryTable> {
  const response = await asPerson(test, person).post(`/teams/${team.slug}/tables`, {
    title,
    definition: sineDefinition(title),
    ...changes,
  });
  if (response.status !== 201) throw new Error(response.text);
  return response.body;
}
