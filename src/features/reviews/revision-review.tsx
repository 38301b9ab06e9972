import './reviews.css';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { asProblem } from '../../api/problem-error.ts';
import { reviewQueries, type RevisionAt, type TaggedReview } from '../../api/reviews.ts';
import { Moment, icons } from '../../components/index.ts';
import { StateWord } from '../../components/state-word.tsx';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { reviewPath } from '../../paths.ts';
import { SubmitButton } from './submit-dialog.tsx';
import { WithdrawButton } from './withdraw-dialog.tsx';

/** On the page of a table: how the revision in sight stands, and what can be done about it. */
export function RevisionReview({ at }: { at: RevisionAt }) {
  const { data: review, error, refetch } = useQuery(reviewQueries.detail(at));
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (review === undefined) return <div className="revision-review" aria-busy="true" />;
  return (
    <div className="space-y-3">
      <Flag review={review} />
      <div className="revision-review">
        <StateWord state={review.state} />
        <Said review={review} />
        {review.state === 'draft' && review.hindrances.submit !== 'role' && (
          <SubmitButton at={at} review={review} />
        )}
        {review.state !== 'draft' && (
          <Link
            to={reviewPath(at.team, at.table, at.number)}
            className={`button ${review.hindrances.judge === null ? 'button-primary' : 'button-plain'}`}
          >
            Open review
          </Link>
        )}
        <WithdrawButton at={at} review={review} />
      </div>
    </div>
  );
}

function Said({ review: { state, submission, verdict } }: { review: TaggedReview }) {
  if (verdict !== null && (state === 'vetted' || state === 'returned')) {
    return (
      <span className="quiet">
        by {verdict.by.name}, <Moment at={verdict.at} />
      </span>
    );
  }
  if (state === 'in-review' && submission !== null) {
    return (
      <span className="quiet">
        submitted by {submission.by.name}, <Moment at={submission.at} />
      </span>
    );
  }
  return null;
}

/** A withdrawn or returned revision must not be taken for a good one. */
function Flag({ review: { state, verdict, withdrawal } }: { review: TaggedReview }) {
  if (state === 'withdrawn' && withdrawal !== null) {
    return (
      <div className="slab slab-oxide">
        <icons.fault className="slab-sign" />
        <div className="notice-words">
          <p>
            <strong>Withdrawn: do not build it in.</strong> {withdrawal.by.name},{' '}
            <Moment at={withdrawal.at} />
          </p>
          <p className="review-message">{withdrawal.reason}</p>
        </div>
      </div>
    );
  }
  if (state !== 'returned' || verdict === null) return null;
  return (
    <div className="slab slab-saffron">
      <icons.undo className="slab-sign" />
      <div className="notice-words">
        <p>
          <strong>Returned.</strong> Open it on the bench, mend it and save the next revision.
        </p>
        <p className="review-message">{verdict.note}</p>
      </div>
    </div>
  );
}
