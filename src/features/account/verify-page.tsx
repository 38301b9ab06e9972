import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { verifyAddress } from '../../api/account.ts';
import { Page, TextField } from '../../components/index.ts';
import { SendAgain, SignInForm } from '../../forms/sign-in-form.tsx';
import { LinkPage } from './link-page.tsx';
import { nextPlace } from './next-place.ts';

/** Verifies the address of a new account, and signs in. */
export function VerifyPage() {
  const [email, setEmail] = useState<string | null>(null);
  const navigate = useNavigate();
  if (email === null) {
    return (
      <LinkPage
        title="Verify your address"
        lead="One press, and the account can be used."
        action="Verify this address"
        onUse={async (token) => setEmail(await verifyAddress(token))}
        otherwise={<AnotherLink />}
      />
    );
  }
  return (
    <Page
      title="Your address is verified"
      size="narrow"
      lead="Sign in, and go on with the wave on your bench."
    >
      <SignInForm email={email} onSignedIn={() => void navigate(nextPlace(), { replace: true })} />
    </Page>
  );
}

function AnotherLink() {
  const [email, setEmail] = useState('');
  return (
    <div className="form">
      <p>If the account has been verified already, just sign in. Otherwise have another link sent.</p>
      <TextField
        label="E-mail address"
        type="email"
        autoComplete="username"
        value={email}
        onChange={setEmail}
      />
      <div>
        <SendAgain email={email} />
      </div>
    </div>
  );
}
