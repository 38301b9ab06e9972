import { useQueries } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { deleteAccountSchema, type Account, type Member } from '../../../shared/contract/index.ts';
import { deleteAccount } from '../../api/account.ts';
import { teamQueries } from '../../api/teams.ts';
import { Button, Dialog, Panel, PasswordField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths } from '../../paths.ts';

export function DeletePanel({ account }: { account: Account }) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <Panel title="Delete the account">
      <p>
        Your name, address, password and sessions are deleted at once and for good. What you saved for teams
        with other members stays theirs, without your name.
      </p>
      <div>
        <Button variant="danger" onPress={() => setIsOpen(true)}>
          Delete the account…
        </Button>
      </div>
      <Dialog title="Delete the account" isOpen={isOpen} onClose={() => setIsOpen(false)}>
        <DeleteForm account={account} />
      </Dialog>
    </Panel>
  );
}

function DeleteForm({ account }: { account: Account }) {
  const [currentPassword, setCurrentPassword] = useState('');
  const navigate = useNavigate();
  const toast = useToast();
  const deleting = useSubmit(async (typed: { currentPassword: string }) => {
    await deleteAccount(typed.currentPassword);
    toast('Your account was deleted. What is on the bench stays in this browser.');
    await navigate(paths.bench);
  }, deleteAccountSchema);
  return (
    <Form
      label="Delete the account"
      action="Delete it for good"
      variant="danger"
      submitting={deleting}
      onSubmit={() => void deleting.submit({ currentPassword })}
      fields={['currentPassword']}
    >
      <Consequences account={account} />
      <PasswordField
        label="Current password"
        autoComplete="current-password"
        value={currentPassword}
        onChange={setCurrentPassword}
        problem={deleting.at('currentPassword')}
      />
    </Form>
  );
}

/** What becomes of each team. */
function Consequences({ account }: { account: Account }) {
  const answers = useQueries({
    queries: account.memberships.map(({ teamSlug }) => teamQueries.members(teamSlug)),
  });
  if (account.memberships.length === 0) return <p>You belong to no team; nothing else is deleted.</p>;
  return (
    <ul className="list-disc space-y-1 pl-5">
      {account.memberships.map(({ teamSlug, teamName }, index) => (
        <li key={teamSlug}>
          <strong className="break-words">{teamName}</strong>: {becomes(answers[index].data, account.id)}
        </li>
      ))}
    </ul>
  );
}

function becomes(members: readonly Member[] | undefined, ownId: number): string {
  if (members === undefined) return 'looking up who else belongs to it…';
  const others = members.filter(({ userId }) => userId !== ownId);
  if (others.length === 0) return 'you are its only member, so it is deleted with all its tables.';
  return others.some(({ role }) => role === 'admin')
    ? 'it stays with its other members.'
    : 'you are its last admin; make somebody else one first, or the account cannot be deleted.';
}
