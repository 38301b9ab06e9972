import { useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { signUpSchema } from '../../../shared/contract/index.ts';
import { signUp } from '../../api/account.ts';
import { PasswordField, Page, TextField } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { SendAgain } from '../../forms/sign-in-form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';
import { MailHint } from './mail-hint.tsx';

/** Makes an account; the address is verified by mail. */
export function SignUpPage() {
  const [parameters] = useSearchParams();
  const [typed, setTyped] = useState({ name: '', email: parameters.get('email') ?? '', password: '' });
  const [sentTo, setSentTo] = useState<string | null>(null);
  const signing = useSubmit(async (wanted: typeof typed) => {
    await signUp(wanted);
    setSentTo(wanted.email.trim());
  }, signUpSchema);
  const set = (part: Partial<typeof typed>) => setTyped({ ...typed, ...part });

  if (sentTo !== null) return <LookInMail email={sentTo} onBack={() => setSentTo(null)} />;
  return (
    <Page
      title="Make an account"
      size="narrow"
      lead="With an account you save tables to a team’s library and share them. The bench works without one, and what is on it stays there."
    >
      <Form
        label="Make an account"
        action="Make the account"
        submitting={signing}
        onSubmit={() => void signing.submit(typed)}
        fields={['name', 'email', 'password']}
        aside={
          <span className="quiet">
            Have one? <Link to={paths.signIn}>Sign in</Link>
          </span>
        }
      >
        <TextField
          label="Name"
          description="As your team will see it."
          autoComplete="name"
          value={typed.name}
          onChange={(name) => set({ name })}
          problem={signing.at('name')}
        />
        <TextField
          label="E-mail address"
          type="email"
          autoComplete="username"
          value={typed.email}
          onChange={(email) => set({ email })}
          problem={signing.at('email')}
        />
        <PasswordField
          label="Password"
          description="At least 10 characters. Length is what counts; a few unrelated words do well."
          autoComplete="new-password"
          value={typed.password}
          onChange={(password) => set({ password })}
          problem={signing.at('password')}
        />
      </Form>
    </Page>
  );
}

function LookInMail({ email, onBack }: { email: string; onBack: () => void }) {
  return (
    <Page title="Look in your mail" size="narrow">
      <div className="space-y-3">
        <p>
          A mail is on its way to <strong className="break-words">{email}</strong>. Its link verifies the
          address; it works once, for 24 hours. What you shaped is still on the bench.
        </p>
        <MailHint />
        <p className="quiet">
          Nothing there after some minutes? Look among unwanted mail, or{' '}
          <button type="button" className="link" onClick={onBack}>
            mend the address
          </button>
          .
        </p>
        <SendAgain email={email} />
      </div>
    </Page>
  );
}
