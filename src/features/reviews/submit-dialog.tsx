import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { submitRevisionSchema } from '../../../shared/contract/index.ts';
import { newKey } from '../../api/new-key.ts';
import { submitRevision, takeReview, type RevisionAt, type TaggedReview } from '../../api/reviews.ts';
import { Button, Dialog, TextField, icons, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useKeptText } from '../../forms/use-kept-text.ts';
import { useSubmit } from '../../forms/use-submit.ts';
import { LimitList, sayStanding } from '../../limits/index.ts';
import { sayHindrance } from './words.ts';

interface SubmitProps {
  at: RevisionAt;
  review: TaggedReview;
}

/** Opens the dialog that submits a draft; says why where that cannot be. */
export function SubmitButton({ at, review }: SubmitProps) {
  const [isOpen, setIsOpen] = useState(false);
  const hindrance = sayHindrance('submit', review.hindrances.submit, review.state);
  return (
    <>
      <Button
        variant="primary"
        icon={icons.upload}
        isDisabled={hindrance !== null}
        disabledReason={hindrance ?? undefined}
        onPress={() => setIsOpen(true)}
      >
        Submit for review
      </Button>
      {hindrance !== null && <p className="quiet">{hindrance}</p>}
      <Dialog
        title={`Submit revision ${at.number} for review`}
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
      >
        <SubmitForm at={at} review={review} onDone={() => setIsOpen(false)} />
      </Dialog>
    </>
  );
}

function SubmitForm({ at, review, onDone }: SubmitProps & { onDone: () => void }) {
  const [message, setMessage] = useKeptText(`submit ${at.team} ${at.table} ${at.number}`);
  const [key, setKey] = useState(newKey);
  const queryClient = useQueryClient();
  const toast = useToast();
  const submitting = useSubmit(async (body: { message: string }) => {
    const submitted = await submitRevision(at, body.message, key);
    setMessage('');
    onDone();
    toast({ message: `Revision ${at.number} is in review now.`, tone: 'good' });
    await takeReview(queryClient, at, submitted);
  }, submitRevisionSchema);
  const failed = review.limits.filter(({ passed }) => !passed);
  return (
    <Form
      label="Submit for review"
      action="Submit"
      submitting={submitting}
      onSubmit={() => void submitting.submit({ message })}
      fields={['message']}
    >
      <p className="quiet">
        A reviewer of the team vets it or returns it with reasons.{' '}
        {review.twoPersonRule && 'By the two-person rule that is somebody other than its author. '}
        The revision itself does not change.
      </p>
      <TextField
        label="What should the reviewer look at?"
        multiline
        value={message}
        onChange={(text) => {
          setMessage(text);
          setKey(newKey());
        }}
        problem={submitting.at('message')}
      />
      {failed.length > 0 && (
        <div className="space-y-2">
          <p>
            <strong>{sayStanding(review.limits)}.</strong> It can be submitted all the same; whoever vets it
            must give a reason.
          </p>
          <LimitList outcomes={failed} />
        </div>
      )}
    </Form>
  );
}
