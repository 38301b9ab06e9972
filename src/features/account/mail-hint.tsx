import { Link } from 'react-router-dom';
import { paths } from '../../paths.ts';

/** Where to look for a mail while everything runs on one's own machine. */
export function MailHint() {
  if (!/^(localhost|127\.|\[::1\])/.test(location.hostname)) return null;
  return (
    <p>
      On this machine mail is not sent on: it lies in the <Link to={paths.mailbox}>local mailbox</Link>.
    </p>
  );
}
