import type { Definition, GeneratedFile, Report } from '../../../shared/contract/index.ts';
import { renderFiles } from '../../../shared/firmware/index.ts';
import { storedWords } from '../../../shared/quantiser/index.ts';
import { readTemplates } from '../../tables/read-templates.ts';

export interface RevisionExport {
  readonly definition: Definition;
  readonly codes: Uint16Array;
  readonly report: Report;
  readonly engineVersion: string;
  readonly target: string;
  readonly options: Readonly<Record<string, unknown>>;
}

/**
 * Files of a saved revision, from its codes and figures as they were stored; for a worker thread.
 *
 * @throws {Refusal} naming what the target cannot take
 */
export function renderRevision({ target, options, ...revision }: RevisionExport): GeneratedFile[] {
  const stored = storedWords(revision.codes, revision.definition.table);
  return renderFiles({ ...revision, stored }, target, options, readTemplates());
}
