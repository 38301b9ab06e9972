import { useSyncExternalStore } from 'react';

/** Up to this width tables stand as cards; tables.css says the same. */
const narrow = matchMedia('(max-width: 52rem)');

function subscribe(listener: () => void): () => void {
  narrow.addEventListener('change', listener);
  return () => narrow.removeEventListener('change', listener);
}

const isNarrow = () => narrow.matches;

export const useIsNarrow = (): boolean => useSyncExternalStore(subscribe, isNarrow);
