import { useState } from 'react';
import { Link } from 'react-router-dom';
import { emailOnlySchema } from '../../../shared/contract/index.ts';
import { forgotPassword } from '../../api/account.ts';
import { useAccount } from '../../api/account-state.ts';
import { Notice, Page, TextField } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';
import { MailHint } from './mail-hint.tsx';

/** Asks for a link to set a new password. The answer is alike for every address. */
export function ForgotPasswordPage() {
  const account = useAccount();
  const [email, setEmail] = useState(account?.email ?? '');
  const [sentTo, setSentTo] = useState<string | null>(null);
  const asking = useSubmit(async (wanted: { email: string }) => {
    await forgotPassword(wanted.email);
    setSentTo(wanted.email.trim());
  }, emailOnlySchema);
  return (
    <Page title="Set a new password" size="narrow" lead="A link to do so is mailed to the account’s address.">
      <Form
        label="Ask for a link"
        action="Send the link"
        submitting={asking}
        onSubmit={() => void asking.submit({ email })}
        fields={['email']}
        aside={
          <Link to={paths.signIn} className="link">
            Back to sign in
          </Link>
        }
      >
        <TextField
          label="E-mail address"
          type="email"
          autoComplete="username"
          value={email}
          onChange={setEmail}
          problem={asking.at('email')}
        />
      </Form>
      {sentTo !== null && (
        <>
          <Notice tone="good" title="Look in your mail.">
            If {sentTo} has an account, a link is on its way. It works once, for 30 minutes; the one before
            works no longer.
          </Notice>
          <MailHint />
        </>
      )}
    </Page>
  );
}
