import type { Definition, Problem } from '../../shared/contract/index.ts';
import type { BuiltTable } from '../../shared/tabulate.ts';

/** A parsed definition that waits to be built. */
export interface EngineJob {
  readonly id: number;
  readonly definition: Definition;
}

/** A built table with what the drawings need beside it. */
export interface TableAnswer extends BuiltTable {
  /** Height of one LSB in the units of `cycle` (engine specification §3.5). */
  readonly lsb: number;
  /** `values − cycle` in LSB. */
  readonly errorLsb: Float64Array;
}

interface Refused {
  readonly kind: 'refused';
  readonly problems: readonly Problem[];
}

interface Failed {
  readonly kind: 'failed';
  readonly message: string;
}

/** What comes out of the worker. Arrays are moved, not copied; the definition stays where it was. */
export type EngineMessage = { readonly id: number } & (
  { readonly kind: 'built'; readonly table: Omit<TableAnswer, 'definition'> } | Refused | Failed
);

/** What the client hands on. */
export type EngineReply = { readonly kind: 'built'; readonly table: TableAnswer } | Refused | Failed;
