import { useSyncExternalStore } from 'react';
import { theBench } from '../state/use-bench.ts';
import { createSavedLinks, type SavedLinks, type SavedView } from './saved-links.ts';

let links: SavedLinks | null = null;

/** Those of the one bench of this tab. */
export function theSavedLinks(): SavedLinks {
  links ??= createSavedLinks({
    bench: theBench(),
    storage: {
      getItem: (key) => localStorage.getItem(key),
      setItem: (key, text) => localStorage.setItem(key, text),
    },
    tabs: window,
    files: {
      read: async () => (await import('./kept-file.ts')).readKeptFile(),
      write: async (file) => (await import('./kept-file.ts')).writeKeptFile(file),
    },
  });
  return links;
}

export function useSavedView(): SavedView {
  const { subscribe, getView } = theSavedLinks();
  return useSyncExternalStore(subscribe, getView);
}
