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
  const fates = useFates(account);
  const stuck = fates.filter(({ isStuck }) => isStuck).map(({ teamName }) => teamName);
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
      refusedBecause={
        stuck.length > 0
          ? `Make somebody else an admin of ${stuck.join(' and of ')} first, or remove the other members.`
          : undefined
      }
    >
      <p>
        {fates.length === 0
          ? 'You belong to no team; nothing else is deleted with the account.'
          : 'What becomes of your teams:'}
      </p>
      <ul className="list-disc space-y-1 pl-5">
        {fates.map(({ teamSlug, teamName, words }) => (
          <li key={teamSlug}>
            <strong className="wrap-anywhere">{teamName}</strong>: {words}
          </li>
        ))}
      </ul>
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

interface Fate {
  readonly teamSlug: string;
  readonly teamName: string;
  readonly words: string;
  /** Whether the account cannot be deleted for it. */
  readonly isStuck: boolean;
}

/** What becomes of each team. */
function useFates({ id, memberships }: Account): Fate[] {
  const answers = useQueries({ queries: memberships.map(({ teamSlug }) => teamQueries.members(teamSlug)) });
  return memberships.map(({ teamSlug, teamName }, index) => ({
    teamSlug,
    teamName,
    ...fateOf(answers[index].data, id),
  }));
}

function fateOf(members: readonly Member[] | undefined, ownId: number): Pick<Fate, 'words' | 'isStuck'> {
  if (members === undefined) return { words: 'looking up who else belongs to it…', isStuck: false };
  const others = members.filter(({ userId }) => userId !== ownId);
  if (others.length === 0) {
    return { words: 'you are its only member, so it is deleted with all its tables.', isStuck: false };
  }
  return others.some(({ role }) => role === 'admin')
    ? { words: 'it stays with its other members.', isStuck: false }
    : { words: 'you are its last admin, and it has other members.', isStuck: true };
}
