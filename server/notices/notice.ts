import type { Verdict } from '../../shared/contract/index.ts';

/** The revision that something happened to; people by their numbers, null where an account is gone. */
interface OfARevision {
  readonly table: { readonly slug: string; readonly title: string };
  readonly number: number;
}

interface WithAuthors {
  readonly makerId: number | null;
  readonly submitterId: number | null;
}

export interface ReviewAsked extends OfARevision, WithAuthors {
  readonly kind: 'review-asked';
  /** While it is on, neither maker nor submitter may judge. */
  readonly twoPersonRule: boolean;
  readonly message: string;
}

export interface VerdictGiven extends OfARevision, WithAuthors {
  readonly kind: 'verdict';
  readonly verdict: Verdict;
  readonly note: string;
}

export interface Commented extends OfARevision, WithAuthors {
  readonly kind: 'comment';
  /** Who has commented before; doubles and the actor may be among them. */
  readonly commenterIds: readonly number[];
  /** The reviewers who have judged this revision. */
  readonly judgeIds: readonly number[];
  readonly text: string;
  /** The setting that it is about, as `table.bits`. */
  readonly path: string | null;
}

export interface Withdrawn extends OfARevision {
  readonly kind: 'withdrawal';
  readonly reason: string;
}

/** Something that members are told about by mail. */
export type Notice = ReviewAsked | VerdictGiven | Commented | Withdrawn;
