import { useAccount } from '../api/account-state.ts';
import { signInRequests } from '../api/sign-in-again.ts';
import { Dialog } from '../components/index.ts';
import { SignInForm } from '../forms/sign-in-form.tsx';

/** Signs in on top of what is on screen, which then goes on where it stood. */
export function SignInDialog() {
  const account = useAccount();
  return (
    <Dialog title="Sign in" isOpen onClose={() => signInRequests.answer(false)}>
      <div className="form">
        <p>
          {account === undefined
            ? 'Saving to a team’s library needs an account.'
            : 'Your sign-in has run out or was ended.'}{' '}
          What you made and typed stays as it is, and goes on from here.
        </p>
        <SignInForm
          email={account?.email ?? ''}
          onSignedIn={() => signInRequests.answer(true)}
          onLeave={() => signInRequests.answer(false)}
        />
      </div>
    </Dialog>
  );
}
