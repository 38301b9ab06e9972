import type { TargetProof } from '../../../shared/firmware/index.ts';

/** One thing that a tool, not ours, has found to be so. */
export type Proof = TargetProof;

/** What all of a target's cases have in common. */
export const each = (cases: readonly { readonly title: string }[], tool: string, proven: string): Proof[] =>
  cases.map(({ title }) => ({ case: title, tool, proven }));
