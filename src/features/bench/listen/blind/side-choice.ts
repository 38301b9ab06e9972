import type { PickedRevision } from '../../../../forms/revision-fields.tsx';

/** What one of the two can be. */
export type SideKind = 'ideal' | 'table' | 'fewer' | 'revision' | 'rate';

/** One of the two as it is chosen. What another kind asks for is kept, so that going back finds it. */
export interface SideChoice {
  readonly kind: SideKind;
  /** Null until one is set: two below the table's. */
  readonly bits: number | null;
  /** Null until one is set: half the bench's. */
  readonly sampleRateHz: number | null;
  readonly picked: PickedRevision | null;
}

export const choiceOf = (kind: SideKind): SideChoice => ({
  kind,
  bits: null,
  sampleRateHz: null,
  picked: null,
});
