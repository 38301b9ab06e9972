import { useState } from 'react';
import type { HarmonicsSource, PointsSource, Source } from '../../../../shared/contract/index.ts';
import type { ChangeManner, OnChange } from './change.ts';
import { harmonicsOf, pointsAlong } from './convert.ts';
import { shapeSource } from './starts.ts';

export type Kind = Source['kind'];

export interface KeptWork {
  /** Kinds that are set aside and can be come back to. */
  readonly kinds: readonly Kind[];
  /** Passes an edit on. */
  change: (now: Source, next: Source, how?: ChangeManner) => void;
  /** Goes over to another kind: back to what was made of it before, else to a start from the present curve. */
  goTo: (now: Source, kind: Kind, highestFitting: number, isSound: boolean) => void;
}

/**
 * Keeps the work of each kind for coming back while the same wave is on the bench. A wave that came from elsewhere (an
 * example, a link, another tab) brings none: it is known by not having passed through here.
 */
export function useKeptWork(onChange: OnChange): KeptWork {
  const [{ kept, known }] = useState(() => ({ kept: new Map<Kind, Source>(), known: new WeakSet<Source>() }));
  const [kinds, setKinds] = useState<readonly Kind[]>([]);

  const pass = (now: Source, next: Source, how?: ChangeManner) => {
    if (!known.has(now)) {
      kept.clear();
      known.add(now);
      setKinds([]);
    }
    known.add(next);
    onChange(next, how);
  };

  return {
    kinds,
    change: pass,
    goTo(now, kind, highestFitting, isSound) {
      if (kind === now.kind) return;
      const before = known.has(now) ? kept.get(kind) : undefined;
      const next = before ?? startOf(kind, now, highestFitting, isSound);
      if (next === null) return;
      pass(now, next);
      kept.set(now.kind, now);
      setKinds([...kept.keys()]);
    },
  };
}

function startOf(
  kind: Kind,
  now: Source,
  highestFitting: number,
  isSound: boolean,
): HarmonicsSource | PointsSource | null {
  const sine = shapeSource('sine', { highest: 1, duty: 0.5 });
  switch (kind) {
    case 'harmonics':
      return now.kind === 'points' && isSound ? harmonicsOf(now, highestFitting) : sine;
    case 'points':
      return pointsAlong(now.kind === 'harmonics' ? now : sine);
    default:
      return null;
  }
}
