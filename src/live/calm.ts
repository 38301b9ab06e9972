import type { Live } from './live.ts';

/**
 * The same value for reading rather than watching: a first change is there at once, further ones at most every
 * `everyMs` milliseconds, and the last one always.
 */
export function calmed<Value>(source: Live<Value>, everyMs: number): Live<Value> {
  let shown = source.now();
  const { subscribe, isHeard } = whileHeard((tell) => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const take = () => {
      if (Object.is(shown, source.now())) return;
      shown = source.now();
      timer = setTimeout(() => {
        timer = undefined;
        take();
      }, everyMs);
      tell();
    };
    shown = source.now();
    const end = source.subscribe(() => {
      if (timer === undefined) take();
    });
    return () => {
      end();
      clearTimeout(timer);
    };
  });
  return { now: () => (isHeard() ? shown : source.now()), subscribe };
}

/** Whether a condition has held for `forMs` milliseconds and still holds. */
export function lasting(source: Live<boolean>, forMs: number): Live<boolean> {
  let isLong = false;
  const { subscribe } = whileHeard((tell) => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const become = (next: boolean) => {
      if (next === isLong) return;
      isLong = next;
      tell();
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
      isLong = false;
    };
  });
  return { now: () => isLong, subscribe };
}

/** Begins with the first listener and ends with the last. */
function whileHeard(begin: (tell: () => void) => () => void) {
  const listeners = new Set<() => void>();
  let end = () => {};
  return {
    isHeard: () => listeners.size > 0,
    subscribe(onChange: () => void): () => void {
      listeners.add(onChange);
      if (listeners.size === 1) end = begin(() => listeners.forEach((listener) => listener()));
      return () => {
        if (listeners.delete(onChange) && listeners.size === 0) end();
      };
    },
  };
}
