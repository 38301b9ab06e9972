import { useState } from 'react';
import type { RevisionState } from '../../../shared/contract/index.ts';
import type { RevisionAt, TaggedReview } from '../../api/reviews.ts';
import { Moment, Panel, icons } from '../../components/index.ts';
import { useKeptText } from '../../forms/use-kept-text.ts';
import { VerdictForm } from './verdict-form.tsx';
import { WithdrawButton } from './withdraw-dialog.tsx';
import { sayHindrance } from './words.ts';

/** What was decided, or the form that decides it. */
export function DecisionPanel({ at, review }: { at: RevisionAt; review: TaggedReview }) {
  const [note, setNote] = useKeptText(`verdict ${at.team} ${at.table} ${at.number}`);
  const [beatenBy, setBeatenBy] = useState<TaggedReview | null>(null);
  const hindrance = sayHindrance('judge', review.hindrances.judge, review.state);
  // Whoever came second, or whose sign-in ran out, still has what was typed.
  const hasForm = hindrance === null || note.trim() !== '' || beatenBy !== null;
  return (
    <Panel title={titles[review.state]}>
      <Withdrawal review={review} />
      <Decided review={review} />
      {beatenBy !== null && <Beaten by={beatenBy} />}
      {hasForm && (
        <VerdictForm
          {...{ at, review, hindrance, note }}
          onNote={(text) => {
            setNote(text);
            if (text === '' && hindrance !== null) setBeatenBy(null);
          }}
          onBeaten={setBeatenBy}
        />
      )}
      {!hasForm && review.state === 'in-review' && <p>{hindrance}</p>}
      {!hasForm && review.state === 'draft' && (
        <p className="quiet">It is decided once it has been submitted.</p>
      )}
      <div className="empty:hidden">
        <WithdrawButton at={at} review={review} />
      </div>
    </Panel>
  );
}

const titles: Readonly<Record<RevisionState, string>> = {
  draft: 'Verdict',
  'in-review': 'Verdict',
  vetted: 'Vetted',
  returned: 'Returned',
  withdrawn: 'Withdrawn',
};

function Decided({ review: { verdict } }: { review: TaggedReview }) {
  if (verdict === null) return null;
  const Sign = verdict.verdict === 'vetted' ? icons.good : icons.undo;
  return (
    <div className={verdict.verdict === 'vetted' ? 'slab slab-moss' : 'slab slab-saffron'}>
      <Sign className="slab-sign" />
      <div className="notice-words">
        <p>
          <strong>
            {verdict.verdict === 'vetted' ? 'Vetted' : 'Returned'} by {verdict.by.name}
          </strong>
          , <Moment at={verdict.at} />
        </p>
        <p className="review-message">{verdict.note === '' ? 'No reasons were given.' : verdict.note}</p>
      </div>
    </div>
  );
}

function Withdrawal({ review: { withdrawal } }: { review: TaggedReview }) {
  if (withdrawal === null) return null;
  return (
    <div className="slab slab-oxide">
      <icons.fault className="slab-sign" />
      <div className="notice-words">
        <p>
          <strong>Withdrawn by {withdrawal.by.name}</strong>, <Moment at={withdrawal.at} />
        </p>
        <p className="review-message">{withdrawal.reason}</p>
      </div>
    </div>
  );
}

/** Tells who decided what meanwhile. */
function Beaten({ by: { verdict, withdrawal } }: { by: TaggedReview }) {
  const who = withdrawal?.by.name ?? verdict?.by.name ?? 'Somebody else';
  const what =
    withdrawal !== null ? 'withdrawn it' : verdict === null ? 'changed it' : `${verdict.verdict} it`;
  return (
    <div className="slab slab-saffron" role="alert">
      <icons.caution className="slab-sign" />
      <p>
        <strong>
          {who} has {what} while you were judging.
        </strong>{' '}
        Your verdict was not given. What you typed is still here; add it as a comment if it should be read.
      </p>
    </div>
  );
}
