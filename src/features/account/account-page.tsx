import './account.css';
import type { Account } from '../../../shared/contract/index.ts';
import { Page } from '../../components/index.ts';
import { WithAccount } from '../../forms/with-account.tsx';
import { AddressPanel } from './address-panel.tsx';
import { DeletePanel } from './delete-panel.tsx';
import { NamePanel } from './name-panel.tsx';
import { NoticesPanel } from './notices-panel.tsx';
import { PasswordPanel } from './password-panel.tsx';
import { SessionsPanel } from './sessions-panel.tsx';
import { TeamsPanel } from './teams-panel.tsx';

/** One's own account, all of it on one page. */
export function AccountPage() {
  return (
    <WithAccount why="Your account is here once you are signed in.">
      {(account) => <AccountParts account={account} />}
    </WithAccount>
  );
}

function AccountParts({ account }: { account: Account }) {
  return (
    <Page title="Account" lead={account.email}>
      <div className="account-panels">
        <NamePanel key={account.name} name={account.name} />
        <TeamsPanel memberships={account.memberships} />
        <AddressPanel email={account.email} />
        <PasswordPanel email={account.email} />
      </div>
      <NoticesPanel />
      <SessionsPanel />
      <DeletePanel account={account} />
    </Page>
  );
}
