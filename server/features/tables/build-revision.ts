import { buildTable } from '../../../shared/build-table.ts';
import type { Definition, Report, Warning } from '../../../shared/contract/index.ts';
import { engineVersion } from '../../../shared/engine-version.ts';
import { digestOf } from '../../../shared/firmware/index.ts';
import { drawingOf } from './drawing.ts';

/** All that is computed of a revision; it never changes once it is saved. */
export interface BuiltRevision {
  /** As parsed, defaults filled in. */
  readonly definition: Definition;
  readonly codes: Uint16Array;
  readonly report: Report;
  readonly warnings: readonly Warning[];
  readonly engineVersion: string;
  readonly digest: string;
  readonly drawing: Uint8Array;
}

/**
 * Computes a revision from whatever came in as a definition; for a worker thread.
 *
 * @throws {Refusal} naming each field at fault
 */
export function buildRevision(input: unknown): BuiltRevision {
  const { definition, codes, report, warnings } = buildTable(input);
  return {
    definition,
    codes,
    report,
    warnings,
    engineVersion,
    digest: digestOf({ definition, engineVersion, codes }),
    drawing: drawingOf(codes, definition.table.bits),
  };
}
