/** One thing that a tool, not ours, has found to be so. */
export interface Proof {
  readonly case: string;
  readonly tool: string;
  readonly proven: string;
  /** Clock cycles from each write of a port to its next one, all alike. */
  readonly cyclesPerWord?: number;
  /** Most clock cycles of an interrupt handler from its entry to the return, response as the simulator has it. */
  readonly handlerCycles?: number;
  /** Instructions from entry to return, or of one turn of a loop: counted, not timed. */
  readonly instructions?: number;
}

/** What all of a target's cases have in common. */
export const each = (cases: readonly { readonly title: string }[], tool: string, proven: string): Proof[] =>
  cases.map(({ title }) => ({ case: title, tool, proven }));
