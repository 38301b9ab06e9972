import { useState } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { noticeKinds, unsubscribeSchema, type NoticeKind } from '../../../shared/contract/index.ts';
import { unsubscribe } from '../../api/notices.ts';
import { Button, Page } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';
import { NoToken } from './link-page.tsx';
import { noticeWords } from './notice-words.ts';

/** Ends one kind of notices by the link at the end of a mail; nobody need be signed in. */
export function UnsubscribePage() {
  const token = useLocation().hash.slice(1);
  const named = noticeKinds.find((kind) => kind === token.split('.')[1]);
  const [ended, setEnded] = useState<NoticeKind | null>(null);
  const ending = useSubmit(async (sent: string) => setEnded(await unsubscribe(sent)));
  if (named === undefined || !unsubscribeSchema.safeParse({ token }).success) return <NoToken />;

  const { label, when } = noticeWords[ended ?? named];
  const choices = (
    <p>
      All your choices are with <Link to={paths.account}>your account</Link>, under Notices.
    </p>
  );
  if (ended !== null) {
    return (
      <Page title="No longer sent" size="narrow">
        <p role="status">
          You get no more notices of the kind <strong>{label}</strong>. ({when}) The other kinds come as
          before.
        </p>
        {choices}
      </Page>
    );
  }
  return (
    <Page
      title={`Notices: ${label}`}
      size="narrow"
      lead={<p>{when} One press, and you get no more of these.</p>}
    >
      <ProblemNotice fault={ending.fault} />
      <div>
        <Button
          variant="primary"
          isDisabled={ending.isBusy}
          disabledReason="This is under way"
          onPress={() => void ending.submit(token)}
        >
          {ending.isBusy ? 'One moment…' : 'Send me no more of these'}
        </Button>
      </div>
      {choices}
    </Page>
  );
}
