import { Refusal, checkDefinition, type Problem } from '../../../shared/contract/index.ts';
import { waveOf } from './waves.ts';

/** What is wrong with an input; a definition that is taken fails the test. */
export function problemsWith(input: unknown): readonly Problem[] {
  const checked = checkDefinition(input);
  if ('definition' in checked) throw new Error(`taken: ${JSON.stringify(input).slice(0, 200)}`);
  return checked.problems;
}

/** The definition of a sine with one field set, by its path, to anything at all. */
export function sineWith(path: string, value: unknown): unknown {
  const definition = structuredClone(waveOf({ level: {}, table: {} })) as Record<string, unknown>;
  const steps = path.split('.');
  const last = steps.pop() as string;
  const parent = steps.reduce((here, step) => here[step] as Record<string, unknown>, definition);
  parent[last] = value;
  return definition;
}

export const partialWith = (field: string, value: unknown) => ({
  schema: 1,
  name: 'wave',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0, [field]: value }] },
});
export const pointsWith = (points: unknown, interpolation: unknown = 'linear') => ({
  schema: 1,
  name: 'wave',
  source: { kind: 'points', interpolation, points },
});

/** What a refusal names; work that is not refused fails the test. */
export function problemsOf(work: () => unknown): readonly Problem[] {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems;
    throw error;
  }
  throw new Error('taken');
}
