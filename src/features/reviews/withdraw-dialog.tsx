import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { withdrawRevisionSchema } from '../../../shared/contract/index.ts';
import { ProblemError } from '../../api/problem-error.ts';
import {
  readCurrentReview,
  takeReview,
  withdrawRevision,
  type RevisionAt,
  type TaggedReview,
} from '../../api/reviews.ts';
import { Button, Dialog, TextField, icons, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useKeptText } from '../../forms/use-kept-text.ts';
import { useSubmit } from '../../forms/use-submit.ts';
import { sayHindrance } from './words.ts';

interface WithdrawProps {
  at: RevisionAt;
  review: TaggedReview;
}

/** Opens the dialog that withdraws a vetted revision. Only where there is one, and for those who may withdraw. */
export function WithdrawButton({ at, review }: WithdrawProps) {
  const [isOpen, setIsOpen] = useState(false);
  const { withdraw } = review.hindrances;
  if ((withdraw === 'state' || withdraw === 'role') && !isOpen) return null;
  const hindrance = sayHindrance('withdraw', withdraw, review.state);
  return (
    <>
      <Button
        variant="danger"
        icon={icons.caution}
        isDisabled={hindrance !== null && !isOpen}
        disabledReason={hindrance ?? undefined}
        onPress={() => setIsOpen(true)}
      >
        Withdraw
      </Button>
      <Dialog title={`Withdraw revision ${at.number}`} isOpen={isOpen} onClose={() => setIsOpen(false)}>
        <WithdrawForm at={at} review={review} hindrance={hindrance} onDone={() => setIsOpen(false)} />
      </Dialog>
    </>
  );
}

interface WithdrawFormProps extends WithdrawProps {
  hindrance: string | null;
  onDone: () => void;
}

function WithdrawForm({ at, review, hindrance, onDone }: WithdrawFormProps) {
  const [reason, setReason] = useKeptText(`withdraw ${at.team} ${at.table} ${at.number}`);
  const [isBeaten, setIsBeaten] = useState(false);
  const queryClient = useQueryClient();
  const toast = useToast();
  const withdrawing = useSubmit(async (body: { reason: string }) => {
    try {
      const withdrawn = await withdrawRevision(at, body.reason, review.etag);
      setReason('');
      onDone();
      toast({ message: `Revision ${at.number} is withdrawn.`, tone: 'good' });
      await takeReview(queryClient, at, withdrawn);
    } catch (error) {
      const current =
        error instanceof ProblemError && error.status === 412 ? readCurrentReview(error.current) : null;
      if (current === null) throw error;
      setIsBeaten(true);
      await takeReview(queryClient, at, current);
    }
  }, withdrawRevisionSchema);
  return (
    <Form
      label="Withdraw the revision"
      action={isBeaten ? 'Withdraw it all the same' : 'Withdraw'}
      variant="danger"
      submitting={withdrawing}
      onSubmit={() => void withdrawing.submit({ reason })}
      fields={['reason']}
      refusedBecause={hindrance ?? undefined}
    >
      <p className="quiet">
        It can still be fetched, with a warning and your reason. Builds that are checked against the library
        fail from then on. This cannot be undone; mending it makes the next revision.
      </p>
      {isBeaten && (
        <p role="alert">
          <strong>The revision has changed meanwhile.</strong>{' '}
          {review.withdrawal === null
            ? 'Look at it again.'
            : `${review.withdrawal.by.name} has withdrawn it: ${review.withdrawal.reason}`}{' '}
          What you typed is kept.
        </p>
      )}
      <TextField
        label="Why is it withdrawn?"
        multiline
        value={reason}
        onChange={setReason}
        problem={withdrawing.at('reason')}
      />
    </Form>
  );
}
