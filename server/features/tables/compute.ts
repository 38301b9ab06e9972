import { Refusal } from '../../../shared/contract/index.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import type { BuiltRevision } from './build-revision.ts';

/**
 * Computes what a request's `definition` becomes, in a worker thread.
 *
 * @throws {Problem} `validation` (422), naming each field at fault by its path in the request
 */
export async function computeRevision(jobs: ServerDeps['jobs'], definition: unknown): Promise<BuiltRevision> {
  try {
    return await jobs.run('buildRevision', definition);
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    throw new Problem('validation', {
      errors: error.problems.map((problem) => ({ ...problem, path: withinDefinition(problem.path) })),
    });
  }
}

const withinDefinition = (path: string) => {
  if (/^definition(?![\w-])/.test(path)) return path;
  return path.startsWith('[') ? `definition${path}` : `definition.${path}`;
};
