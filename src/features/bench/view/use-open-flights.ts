import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { FlightId } from '../problems/field-names.ts';
import { readOpenFlights, writeOpenFlights } from './open-flights.ts';

const parameter = 'open';

/** Which flights are open, kept in the URL, so that a reload or a bookmark shows the same view. */
export function useOpenFlights() {
  const [parameters, setParameters] = useSearchParams();
  const text = parameters.get(parameter);
  const open = useMemo(() => readOpenFlights(text), [text]);
  const setOpen = useCallback(
    (id: FlightId, isOpen: boolean) =>
      setParameters(
        (before) => {
          const others = readOpenFlights(before.get(parameter)).filter((one) => one !== id);
          const next = writeOpenFlights(isOpen ? [...others, id] : others);
          if (next === null) before.delete(parameter);
          else before.set(parameter, next);
          return before;
        },
        { replace: true, preventScrollReset: true },
      ),
    [setParameters],
  );
  return { open, setOpen };
}
