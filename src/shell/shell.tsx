import { NavLink, Outlet, ScrollRestoration, useNavigation } from 'react-router-dom';
import { engineVersion } from '../../shared/engine-version.ts';
import { ToastRegion } from '../components/index.ts';
import { paths } from '../paths.ts';
import { KeySheet } from './key-sheet.tsx';
import type { Place } from './places.ts';
import { ThemeSwitch } from './theme-switch.tsx';
import { WordMark } from './word-mark.tsx';

/** What stands around every place: name, places, theme, keys, messages. */
export function Shell({ places }: { places: readonly Place[] }) {
  const isGoing = useNavigation().state !== 'idle';
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
            <NavLink key={place.to} to={place.to} end={place.to === paths.bench} className="shell-place">
              {place.label}
            </NavLink>
          ))}
        </nav>
        <div className="shell-tools">
          <ThemeSwitch />
          <KeySheet />
        </div>
      </header>
      <main id="main" tabIndex={-1} className="shell-main" aria-busy={isGoing}>
        <Outlet />
      </main>
      <footer className="shell-foot">
        <p>Before you connect anything, check pin and port limits in the data sheet of your part.</p>
        <p>Engine {engineVersion}</p>
      </footer>
      <ToastRegion />
      <ScrollRestoration />
    </div>
  );
}
