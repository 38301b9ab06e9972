import stored from './proofs.json' with { type: 'json' };

/** What a tool, not ours, has found of a target: kept in the repository, found anew by each `npm run proof`. */
export interface TargetProof {
  readonly case: string;
  readonly tool: string;
  readonly proven: string;
  /** Clock cycles from each write of a port to its next one. */
  readonly cyclesPerWord?: number;
  /** Most clock cycles of an interrupt handler, with the simulator's 2 for the response. */
  readonly handlerCycles?: number;
  /** Clock cycles by which the handler's first write varies: in the exported program, and with calls in its main. */
  readonly entryVariesBy?: number;
  readonly entryVariesWithCalls?: number;
  /** Instructions of a handler, or of one turn of a loop: counted, not timed. */
  readonly instructions?: number;
  /** Most clock cycles of one call of a pattern's tick, call and return included. */
  readonly tickCycles?: number;
}

/** By target. */
export const proofs: Readonly<Record<string, readonly TargetProof[]>> = stored;

/** The proofs of a target, in the order of their run; none for a target that there is not. */
export const proofsOf = (target: string): readonly TargetProof[] => proofs[target] ?? [];
