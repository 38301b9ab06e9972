import { Link, useLocation, useNavigate } from 'react-router-dom';
import { useAccountState } from '../api/account-state.ts';
import { Menu, icons, useToast } from '../components/index.ts';
import { paths, signInPath } from '../paths.ts';

export interface AccountMenuProps {
  /** Called once nobody is signed in any more. */
  onSignedOut: () => void;
}

/** Who is signed in, or the way to be. */
export function AccountMenu({ onSignedOut }: AccountMenuProps) {
  const known = useAccountState();
  const navigate = useNavigate();
  const toast = useToast();
  const { pathname, search } = useLocation();

  if (known.kind !== 'person') {
    // Until the server has said that nobody is signed in the place is held, so that nothing jumps.
    return (
      <Link
        to={pathname === paths.signIn ? paths.signIn : signInPath(pathname + search)}
        className="button button-small"
        data-held={known.kind === 'unknown' ? '' : undefined}
      >
        Sign in
      </Link>
    );
  }
  const leave = async () => {
    try {
      const { signOut } = await import('../api/sign-in.ts');
      await signOut();
      await navigate(paths.bench);
      onSignedOut();
      toast('You are signed out. What is on the bench stays in this browser.');
    } catch (error) {
      toast({ message: `Still signed in: ${error instanceof Error ? error.message : ''}`, tone: 'fault' });
    }
  };
  return (
    <Menu
      label={`Account of ${known.account.name}`}
      icon={icons.person}
      items={[
        { id: 'account', label: 'Account', icon: icons.person, onSelect: () => void navigate(paths.account) },
        { id: 'sign-out', label: 'Sign out', icon: icons.leave, onSelect: () => void leave() },
      ]}
    >
      <span className="menu-words">{known.account.name}</span>
    </Menu>
  );
}
