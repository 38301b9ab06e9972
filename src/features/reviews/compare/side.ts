import type { Revision } from '../../../../shared/contract/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';

/** One of the two revisions that are compared, as it was stored. */
export interface Side {
  /** Which table it is of. */
  readonly slug: string;
  readonly title: string;
  readonly revision: Revision;
  readonly table: TableAnswer;
}

/** Both, the earlier or first one as `a`. */
export interface Pair {
  readonly a: Side;
  readonly b: Side;
}

/** `revision 3`, with the table's name where the two are of different tables. */
export function sideNames({ a, b }: { a: NamedSide; b: NamedSide }): { a: string; b: string } {
  const say = ({ title, number }: NamedSide) =>
    a.slug === b.slug ? `revision ${number}` : `${title}, revision ${number}`;
  return { a: say(a), b: say(b) };
}

interface NamedSide {
  readonly slug: string;
  readonly title: string;
  readonly number: number;
}
