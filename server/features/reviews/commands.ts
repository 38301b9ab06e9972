import type {
  GiveVerdict,
  Hindrance,
  LimitOutcome,
  LimitSet,
  Review,
  RevisionState,
  Role,
  SubmitRevision,
  WithdrawRevision,
} from '../../../shared/contract/index.ts';
import { showValue } from '../../../shared/contract/index.ts';
import { appendEvent, type AuditEntry } from '../../audit/append-event.ts';
import type { AuditKey } from '../../audit/mac.ts';
import { holdTeam } from '../../auth/team-lock.ts';
import type { TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { lostRace, type Precondition } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import type { Notice } from '../../notices/notice.ts';
import { readLimitSets } from '../../tables/limit-sets.ts';
import { noRevision } from '../../tables/not-there.ts';
import { hindrancesOf, type Asker } from './hindrances.ts';
import { outcomesOf, presentReview, versionOf } from './presenter.ts';
import { findReview, lockTable, type ReviewRow } from './queries.ts';
import { sayFailures } from './say-failures.ts';
import { insertReview, storeState, updateReview, type Stamp } from './store.ts';

/** The transaction a command runs in, who gave it, and the revision it is about. */
export interface Command {
  readonly transaction: Executor;
  readonly auditKey: AuditKey;
  readonly scope: TeamScope;
  /** Has those who are to know told, in the same transaction. */
  readonly tell: (notice: Notice) => Promise<unknown>;
  readonly slug: string;
  readonly number: number;
}

/** A revision that nobody else can change for now, and by what rules. */
export interface Held {
  readonly row: ReviewRow;
  readonly asker: Asker;
  readonly stamp: Stamp;
}

/** @throws {Problem} `conflict` where it is no draft, or the table is archived */
export async function submitRevision(command: Command, { message }: SubmitRevision): Promise<Review> {
  const { transaction } = command;
  const { row, asker, stamp } = await hold(command, 'author');
  if (row.isArchived) {
    throw new Problem('conflict', { detail: 'The table is archived; restore it, then submit.' });
  }
  refuseHindered('submit', row, asker);
  const sets = await readLimitSets(transaction, stamp.teamId);
  const failedLimits = failuresIn(outcomesOf(row, sets)).length;
  await insertReview(transaction, stamp, row, { message, failedLimits });
  await storeState(transaction, stamp, row, 'in-review');
  return concluded(command, asker, sets, {
    action: 'revision.submitted',
    details: { message, failedLimits },
    notice: {
      kind: 'review-asked',
      ...authorsOf({ ...row, submittedById: stamp.userId }),
      twoPersonRule: asker.twoPersonRule,
      message,
    },
  });
}

/**
 * Vets or returns a revision. Its limits are checked here and kept with the verdict.
 *
 * @throws {Problem} `precondition-failed` with the review as it is now, `conflict` where it is not in review,
 *   `two-person-rule`, `validation` at `note` where reasons are wanted
 */
export async function giveVerdict(
  command: Command,
  precondition: Precondition,
  { verdict, note }: GiveVerdict,
): Promise<Review> {
  const { transaction } = command;
  const { row, asker, stamp } = await hold(command, 'reviewer');
  const sets = await readLimitSets(transaction, stamp.teamId);
  if (!precondition.holds(versionOf(row))) throw lostRace(presentReview(row, sets, asker));
  refuseHindered('judge', row, asker);
  const limits = outcomesOf(row, sets);
  const failures = failuresIn(limits);
  if (note === '' && verdict === 'returned') throw noteWanted('1 to 2000 characters: the reasons');
  if (note === '' && failures.length > 0) {
    throw noteWanted(`1 to 2000 characters: why it is vetted although ${sayFailures(failures)}`);
  }
  await updateReview(transaction, stamp, row, {
    verdict,
    note,
    limits,
    failedLimits: failures.length,
    decidedBy: stamp.userId,
    decidedAt: stamp.at,
  });
  await storeState(transaction, stamp, row, verdict);
  return concluded(command, asker, sets, {
    action: `revision.${verdict}`,
    details: { note, failedLimits: failures.length },
    notice: { kind: 'verdict', ...authorsOf(row), verdict, note },
  });
}

/** @throws {Problem} as `giveVerdict`; `conflict` where it is not vetted */
export async function withdrawRevision(
  command: Command,
  precondition: Precondition,
  { reason }: WithdrawRevision,
): Promise<Review> {
  const { transaction } = command;
  const { row, asker, stamp } = await hold(command, 'reviewer');
  const sets = await readLimitSets(transaction, stamp.teamId);
  if (!precondition.holds(versionOf(row))) throw lostRace(presentReview(row, sets, asker));
  refuseHindered('withdraw', row, asker);
  await updateReview(transaction, stamp, row, {
    withdrawnBy: stamp.userId,
    withdrawnAt: stamp.at,
    reason,
  });
  await storeState(transaction, stamp, row, 'withdrawn');
  return concluded(command, asker, sets, {
    action: 'revision.withdrawn',
    details: { reason },
    notice: { kind: 'withdrawal', reason },
  });
}

/**
 * Holds the team's rules, then the table, then reads: what is read is what stands until the end.
 *
 * @throws {Problem} `not-found`, `forbidden`
 */
export async function hold({ transaction, scope, slug, number }: Command, needed: Role): Promise<Held> {
  const { teamId, user } = scope;
  const { twoPersonRule, role } = await holdTeam(transaction, scope, needed);
  const isThere = await lockTable(transaction, teamId, slug);
  const row = isThere ? await findReview(transaction, { teamId, slug, number }) : undefined;
  if (!row) throw noRevision(slug, number);
  return {
    row,
    asker: { userId: user.id, role, twoPersonRule },
    stamp: { teamId, userId: user.id, at: new Date() },
  };
}

export const authorsOf = ({ madeById, submittedById }: ReviewRow) => ({
  makerId: madeById,
  submitterId: submittedById,
});

type Move = keyof Review['hindrances'];

const moves: Readonly<Record<Move, { readonly from: RevisionState; readonly done: string }>> = {
  submit: { from: 'draft', done: 'submitted' },
  judge: { from: 'in-review', done: 'vetted or returned' },
  withdraw: { from: 'vetted', done: 'withdrawn' },
};

function refuseHindered(move: Move, row: ReviewRow, asker: Asker): void {
  const hindrance: Hindrance = hindrancesOf(row, asker)[move];
  const { from, done } = moves[move];
  if (hindrance === 'own-revision') {
    throw new Problem('two-person-rule', {
      detail:
        `You made or submitted revision ${row.number}; while the team's two-person rule is on, it is ${done} ` +
        'by somebody else.',
    });
  }
  if (hindrance !== null) {
    throw new Problem('conflict', {
      detail: `Revision ${row.number} is ${row.state}; one that is ${from} can be ${done}.`,
    });
  }
}

const failuresIn = (limits: readonly LimitOutcome[]) => limits.filter(({ passed }) => !passed);

const noteWanted = (allowed: string) =>
  new Problem('validation', { errors: [{ path: 'note', value: showValue(''), allowed }] });

/** A notice without what every notice has. */
type NoticeOf<Kind> = Kind extends Notice ? Omit<Kind, 'table' | 'number'> : never;

/** Tells who is to know and notes what was done, last of all; answers the review as it is now. */
async function concluded(
  { transaction, auditKey, scope, tell, slug, number }: Command,
  asker: Asker,
  sets: readonly LimitSet[],
  { action, details, notice }: { action: AuditEntry['action']; details: object; notice: NoticeOf<Notice> },
): Promise<Review> {
  const row = await findReview(transaction, { teamId: scope.teamId, slug, number });
  if (!row) throw noRevision(slug, number);
  const title = row.tableTitle;
  await tell({ table: { slug, title }, number, ...notice });
  await appendEvent(transaction, auditKey, {
    teamId: scope.teamId,
    actor: scope.user,
    action,
    subject: `table:${slug}`,
    details: { title, number, digest: row.digest, ...details },
  });
  return presentReview(row, sets, asker);
}
