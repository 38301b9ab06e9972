import { useLayoutEffect, useRef, type RefObject } from 'react';

/** What was rendered last, for handlers that stay the same from render to render. */
export function useLatest<Value>(value: Value): RefObject<Value> {
  const latest = useRef(value);
  useLayoutEffect(() => {
    latest.current = value;
  });
  return latest;
}
