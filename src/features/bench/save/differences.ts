import type { Definition } from '../../../../shared/contract/index.ts';
import { changedSettings } from '../../../settings/index.ts';

/** A setting that two definitions do not share, in words. */
export interface Difference {
  readonly name: string;
  readonly mine: string;
  readonly theirs: string;
}

/** More than these are counted, not listed. */
const mostListed = 12;

/** Says how two definitions differ, setting by setting, in the form's own words and order. */
export function differencesOf(
  mine: Definition,
  theirs: Definition,
): { differences: readonly Difference[]; others: number } {
  const all = changedSettings(mine, theirs);
  return {
    differences: all
      .slice(0, mostListed)
      .map(({ name, before, after }) => ({ name, mine: before, theirs: after })),
    others: Math.max(0, all.length - mostListed),
  };
}
