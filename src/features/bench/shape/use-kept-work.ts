import { useState } from 'react';
import type { Source } from '../../../../shared/contract/index.ts';
import { useToast } from '../../../components/index.ts';
import type { ChangeManner, OnChange } from './change.ts';
import { asMix } from './as-mix.ts';
import { harmonicsOf, pointsAlong, samplesAlong } from './convert.ts';
import { useLatest } from './use-latest.ts';

export type Kind = Source['kind'];

export interface KeptWork {
  /** Passes an edit on. */
  change: (now: Source, next: Source, how?: ChangeManner) => void;
  /** Goes over to another kind: back to what was made of it before, else to a start from the present curve. */
  goTo: (now: Source, kind: Kind, highestFitting: number, isSound: boolean) => void;
}

/**
 * Keeps the work of each kind for coming back while the same wave is on the bench. A wave that came from elsewhere (an
 * example, a link, another tab) brings none: it is known by not having passed through here.
 */
export function useKeptWork(source: Source, onChange: OnChange): KeptWork {
  const [{ kept, known }] = useState(() => ({ kept: new Map<Kind, Source>(), known: new WeakSet<Source>() }));
  const latest = useLatest(source);
  const toast = useToast();

  const pass = (now: Source, next: Source, how?: ChangeManner) => {
    if (!known.has(now)) {
      kept.clear();
      known.add(now);
    }
    known.add(next);
    onChange(next, how);
  };
  const goOver = (now: Source, next: Source) => {
    pass(now, next);
    kept.set(now.kind, now);
  };

  return {
    change: pass,
    goTo(now, kind, highestFitting, isSound) {
      if (kind === now.kind) return;
      const next =
        (known.has(now) ? kept.get(kind) : undefined) ?? startOf(kind, now, highestFitting, isSound);
      if (next !== null) return goOver(now, next);
      import('./convert-any.ts').then(
        ({ sourceOfKind }) => {
          // What has been changed meanwhile is not gone over.
          if (latest.current === now) goOver(now, sourceOfKind(kind, now, highestFitting, isSound));
        },
        () => toast({ message: 'The program for that could not be loaded. Try again.', tone: 'fault' }),
      );
    },
  };
}

/** The starts that need no more program than the page has; `null` for the others. */
function startOf(kind: Kind, now: Source, highestFitting: number, isSound: boolean): Source | null {
  if (kind === 'mix') return asMix(now);
  if (kind === 'harmonics' && now.kind === 'points' && isSound) return harmonicsOf(now, highestFitting);
  if (kind === 'points' && now.kind === 'harmonics') return pointsAlong(now);
  if (kind === 'samples' && (now.kind === 'harmonics' || (now.kind === 'points' && isSound)))
    return samplesAlong(now);
  return null;
}
