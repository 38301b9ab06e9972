import { useState } from 'react';
import { Link } from 'react-router-dom';
import { confirmAddress } from '../../api/account.ts';
import { Notice, Page } from '../../components/index.ts';
import { paths } from '../../paths.ts';
import { LinkPage } from './link-page.tsx';

/** Takes a new address into use. */
export function ConfirmAddressPage() {
  const [email, setEmail] = useState<string | null>(null);
  if (email === null) {
    return (
      <LinkPage
        title="Use this address"
        lead="From then on you sign in with it, and mail goes there."
        action="Use the new address"
        onUse={async (token) => setEmail(await confirmAddress(token))}
        otherwise={
          <p>
            Ask for the change again on the <Link to={paths.account}>account page</Link>.
          </p>
        }
      />
    );
  }
  return (
    <Page title="Your address was changed" size="narrow">
      <Notice tone="good">
        The account uses <strong className="break-words">{email}</strong> from now on.
      </Notice>
      <p>
        <Link to={paths.account}>Go to the account</Link>
      </p>
    </Page>
  );
}
