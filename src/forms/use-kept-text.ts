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
  const key = keyOf(own, name);
  const [typed, setTyped] = useState(() => ({ key, text: read(key) }));
  // Another person, or another place, has a text of its own; what was typed before it was known who types goes along.
  if (typed.key !== key) {
    const early = typed.key === keyOf(undefined, name) ? typed.text : '';
    setTyped({ key, text: early || read(key) });
  }
  const set = (text: string) => {
    setTyped({ key, text });
    write(key, text);
  };
  return [typed.text, set];
}

const keyOf = (person: number | undefined, name: string) => `stepwell.typed ${person ?? 'nobody'} ${name}`;

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
