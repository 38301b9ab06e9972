import type {
  Comment,
  LimitOutcome,
  LimitSet,
  Report,
  Review,
  ReviewSummary,
} from '../../../shared/contract/index.ts';
import { checkLimits, limitSetsFor } from '../../../shared/vetting/index.ts';
import { presentPerson } from '../../auth/present-person.ts';
import { hindrancesOf, type Asker } from './hindrances.ts';
import type { CommentRow, ReviewRow, SummaryRow } from './queries.ts';

/** How the revision stands against the limits as they are now. */
export const outcomesOf = (row: ReviewRow, sets: readonly LimitSet[]): LimitOutcome[] =>
  checkLimits(limitSetsFor(sets, row.tags), {
    length: row.length,
    bits: row.bits,
    report: row.report as Report,
  });

/** Each revision goes this way once and only forwards: how far it has come is its version. */
export const versionOf = ({ submittedAt, decidedAt, withdrawnAt }: ReviewRow): number =>
  1 + [submittedAt, decidedAt, withdrawnAt].filter((moment) => moment !== null).length;

/** @param sets the team's limits of now, which count as long as there is no verdict */
export const presentReview = (row: ReviewRow, sets: readonly LimitSet[], asker: Asker): Review => ({
  tableSlug: row.tableSlug,
  tableTitle: row.tableTitle,
  tags: row.tags,
  number: row.number,
  state: row.state,
  madeBy: presentPerson(row.madeById, row.madeByName),
  madeAt: row.madeAt.toISOString(),
  submission: row.submittedAt && {
    by: presentPerson(row.submittedById, row.submittedByName),
    at: row.submittedAt.toISOString(),
    message: row.message ?? '',
  },
  verdict: presentVerdict(row),
  withdrawal: row.withdrawnAt && {
    by: presentPerson(row.withdrawnById, row.withdrawnByName),
    at: row.withdrawnAt.toISOString(),
    reason: row.reason ?? '',
  },
  limits: row.limits ?? outcomesOf(row, sets),
  lastVetted: row.lastVetted,
  twoPersonRule: asker.twoPersonRule,
  hindrances: hindrancesOf(row, asker),
  version: versionOf(row),
});

const presentVerdict = ({ verdict, decidedAt, ...row }: ReviewRow): Review['verdict'] =>
  verdict &&
  decidedAt && {
    verdict,
    by: presentPerson(row.decidedById, row.decidedByName),
    at: decidedAt.toISOString(),
    note: row.note ?? '',
  };

export const presentSummary = (row: SummaryRow, asker: Asker): ReviewSummary => ({
  tableSlug: row.tableSlug,
  tableTitle: row.tableTitle,
  number: row.number,
  state: row.state,
  submittedBy: presentPerson(row.submittedById, row.submittedByName),
  submittedAt: row.submittedAt.toISOString(),
  message: row.message,
  failedLimits: row.failedLimits,
  decidedBy: row.decidedAt && presentPerson(row.decidedById, row.decidedByName),
  decidedAt: row.decidedAt && row.decidedAt.toISOString(),
  mayJudge: hindrancesOf(row, asker).judge === null,
});

export const presentComment = (row: CommentRow): Comment => ({
  id: row.id,
  by: presentPerson(row.writtenById, row.writtenByName),
  at: row.at.toISOString(),
  text: row.text,
  path: row.path,
});
