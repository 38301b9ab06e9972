import type { ReactNode } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { linkTokenField } from '../../../shared/contract/index.ts';
import { Button, EmptyState, Page } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';

/** The token of a mailed link: it stands in the fragment, which is sent to no server. Empty where it is not whole. */
export function useLinkToken(): string {
  const token = useLocation().hash.slice(1);
  return linkTokenField.safeParse(token).success ? token : '';
}

/** What a mailed link leads to when its token is missing. */
export function NoToken() {
  return (
    <EmptyState
      isPlace
      title="This link is not whole"
      actions={
        <Link to={paths.bench} className="button button-plain">
          Go to the bench
        </Link>
      }
    >
      <p>
        The part behind the # is missing or has been cut. Open the link from the mail itself, or copy it as a
        whole: some programs cut long links.
      </p>
    </EmptyState>
  );
}

interface LinkPageProps {
  title: string;
  lead: ReactNode;
  /** Words on the button. A press uses the link; opening it does not, since programs that look through mail open links. */
  action: string;
  onUse: (token: string) => Promise<unknown>;
  /** What to do where the link works no longer. */
  otherwise: ReactNode;
}

/** One press that uses a mailed link. */
export function LinkPage({ title, lead, action, onUse, otherwise }: LinkPageProps) {
  const token = useLinkToken();
  const using = useSubmit(() => onUse(token));
  if (token === '') return <NoToken />;
  return (
    <Page title={title} size="narrow" lead={lead}>
      <ProblemNotice fault={using.fault} />
      {using.fault !== null && !using.fault.isPassing ? (
        otherwise
      ) : (
        <div>
          <Button
            variant="primary"
            isDisabled={using.isBusy}
            disabledReason="This is under way"
            onPress={() => void using.submit(undefined)}
          >
            {using.isBusy ? 'One moment…' : action}
          </Button>
        </div>
      )}
    </Page>
  );
}
