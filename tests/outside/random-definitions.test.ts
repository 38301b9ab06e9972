import { expect, it } from 'vitest';
import { buildTable, type BuiltTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput } from '../../shared/contract/index.ts';
import { anyDefinition } from '../engine/support/definitions.ts';
import { examplesOf } from '../engine/support/seeded.ts';
import { askPython } from './numpy/python.ts';
import { commitSeed } from './numpy/seed.ts';

// Source: numpy/model.py, an independent program of the engine specification on NumPy and SciPy.

const count = 200;

interface ModelTable {
  cycle: number[];
  codes: number[];
  stored: number[];
  report: Record<string, unknown>;
  spectrum: number[];
  added: number[];
  warnings: string[];
}

function tableOrRefusal(definition: DefinitionInput): BuiltTable | { refused: string } {
  try {
    return buildTable(definition);
  } catch (error) {
    if (error instanceof Refusal) return { refused: error.problems[0].path };
    throw error;
  }
}

/** 1e-6 relative or 1e-7 absolute; decibels within 0.001. */
const isClose = (actual: number, wanted: number) =>
  Math.abs(actual - wanted) <= Math.max(1e-7, 1e-6 * Math.abs(wanted));
const isCloseDb = (actual: number, wanted: number) => Math.abs(actual - wanted) <= 0.001;

function differencesIn(actual: BuiltTable, wanted: ModelTable): string[] {
  const differences: string[] = [];
  const compare = (
    name: string,
    list: ArrayLike<number>,
    against: number[],
    equal: (a: number, b: number) => boolean,
  ) => {
    if (list.length !== against.length)
      differences.push(`${name}: ${list.length} entries, wanted ${against.length}`);
    const k = against.findIndex((value, index) => !equal(list[index], value));
    if (k >= 0) differences.push(`${name}[${k}]: ${list[k]}, wanted ${against[k]}`);
  };
  compare('codes', actual.codes, wanted.codes, Object.is);
  compare('stored', actual.stored, wanted.stored, Object.is);
  compare('cycle', actual.cycle, wanted.cycle, isClose);
  compare('spectrum', actual.spectrum.amplitudes, wanted.spectrum, isClose);
  compare('added', actual.spectrum.added, wanted.added, isClose);

  const warnings = [...new Set(actual.warnings.map(({ code }) => code))].sort();
  if (String(warnings) !== String(wanted.warnings))
    differences.push(`warnings: ${warnings}, wanted ${wanted.warnings}`);
  expect(Object.keys(actual.report).sort()).toEqual(Object.keys(wanted.report).sort());
  for (const [figure, value] of Object.entries(wanted.report)) {
    const told = actual.report[figure as keyof typeof actual.report];
    const same =
      typeof value === 'number' && typeof told === 'number'
        ? (figure.endsWith('Db') ? isCloseDb : isClose)(told, value)
        : JSON.stringify(told) === JSON.stringify(value);
    if (!same) differences.push(`${figure}: ${JSON.stringify(told)}, wanted ${JSON.stringify(value)}`);
  }
  return differences;
}

it(`${count} random definitions give the tables of the NumPy program`, () => {
  const seed = commitSeed();
  console.log(`Random definitions of seed ${seed}; DEFINITIONS_SEED=${seed} tries them again.`);
  const definitions = examplesOf(anyDefinition, count, seed);
  const wanted = askPython<(ModelTable | { refused: string })[]>('model.py', definitions);

  const faults: string[] = [];
  let refused = 0;
  definitions.forEach((definition, index) => {
    const table = tableOrRefusal(definition);
    const model = wanted[index];
    if ('refused' in table || 'refused' in model) {
      refused += 1;
      const [ours, theirs] = [table, model].map((result) => ('refused' in result ? result.refused : 'taken'));
      if (ours !== theirs) faults.push(`refused ${ours}, wanted ${theirs}: ${JSON.stringify(definition)}`);
      return;
    }
    const differences = differencesIn(table, model);
    if (differences.length > 0) faults.push(`${differences.join('; ')}\n  in ${JSON.stringify(definition)}`);
  });
  expect(faults).toEqual([]);
  expect(refused).toBeLessThan(count / 10);
});
