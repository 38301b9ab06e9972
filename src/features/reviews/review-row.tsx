import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { ReviewSummary } from '../../../shared/contract/index.ts';
import { Moment, icons } from '../../components/index.ts';
import { StateWord } from '../../components/state-word.tsx';
import { reviewPath } from '../../paths.ts';
import { saySince } from './words.ts';

/** One submitted revision: what, from whom, how long it waits, and what its author asks. */
export function ReviewRow({ team, review }: { team: string; review: ReviewSummary }) {
  const { tableSlug, tableTitle, number, state, submittedBy, submittedAt, message, failedLimits } = review;
  const [now] = useState(Date.now);
  const isWaiting = state === 'in-review';
  return (
    <li className="review-row">
      <div className="review-row-head">
        <Link to={reviewPath(team, tableSlug, number)} className="library-link">
          {tableTitle}, revision {number}
        </Link>
        <StateWord state={state} />
        {failedLimits > 0 && (
          <span className="state-word" data-tone="fault">
            <icons.fault width="16" height="16" />
            {failedLimits === 1 ? 'One limit is broken' : `${failedLimits} limits are broken`}
          </span>
        )}
      </div>
      <p className="review-message">{message}</p>
      <p className="quiet">
        {isWaiting ? (
          <>
            {submittedBy.name} has waited {saySince(submittedAt, now)}
            {!review.mayJudge && '; somebody else is to judge it'}
          </>
        ) : (
          <>
            Submitted by {submittedBy.name} <Moment at={submittedAt} />
            {review.decidedAt !== null && (
              <>
                ; decided by {review.decidedBy?.name ?? 'somebody who has gone'}{' '}
                <Moment at={review.decidedAt} />
              </>
            )}
          </>
        )}
      </p>
    </li>
  );
}
