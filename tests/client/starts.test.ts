import { expect, test } from 'vitest';
import { checkDefinition, teamDefaultsSchema } from '../../shared/contract/index.ts';
import { startsFor } from '../../src/features/bench/save/starts.ts';
import { examples } from '../../src/features/bench/state/examples.ts';

const work = examples[0].work;
const team = {
  teamName: 'Ninth Fathom',
  defaults: teamDefaultsSchema.parse({
    bits: 12,
    length: 500,
    target: 'avr',
    arrayPrefix: 'nf_',
    licenceLine: 'CC0',
  }),
};

test('without a team the worked examples are there as they are', () => {
  const starts = startsFor(null);
  expect(starts.map(({ title }) => title)).toEqual(examples.map(({ title }) => title));
  for (const [index, { begin }] of starts.entries()) {
    expect(begin(work)).toEqual({ ...examples[index].work, exporting: work.exporting });
  }
});

test('a team’s defaults come first as a plain sine, and its export goes with every start', () => {
  const [plain, ...worked] = startsFor(team);
  const begun = plain.begin(work);
  expect(begun.definition.table).toMatchObject({ bits: 12, length: 500 });
  expect(checkDefinition(begun.definition)).toHaveProperty('definition');
  expect(worked).toHaveLength(examples.length);
  for (const { begin } of [plain, ...worked]) {
    const { exporting } = begin({ ...work, exporting: { target: 'c99', options: { avr: { port: 'D' } } } });
    expect(exporting).toEqual({
      target: 'avr',
      options: { avr: { port: 'D', arrayPrefix: 'nf_', licenceLine: 'CC0' } },
    });
  }
});
