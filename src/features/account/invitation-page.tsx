import { useEffect, useRef, useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { Account, OpenInvitation } from '../../../shared/contract/index.ts';
import { acceptInvitation, openInvitation } from '../../api/account.ts';
import { useAccountState } from '../../api/account-state.ts';
import { newKey } from '../../api/new-key.ts';
import { signOut } from '../../api/sign-in.ts';
import { Button, Notice, Page, Waiting, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { SignInForm } from '../../forms/sign-in-form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { paths, tablesPath } from '../../paths.ts';
import { keptInvitation } from './kept-invitation.ts';
import { NoToken, useLinkToken } from './link-page.tsx';
import { sayRole } from '../../forms/say-role.ts';

/** Shows an invitation to a team, and accepts it for whoever it was sent to. */
export function InvitationPage() {
  const token = useLinkToken();
  return token === '' ? <NoToken /> : <Invitation key={token} token={token} />;
}

function Invitation({ token }: { token: string }) {
  const [invitation, setInvitation] = useState<OpenInvitation | null>(null);
  const known = useAccountState();
  const opening = useSubmit(async () => {
    try {
      setInvitation(await openInvitation(token));
    } catch (error) {
      if (keptInvitation.read() === token) keptInvitation.letGo();
      throw error;
    }
  });
  const { submit } = opening;
  const isOpened = useRef(false);
  useEffect(() => {
    if (isOpened.current) return;
    isOpened.current = true;
    void submit(undefined);
  }, [submit]);

  if (opening.fault) {
    return (
      <Page title="This invitation cannot be opened" size="narrow">
        <ProblemNotice fault={opening.fault} onTryAgain={() => void submit(undefined)} />
        {!opening.fault.isPassing && <p>Ask the team’s admin to invite you again.</p>}
      </Page>
    );
  }
  if (invitation === null) return <Waiting>Opening the invitation…</Waiting>;
  return (
    <Page title={`Join ${invitation.teamName}`} size="narrow" lead={<Terms invitation={invitation} />}>
      {known.kind === 'person' ? (
        <Accept token={token} invitation={invitation} account={known.account} />
      ) : (
        <BecomeKnown token={token} email={invitation.email} />
      )}
    </Page>
  );
}

function Terms({ invitation: { role, email } }: { invitation: OpenInvitation }) {
  return (
    <p>
      Invited: <strong className="break-words">{email}</strong>, as {role}. {sayRole(role)}
    </p>
  );
}

function Accept({
  token,
  invitation,
  account,
}: {
  token: string;
  invitation: OpenInvitation;
  account: Account;
}) {
  const [key] = useState(newKey);
  const navigate = useNavigate();
  const toast = useToast();
  const accepting = useSubmit(async () => {
    const { teamName, teamSlug, role } = await acceptInvitation(token, key);
    keptInvitation.letGo();
    toast({ message: `You belong to ${teamName} now, as ${role}.`, tone: 'good' });
    await navigate(tablesPath(teamSlug), { replace: true });
  });
  const leaving = useSubmit(signOut);
  if (account.email !== invitation.email) {
    return (
      <Notice
        title="The invitation is for another address."
        actions={
          <Button size="small" isDisabled={leaving.isBusy} onPress={() => void leaving.submit(undefined)}>
            Sign out
          </Button>
        }
      >
        It was sent to {invitation.email}, and you are signed in as {account.email}. Sign out, then sign in as{' '}
        {invitation.email}.
      </Notice>
    );
  }
  return (
    <>
      <ProblemNotice fault={accepting.fault} />
      <div className="flex flex-wrap gap-2">
        <Button
          variant="primary"
          isDisabled={accepting.isBusy}
          disabledReason="This is under way"
          onPress={() => void accepting.submit(undefined)}
        >
          Join the team
        </Button>
        <Link to={paths.bench} className="button button-plain" onClick={() => keptInvitation.letGo()}>
          Not now
        </Link>
      </div>
    </>
  );
}

/** The invitation is kept, so that it is here again after sign-up and verification. */
function BecomeKnown({ token, email }: { token: string; email: string }) {
  useEffect(() => keptInvitation.keep(token), [token]);
  return (
    <>
      <p>
        Sign in with this address to join. Without an account yet,{' '}
        <Link to={`${paths.signUp}?${new URLSearchParams({ email })}`}>make one with it</Link>; the invitation
        waits in this browser meanwhile.
      </p>
      <SignInForm email={email} onSignedIn={() => undefined} />
    </>
  );
}
