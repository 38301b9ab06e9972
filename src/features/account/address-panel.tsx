import { useState } from 'react';
import { changeAddressSchema } from '../../../shared/contract/index.ts';
import { changeAddress } from '../../api/account.ts';
import { Notice, Panel, PasswordField, TextField } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { MailHint } from './mail-hint.tsx';

export function AddressPanel({ email: present }: { email: string }) {
  const [typed, setTyped] = useState({ email: '', currentPassword: '' });
  const [sentTo, setSentTo] = useState<string | null>(null);
  const changing = useSubmit(async (wanted: typeof typed) => {
    setSentTo(null);
    await changeAddress(wanted);
    setSentTo(wanted.email.trim());
    setTyped({ email: '', currentPassword: '' });
  }, changeAddressSchema);
  return (
    <Panel title="E-mail address">
      <p>
        You sign in with <strong className="break-words">{present}</strong>.
      </p>
      <Form
        label="E-mail address"
        action="Ask for the change"
        variant="plain"
        submitting={changing}
        onSubmit={() => void changing.submit(typed)}
        fields={['email', 'currentPassword']}
      >
        <TextField
          label="New address"
          type="email"
          autoComplete="email"
          value={typed.email}
          onChange={(email) => setTyped({ ...typed, email })}
          problem={changing.at('email')}
        />
        <PasswordField
          label="Current password"
          autoComplete="current-password"
          value={typed.currentPassword}
          onChange={(currentPassword) => setTyped({ ...typed, currentPassword })}
          problem={changing.at('currentPassword')}
        />
      </Form>
      {sentTo !== null && (
        <Notice tone="good" title="Look in the new mailbox.">
          The link sent to {sentTo} takes the address into use. Until then nothing changes.
          <MailHint />
        </Notice>
      )}
    </Panel>
  );
}
