import { lazy, Suspense } from 'react';
import { Link, NavLink, Outlet, ScrollRestoration, useNavigation } from 'react-router-dom';
import { engineVersion } from '../../shared/engine-version.ts';
import { ToastRegion } from '../components/index.ts';
import { paths } from '../paths.ts';
import { AccountMenu, type AccountMenuProps } from './account-menu.tsx';
import { KeySheet } from './key-sheet.tsx';
import { usePlaces } from './places.ts';
import { SignInAgain } from './sign-in-again.tsx';
import { TeamSwitcher } from './team-switcher.tsx';
import { ThemeSwitch } from './theme-switch.tsx';
import { WordMark } from './word-mark.tsx';

/** Not worth a fault of the whole page where its program cannot be fetched. */
const WaitingCount = lazy(() =>
  import('./waiting-count.tsx').then(
    ({ WaitingCount }) => ({ default: WaitingCount }),
    () => ({ default: () => null }),
  ),
);

/** Where mail is not sent on, but kept to be read on this machine. */
const mayHaveMailbox = /^(localhost|127\.|\[::1\])/.test(location.hostname);

/** What stands around every place: name, places, team, account, theme, keys, messages. */
export function Shell({ onSignedOut }: AccountMenuProps) {
  const isGoing = useNavigation().state !== 'idle';
  const places = usePlaces();
  return (
    <div className="shell">
      <a href="#main" className="skip-link">
        Skip to the content
      </a>
      <header className="shell-head">
        <NavLink to={paths.bench} className="shell-name" aria-label="Stepwell, to the bench">
          <WordMark />
        </NavLink>
        <nav aria-label="Places" className="shell-places">
          {places.map((place) => (
            <NavLink key={place.label} to={place.to} end={place.isExact} className="shell-place">
              {place.label}
              {place.countsFor !== undefined && (
                <Suspense fallback={null}>
                  <WaitingCount team={place.countsFor} />
                </Suspense>
              )}
            </NavLink>
          ))}
        </nav>
        <TeamSwitcher />
        <div className="shell-tools">
          <AccountMenu onSignedOut={onSignedOut} />
          <ThemeSwitch />
          <KeySheet />
        </div>
      </header>
      <main id="main" tabIndex={-1} className="shell-main" aria-busy={isGoing}>
        <Outlet />
      </main>
      <footer className="shell-foot">
        <p>Before you connect anything, check pin and port limits in the data sheet of your part.</p>
        <p className="flex flex-wrap gap-x-4">
          {mayHaveMailbox && <Link to={paths.mailbox}>Local mailbox</Link>}
          <Link to={paths.api}>HTTP API</Link>
          <span>Engine {engineVersion}</span>
        </p>
      </footer>
      <ToastRegion />
      <SignInAgain />
      <ScrollRestoration />
    </div>
  );
}
