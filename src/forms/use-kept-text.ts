import { useState } from 'react';
import { useAccount } from '../api/account-state.ts';

/**
 * Text that somebody is typing, kept in this tab until it is sent: leaving the page, loading it again or a sign-in that
 * has run out takes nothing away.
 *
 * @param name tells apart what it is typed for
 */
export function useKeptText(name: string): [text: string, set: (text: string) => void] {
  const own = useAccount()?.id;
  const key = `stepwell.typed ${own ?? 'nobody'} ${name}`;
  const [typed, setTyped] = useState(() => ({ key, text: read(key) }));
  // Another person, or another place, has a text of its own.
  if (typed.key !== key) setTyped({ key, text: read(key) });
  const set = (text: string) => {
    setTyped({ key, text });
    write(key, text);
  };
  return [typed.key === key ? typed.text : read(key), set];
}

function read(key: string): string {
  try {
    return sessionStorage.getItem(key) ?? '';
  } catch {
    return '';
  }
}

function write(key: string, text: string): void {
  try {
    if (text === '') sessionStorage.removeItem(key);
    else sessionStorage.setItem(key, text);
  } catch {
    // It then lasts as long as the page.
  }
}
