import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { useAccountState } from '../../api/account-state.ts';
import { Page, Waiting } from '../../components/index.ts';
import { SignInForm } from '../../forms/sign-in-form.tsx';
import { paths } from '../../paths.ts';
import { nextPlace } from './next-place.ts';

/** Signs in, then goes on to where one was sent from. */
export function SignInPage() {
  const known = useAccountState();
  const navigate = useNavigate();
  const [parameters] = useSearchParams();
  const next = nextPlace(parameters.get('to'));
  return (
    <Page title="Sign in" size="narrow">
      {known.kind === 'person' ? (
        <>
          <p>
            You are signed in as <strong>{known.account.name}</strong>, {known.account.email}.
          </p>
          <p className="flex flex-wrap gap-2">
            <Link to={next} className="button button-primary">
              Go on
            </Link>
            <Link to={paths.account} className="button button-plain">
              Account
            </Link>
          </p>
        </>
      ) : (
        <SignInForm onSignedIn={() => void navigate(next, { replace: true })} />
      )}
      {known.kind === 'unknown' && <Waiting>Asking the server who is signed in…</Waiting>}
    </Page>
  );
}
