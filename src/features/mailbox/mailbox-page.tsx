import './mailbox.css';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { mailQueries } from '../../api/mailbox.ts';
import { asProblem } from '../../api/problem-error.ts';
import { Button, EmptyState, Moment, Page, Waiting } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { paths } from '../../paths.ts';
import { MailText } from './mail-text.tsx';

/** New mail is looked for so often while the page is open, in milliseconds. */
const lookEveryMs = 3_000;

/** Mail that stays on this machine, for trying everything out. It is nobody's in particular. */
export function MailboxPage() {
  const [parameters] = useSearchParams();
  const opened = Number(parameters.get('mail')) || null;
  const { data, error, refetch, hasNextPage, fetchNextPage } = useInfiniteQuery({
    ...mailQueries.list(),
    refetchInterval: (query) => (query.state.status === 'error' ? false : lookEveryMs),
  });
  const fault = error && asProblem(error);
  const mails = data?.pages.flatMap(({ items }) => items);
  if (fault?.status === 404) return <NoMailbox />;
  return (
    <Page
      title="Local mailbox"
      lead="With the private database on this machine mail is not sent on but kept here, whoever it is for."
      actions={<Button onPress={() => void refetch()}>Look for new mail</Button>}
    >
      <ProblemNotice fault={fault} onTryAgain={() => void refetch()} />
      {mails === undefined && !fault && <Waiting>Opening the mailbox…</Waiting>}
      {mails?.length === 0 && (
        <EmptyState title="No mail yet">
          <p>Make an account or invite somebody, and the mail about it lies here.</p>
        </EmptyState>
      )}
      {mails !== undefined && mails.length > 0 && (
        <div className="mailbox">
          <div>
            <ul className="mail-list" aria-label="Mails, newest first">
              {mails.map(({ id, to, subject, receivedAt }) => (
                <li key={id}>
                  <Link
                    to={`${paths.mailbox}?mail=${id}`}
                    className="mail-line"
                    aria-current={id === opened ? 'true' : undefined}
                    preventScrollReset
                  >
                    <strong>{subject}</strong>
                    <span className="quiet">to {to}</span>
                    <span className="quiet">
                      <Moment at={receivedAt} />
                    </span>
                  </Link>
                </li>
              ))}
            </ul>
            {hasNextPage && (
              <Button size="small" onPress={() => void fetchNextPage()}>
                Older ones
              </Button>
            )}
          </div>
          {opened === null ? (
            <p className="waiting">Open a mail to read it.</p>
          ) : (
            <Mail key={opened} id={opened} />
          )}
        </div>
      )}
    </Page>
  );
}

function Mail({ id }: { id: number }) {
  const { data: mail, error, refetch } = useQuery(mailQueries.detail(id));
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (mail === undefined) return <Waiting>Opening the mail…</Waiting>;
  return (
    <article className="panel" aria-labelledby="mail-subject">
      <h2 id="mail-subject">{mail.subject}</h2>
      <dl className="facts">
        <div>
          <dt>From</dt>
          <dd>{mail.from}</dd>
        </div>
        <div>
          <dt>To</dt>
          <dd>{mail.to}</dd>
        </div>
        <div>
          <dt>Received</dt>
          <dd>
            <Moment at={mail.receivedAt} />
          </dd>
        </div>
      </dl>
      <MailText text={mail.text} />
    </article>
  );
}

function NoMailbox() {
  return (
    <EmptyState
      isPlace
      title="This server has no local mailbox"
      actions={
        <Link to={paths.bench} className="button button-plain">
          Go to the bench
        </Link>
      }
    >
      <p>Its mail is sent on by a mail server. Look into the mailbox of your address.</p>
    </EmptyState>
  );
}
