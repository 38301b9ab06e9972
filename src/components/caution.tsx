import type { ReactNode } from 'react';
import { icons } from './icons.tsx';

/** Stands where the hazard is: a saffron slab with a sign and words, never colour alone. */
export function Caution({ title = 'Caution', children }: { title?: string; children: ReactNode }) {
  return (
    <div role="note" className="slab slab-saffron">
      <icons.caution className="slab-sign" />
      <div>
        <strong>{title}.</strong> {children}
      </div>
    </div>
  );
}
