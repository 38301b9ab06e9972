import { useEffect, useState } from 'react';

/** The value as it was when it last stood still for so long, in milliseconds; the first value at once. */
export function useSettled<Value>(value: Value, restMs: number): Value {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), restMs);
    return () => clearTimeout(timer);
  }, [value, restMs]);
  return settled;
}
