import { useSyncExternalStore } from 'react';

/** From this width on the drawings stand beside the flights; bench.css says the same. */
const wide = matchMedia('(min-width: 64rem)');

function subscribe(listener: () => void): () => void {
  wide.addEventListener('change', listener);
  return () => wide.removeEventListener('change', listener);
}

const isWide = () => wide.matches;

/** Whether the drawings stand beside the flights. It orders the document, so that the keyboard goes as the eye does. */
export function useIsWide(): boolean {
  return useSyncExternalStore(subscribe, isWide);
}
