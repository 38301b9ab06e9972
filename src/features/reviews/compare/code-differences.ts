import type { TableAnswer } from '../../../workers/engine-messages.ts';

type Codes = Pick<TableAnswer, 'codes' | 'values' | 'lsb' | 'definition'>;

/** One entry whose codes differ. */
export interface CodeDifference {
  readonly index: number;
  readonly before: number;
  readonly after: number;
  /** After less before, in the unit of the whole. */
  readonly difference: number;
}

export type CodesCompared =
  | { readonly kind: 'other-length'; readonly before: number; readonly after: number }
  | {
      readonly kind: 'entry-by-entry';
      /** Codes; or LSB of the later table, where one code stands for another step in each. */
      readonly unit: 'codes' | 'LSB';
      /** After less before, one value an entry. */
      readonly differences: Float64Array;
      /** How many entries differ. */
      readonly count: number;
      /** The largest ones first, of equal ones the first entry first. */
      readonly largest: readonly CodeDifference[];
    };

/** Smaller differences, in LSB, come from computing alone. */
const leastLsb = 1e-9;

/** How the codes of two tables differ, entry by entry where they have as many of them; lists at most `listed`. */
export function compareCodes(before: Codes, after: Codes, listed = 20): CodesCompared {
  const length = after.codes.length;
  if (before.codes.length !== length) {
    return { kind: 'other-length', before: before.codes.length, after: length };
  }
  const unit = hasSameSteps(before, after) ? 'codes' : 'LSB';
  const differences = new Float64Array(length);
  const differing: number[] = [];
  for (let k = 0; k < length; k += 1) {
    differences[k] =
      unit === 'codes' ? after.codes[k] - before.codes[k] : (after.values[k] - before.values[k]) / after.lsb;
    if (Math.abs(differences[k]) > leastLsb) differing.push(k);
    else differences[k] = 0;
  }
  const largest = differing
    .sort((one, other) => Math.abs(differences[other]) - Math.abs(differences[one]) || one - other)
    .slice(0, listed)
    .map((index) => ({
      index,
      before: before.codes[index],
      after: after.codes[index],
      difference: differences[index],
    }));
  return { kind: 'entry-by-entry', unit, differences, count: differing.length, largest };
}

/** Whether the same code stands for the same value in both. */
function hasSameSteps(
  { definition: { table: one } }: Codes,
  { definition: { table: other } }: Codes,
): boolean {
  return (
    one.bits === other.bits &&
    one.range === other.range &&
    one.scale === other.scale &&
    JSON.stringify(one.levels) === JSON.stringify(other.levels)
  );
}
