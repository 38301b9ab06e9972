import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { resetPasswordSchema } from '../../../shared/contract/index.ts';
import { resetPassword } from '../../api/account.ts';
import { accountHasChanged } from '../../api/account-state.ts';
import { Page, PasswordField } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { SignInForm } from '../../forms/sign-in-form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';
import { NoToken, useLinkToken } from './link-page.tsx';
import { nextPlace } from './next-place.ts';

/** Sets a new password by a mailed link, and signs in with it. */
export function ResetPasswordPage() {
  const token = useLinkToken();
  const navigate = useNavigate();
  const [password, setPassword] = useState('');
  const [email, setEmail] = useState<string | null>(null);
  const setting = useSubmit(async (wanted: { token: string; password: string }) => {
    const proven = await resetPassword(wanted.token, wanted.password);
    // This browser's session has ended with the others.
    await accountHasChanged();
    setEmail(proven);
  }, resetPasswordSchema);

  if (token === '') return <NoToken />;
  if (email !== null) {
    return (
      <Page
        title="Your new password is set"
        size="narrow"
        lead="Every session has ended, here and elsewhere. Sign in with the new password."
      >
        <SignInForm email={email} onSignedIn={() => void navigate(nextPlace(), { replace: true })} />
      </Page>
    );
  }
  return (
    <Page title="Set a new password" size="narrow" lead="It ends every session of the account.">
      <Form
        label="Set a new password"
        action="Set the password"
        submitting={setting}
        onSubmit={() => void setting.submit({ token, password })}
        fields={['password']}
        aside={
          <Link to={paths.forgotPassword} className="link">
            Ask for another link
          </Link>
        }
      >
        <PasswordField
          label="New password"
          description="At least 10 characters. Length is what counts."
          autoComplete="new-password"
          value={password}
          onChange={setPassword}
          problem={setting.at('password')}
        />
      </Form>
    </Page>
  );
}
