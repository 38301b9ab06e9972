import { useState } from 'react';
import type { RevisionAt, TaggedReview } from '../../api/reviews.ts';
import { Moment, Panel } from '../../components/index.ts';
import { LimitList, sayStanding } from '../../limits/index.ts';
import { SubmitButton } from './submit-dialog.tsx';
import { saySince } from './words.ts';

/** What the author asks, and how the revision stands against the team's limits. */
export function SubmissionPanel({ at, review }: { at: RevisionAt; review: TaggedReview }) {
  const { submission, limits, verdict } = review;
  return (
    <>
      <Panel title="What is asked">
        {submission === null ? (
          <>
            <p>Nobody has submitted this revision for review yet.</p>
            <div>
              <SubmitButton at={at} review={review} />
            </div>
          </>
        ) : (
          <>
            <p className="review-message">{submission.message}</p>
            <p className="quiet">
              {submission.by.name}, <Moment at={submission.at} />
              <Waits review={review} />
            </p>
          </>
        )}
      </Panel>
      <Panel title={sayStanding(limits)}>
        {limits.length === 0 ? (
          <p className="quiet">
            An admin sets limits on the team’s page, for all tables or for those of a tag.
          </p>
        ) : (
          <>
            <LimitList outcomes={limits} />
            <p className="quiet">
              {verdict === null
                ? 'Against the limits as they are now; the verdict keeps them.'
                : 'As they were when it was decided.'}
            </p>
          </>
        )}
      </Panel>
    </>
  );
}

function Waits({ review: { state, submission } }: { review: TaggedReview }) {
  const [now] = useState(Date.now);
  if (state !== 'in-review' || submission === null) return null;
  return <>. It has waited {saySince(submission.at, now)}.</>;
}
