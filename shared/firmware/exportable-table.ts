import type { Definition, Report } from '../contract/index.ts';

/** A table as it is exported: freshly built, or a saved revision with the figures and engine version stored then. */
export interface ExportableTable {
  readonly definition: Definition;
  /** One code an entry, before complement, coding and fold. */
  readonly codes: Uint16Array;
  /** The words to store (engine specification §3.6). */
  readonly stored: Int32Array;
  readonly report: Report;
  /** Version of the engine that built the codes; this engine's where left out. */
  readonly engineVersion?: string;
}
