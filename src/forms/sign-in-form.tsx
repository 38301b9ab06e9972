import { useState } from 'react';
import { Link } from 'react-router-dom';
import { resendVerification } from '../api/account.ts';
import { signIn } from '../api/sign-in.ts';
import { Button, Notice, PasswordField, TextField } from '../components/index.ts';
import { paths } from '../paths.ts';
import { Form } from './form.tsx';
import { useSubmit } from './use-submit.ts';

export interface SignInFormProps {
  /** Address to begin with. */
  email?: string;
  onSignedIn: () => void;
  /** Called as a link leads away from where the form stands. */
  onLeave?: () => void;
}

/** Address and password. Whoever has not verified the address can have the link sent again. */
export function SignInForm({ email: known = '', onSignedIn, onLeave }: SignInFormProps) {
  const [email, setEmail] = useState(known);
  const [password, setPassword] = useState('');
  const signing = useSubmit(async () => {
    await signIn(email, password);
    onSignedIn();
  });
  return (
    <div className="form">
      <Form
        label="Sign in"
        action="Sign in"
        submitting={signing}
        onSubmit={() => void signing.submit(undefined)}
        fields={[]}
        aside={
          <Link to={paths.forgotPassword} className="link" onClick={onLeave}>
            Forgotten the password?
          </Link>
        }
      >
        <TextField
          label="E-mail address"
          type="email"
          autoComplete="username"
          value={email}
          onChange={setEmail}
        />
        <PasswordField
          label="Password"
          autoComplete="current-password"
          value={password}
          onChange={setPassword}
        />
      </Form>
      {signing.fault?.kind === 'unverified' && <SendAgain email={email} />}
      <p className="quiet">
        No account yet?{' '}
        <Link to={paths.signUp} className="link" onClick={onLeave}>
          Make one
        </Link>
        . What is on the bench stays there.
      </p>
    </div>
  );
}

/** Sends the link that verifies an address once more. */
export function SendAgain({ email }: { email: string }) {
  const [isSent, setIsSent] = useState(false);
  const sending = useSubmit(async () => {
    await resendVerification(email);
    setIsSent(true);
  });
  if (isSent) {
    return (
      <Notice tone="good">
        If {email} waits to be verified, a new link is on its way. The one before works no longer.
      </Notice>
    );
  }
  return (
    <>
      <Button size="small" isDisabled={sending.isBusy} onPress={() => void sending.submit(undefined)}>
        Send the link again
      </Button>
      {sending.fault && <Notice tone="fault">{sending.fault.message}</Notice>}
    </>
  );
}
