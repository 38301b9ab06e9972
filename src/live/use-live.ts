import { useLayoutEffect, useState, useSyncExternalStore } from 'react';
import { createLive, type Live } from './live.ts';

/** Renders with each change of a live value. */
export function useLive<Value>(live: Live<Value>): Value {
  return useSyncExternalStore(live.subscribe, live.now);
}

/** What was rendered last, as a live value. */
export function useAsLive<Value>(value: Value): Live<Value> {
  const [live] = useState(() => createLive(value));
  useLayoutEffect(() => live.set(value), [live, value]);
  return live;
}
