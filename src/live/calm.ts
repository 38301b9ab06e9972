import type { Live } from './live.ts';

/**
 * The same value for reading rather than watching: a first change is there at once, further ones at most every
 * `everyMs` milliseconds, and the last one always. It follows while somebody listens.
 */
export function calmed<Value>(source: Live<Value>, everyMs: number): Live<Value> {
  const listeners = new Set<() => void>();
  let shown = source.now();
  let timer: ReturnType<typeof setTimeout> | undefined;
  let end = () => {};

  const take = () => {
    if (Object.is(shown, source.now())) return;
    shown = source.now();
    timer = setTimeout(() => {
      timer = undefined;
      take();
    }, everyMs);
    for (const listener of listeners) listener();
  };
  const follow = () => {
    if (timer === undefined) take();
  };

  return {
    // With nobody listening there is nobody to spare.
    now: () => (listeners.size === 0 ? source.now() : shown),
    subscribe(onChange) {
      if (listeners.size === 0) {
        shown = source.now();
        end = source.subscribe(follow);
      }
      listeners.add(onChange);
      return () => {
        if (!listeners.delete(onChange) || listeners.size > 0) return;
        end();
        clearTimeout(timer);
        timer = undefined;
      };
    },
  };
}

/** Whether a condition has held for `forMs` milliseconds and still holds. */
export function lasting(source: Live<boolean>, forMs: number): Live<boolean> {
  const isLong = { now: false };
  return {
    now: () => isLong.now,
    subscribe(onChange) {
      let timer: ReturnType<typeof setTimeout> | undefined;
      const become = (next: boolean) => {
        if (next === isLong.now) return;
        isLong.now = next;
        onChange();
      };
      const follow = () => {
        clearTimeout(timer);
        if (source.now()) timer = setTimeout(() => become(true), forMs);
        else become(false);
      };
      const end = source.subscribe(follow);
      follow();
      return () => {
        end();
        clearTimeout(timer);
      };
    },
  };
}
