import { buildTable, type BuiltTable } from '../../../shared/build-table.ts';
import {
  Refusal,
  type Problem,
  type RenderAnswer,
  type RenderRequest,
  type ReportAnswer,
} from '../../../shared/contract/index.ts';
import { engineVersion } from '../../../shared/engine-version.ts';
import { digestOf, renderFiles, targetOf } from '../../../shared/firmware/index.ts';
import { readTemplates } from '../../tables/read-templates.ts';
import { tableReportOf } from '../../tables/table-report.ts';

/**
 * The report of whatever came in as a definition; for a worker thread.
 *
 * @throws {Refusal} naming each field at fault
 */
export function reportDefinition(definition: unknown): ReportAnswer {
  const table = buildTable(definition);
  return { ...tableReportOf(table), digest: digestFor(table) };
}

/**
 * Files of one export of a definition; for a worker thread.
 *
 * @throws {Refusal} naming each field at fault by its path in the request
 */
export function renderDefinition({ definition, target, options }: RenderRequest): RenderAnswer {
  targetOf(target);
  const table = renamed(() => buildTable(definition), withinDefinition);
  const files = renamed(
    () => renderFiles(table, target, options, readTemplates()),
    // What a target cannot take is an option, or else a field of the definition.
    (path) => (/^options(?![\w-])/.test(path) ? path : withinDefinition(path)),
  );
  return { files, digest: digestFor(table) };
}

const digestFor = ({ definition, codes }: BuiltTable) => digestOf({ definition, engineVersion, codes });

const withinDefinition = (path: string) => {
  if (path === 'definition') return path;
  return path.startsWith('[') ? `definition${path}` : `definition.${path}`;
};

function renamed<Result>(work: () => Result, rename: (path: string) => string): Result {
  try {
    return work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const [first, ...others] = error.problems.map((problem): Problem => ({
      ...problem,
      path: rename(problem.path),
    }));
    throw new Refusal(first, ...others);
  }
}
