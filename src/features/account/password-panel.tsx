import { useState } from 'react';
import { useQueryClient } from '@tanstack/react-query';
import { changePasswordSchema } from '../../../shared/contract/index.ts';
import { changePassword, sessionQueries } from '../../api/account.ts';
import { Panel, PasswordField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';

const nothing = { currentPassword: '', newPassword: '' };

export function PasswordPanel({ email }: { email: string }) {
  const [typed, setTyped] = useState(nothing);
  const toast = useToast();
  const queryClient = useQueryClient();
  const changing = useSubmit(async (wanted: typeof typed) => {
    await changePassword(wanted);
    setTyped(nothing);
    toast({ message: 'Your password was changed. All other sessions have ended.', tone: 'good' });
    await queryClient.invalidateQueries({ queryKey: sessionQueries.all });
  }, changePasswordSchema);
  return (
    <Panel title="Password">
      <Form
        label="Password"
        action="Change the password"
        variant="plain"
        submitting={changing}
        onSubmit={() => void changing.submit(typed)}
        fields={['currentPassword', 'newPassword']}
      >
        {/* Tells a password keeper whose password it is. */}
        <input type="email" autoComplete="username" value={email} readOnly hidden />
        <PasswordField
          label="Current password"
          autoComplete="current-password"
          value={typed.currentPassword}
          onChange={(currentPassword) => setTyped({ ...typed, currentPassword })}
          problem={changing.at('currentPassword')}
        />
        <PasswordField
          label="New password"
          description="At least 10 characters. It ends all other sessions."
          autoComplete="new-password"
          value={typed.newPassword}
          onChange={(newPassword) => setTyped({ ...typed, newPassword })}
          problem={changing.at('newPassword')}
        />
      </Form>
    </Panel>
  );
}
