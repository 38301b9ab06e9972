import type { ReactNode } from 'react';

/** A key's cap. */
export function Kbd({ children }: { children: ReactNode }) {
  return <kbd className="key-cap">{children}</kbd>;
}
