import { useEffect, useState, type ReactNode } from 'react';
import { Link, useLocation } from 'react-router-dom';
import type { Account } from '../../shared/contract/index.ts';
import { refreshAccount, useAccountState } from '../api/account-state.ts';
import { Button, EmptyState, Notice, Waiting } from '../components/index.ts';
import { paths, signInPath } from '../paths.ts';

export interface WithAccountProps {
  /** What an account is needed for here, in a sentence. */
  why: string;
  children: (account: Account) => ReactNode;
}

/** Shows what is for signed-in people, or how to become one of them. */
export function WithAccount({ why, children }: WithAccountProps) {
  const known = useAccountState();
  const here = useLocation();
  switch (known.kind) {
    case 'person':
      return children(known.account);
    case 'unknown':
      return <Asking />;
    case 'nobody':
      return (
        <EmptyState
          isPlace
          title="Sign in first"
          actions={
            <>
              <Link
                to={signInPath(here.pathname + here.search + here.hash)}
                className="button button-primary"
              >
                Sign in
              </Link>
              <Link to={paths.signUp} className="button button-plain">
                Make an account
              </Link>
            </>
          }
        >
          <p>{why}</p>
        </EmptyState>
      );
  }
}

function Asking() {
  const [isAway, setIsAway] = useState(false);
  const askNow = () => void refreshAccount().then(({ kind }) => setIsAway(kind === 'unknown'));
  useEffect(askNow, []);
  if (!isAway) return <Waiting>Asking the server who is signed in…</Waiting>;
  return (
    <Notice
      tone="fault"
      actions={
        <Button size="small" onPress={askNow}>
          Try again
        </Button>
      }
    >
      The server does not answer, so it is not known who is signed in.
    </Notice>
  );
}
