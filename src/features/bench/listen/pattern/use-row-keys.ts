import { useState } from 'react';

/** Keys that go with rows when these move, so that what is typed in one and not taken up goes along. */
export function useRowKeys(count: number) {
  const [state, setState] = useState(() => grown({ keys: [], next: 0 }, count));
  // Undo and presets change the rows from elsewhere.
  const fitting = state.keys.length === count ? state : grown(state, count);
  if (fitting !== state) setState(fitting);
  return {
    keys: fitting.keys,
    /** @param change of the keys, given one that is new */
    setKeys: (change: (keys: readonly number[], fresh: number) => readonly number[]) =>
      setState(({ keys, next }) => ({ keys: change(keys, next), next: next + 1 })),
  };
}

interface Keys {
  readonly keys: readonly number[];
  readonly next: number;
}

function grown({ keys, next }: Keys, count: number): Keys {
  const missing = Math.max(0, count - keys.length);
  const fresh = Array.from({ length: missing }, (_, k) => next + k);
  return { keys: [...keys.slice(0, count), ...fresh], next: next + missing };
}
