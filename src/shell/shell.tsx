import { lazy, Suspense } from 'react';
import { Link, NavLink, Outlet, ScrollRestoration, useNavigation } from 'react-router-dom';
import { engineVersion } from '../../shared/engine-version.ts';
import { ToastRegion } from '../components/index.ts';
import { paths } from '../paths.ts';
import { AccountMenu, type AccountMenuProps } from './account-menu.tsx';
import { KeySheet } from './key-sheet.tsx';
import { usePlaces, type Place } from './places.ts';
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

/** A link of the navigation. A place that takes in an address of another one is marked there in its stead. */
function PlaceLink({ place: { label, to, isExact, isHere, countsFor } }: { place: Place }) {
  const words = (
    <>
      {label}
      {countsFor !== undefined && (
        <Suspense fallback={null}>
          <WaitingCount team={countsFor} />
        </Suspense>
      )}
    </>
  );
  if (isHere === undefined) {
    return (
      <NavLink to={to} end={isExact} className="shell-place">
        {words}
      </NavLink>
    );
  }
  return (
    <Link to={to} className="shell-place" aria-current={isHere ? 'page' : undefined}>
      {words}
    </Link>
  );
}

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
            <PlaceLink key={place.label} place={place} />
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
