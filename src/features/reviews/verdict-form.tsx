import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { giveVerdictSchema, type Verdict } from '../../../shared/contract/index.ts';
import { newKey } from '../../api/new-key.ts';
import { ProblemError } from '../../api/problem-error.ts';
import {
  addComment,
  giveVerdict,
  readCurrentReview,
  reviewQueries,
  takeReview,
  type RevisionAt,
  type TaggedReview,
} from '../../api/reviews.ts';
import { Button, ChoiceField, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';

interface VerdictFormProps {
  at: RevisionAt;
  review: TaggedReview;
  /** Why no verdict can be given now. */
  hindrance: string | null;
  note: string;
  onNote: (note: string) => void;
  /** The review as it was when this one came second. */
  onBeaten: (current: TaggedReview) => void;
}

const choices = [
  { value: 'vetted', label: 'Vet it', hint: 'It may be built in. The limits are kept as they are now.' },
  { value: 'returned', label: 'Return it', hint: 'With reasons. Its author mends it in the next revision.' },
] as const;

/** Vets or returns. A verdict that came second keeps what was typed. */
export function VerdictForm({ at, review, hindrance, note, onNote, onBeaten }: VerdictFormProps) {
  const [verdict, setVerdict] = useState<Verdict | ''>('');
  const queryClient = useQueryClient();
  const toast = useToast();
  const failed = review.limits.filter(({ passed }) => !passed).length;
  const needsReasons = verdict === 'returned' || (verdict === 'vetted' && failed > 0);
  const judging = useSubmit(async (body: { verdict: Verdict; note: string }) => {
    if (needsReasons && body.note.trim() === '') throw noReasons(verdict);
    try {
      const judged = await giveVerdict(at, body, review.etag);
      onNote('');
      toast({
        message: `Revision ${at.number} is ${body.verdict === 'vetted' ? 'vetted' : 'returned'}.`,
        tone: 'good',
      });
      await takeReview(queryClient, at, judged);
    } catch (error) {
      const current =
        error instanceof ProblemError && error.status === 412 ? readCurrentReview(error.current) : null;
      if (current === null) throw error;
      onBeaten(current);
      await takeReview(queryClient, at, current);
    }
  }, giveVerdictSchema);
  return (
    <Form
      label="Verdict"
      action={verdict === 'returned' ? 'Return it' : verdict === 'vetted' ? 'Vet it' : 'Give the verdict'}
      submitting={judging}
      onSubmit={() => {
        if (verdict !== '') void judging.submit({ verdict, note });
      }}
      fields={['note']}
      refusedBecause={
        hindrance ?? (verdict === '' ? 'Choose first whether to vet or to return it.' : undefined)
      }
      aside={
        hindrance !== null &&
        note.trim() !== '' && <AsComment at={at} text={note} onDone={() => onNote('')} />
      }
    >
      {hindrance === null && (
        <ChoiceField<Verdict | ''>
          label="Verdict"
          hideLabel
          value={verdict}
          options={choices}
          onChange={setVerdict}
        />
      )}
      <TextField
        label="Reasons"
        description={
          needsReasons
            ? verdict === 'returned'
              ? 'What has to be mended.'
              : `${failed === 1 ? 'One limit is' : `${failed} limits are`} broken: say why it may be built in all the same.`
            : 'They are kept with the verdict, and its author is told.'
        }
        multiline
        value={note}
        onChange={onNote}
        problem={judging.at('note')}
      />
    </Form>
  );
}

const noReasons = (verdict: Verdict | '') =>
  new ProblemError({
    kind: 'validation',
    status: 422,
    message: 'Reasons are missing.',
    problems: [
      {
        path: 'note',
        value: 'nothing',
        allowed: `1 to 2000 characters, as ${verdict === 'returned' ? 'a return needs its reasons' : 'a limit is broken'}`,
      },
    ],
  });

/** What was typed for a verdict that can no longer be given need not be lost. */
function AsComment({ at, text, onDone }: { at: RevisionAt; text: string; onDone: () => void }) {
  const [key] = useState(newKey);
  const queryClient = useQueryClient();
  const toast = useToast();
  const adding = useSubmit(async () => {
    await addComment(at, { text, path: null }, key);
    onDone();
    toast({ message: 'Your reasons stand among the comments now.', tone: 'good' });
    await queryClient.invalidateQueries({ queryKey: reviewQueries.comments(at).queryKey });
  });
  return (
    <>
      <Button isDisabled={adding.isBusy} onPress={() => void adding.submit(undefined)}>
        Add it as a comment
      </Button>
      {adding.fault !== null && <span role="alert">{adding.fault.message}</span>}
    </>
  );
}
