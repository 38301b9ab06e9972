import { useSyncExternalStore } from 'react';

export const themes = ['system', 'light', 'dark'] as const;
export type Theme = (typeof themes)[number];

/** Read by public/theme.js before the first paint. */
const storageKey = 'stepwell-theme';
const listeners = new Set<() => void>();

function current(): Theme {
  const { theme } = document.documentElement.dataset;
  return theme === 'light' || theme === 'dark' ? theme : 'system';
}

function choose(theme: Theme): void {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  try {
    localStorage.setItem(storageKey, theme);
  } catch {
    // Storage may be switched off: the choice then lasts as long as the page.
  }
  listeners.forEach((listener) => {
    listener();
  });
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** The theme asked for, and what changes it. */
export function useTheme(): [Theme, (theme: Theme) => void] {
  return [useSyncExternalStore(subscribe, current), choose];
}
