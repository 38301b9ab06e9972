import { useEffect, useRef } from 'react';
import { useLocation, useNavigation, useSearchParams } from 'react-router-dom';
import type { ListQuery } from '../../api/tables.ts';
import { readListQuery } from './list-query.ts';

/** Changes what the list is asked for, from what was last asked. */
export type ChangeQuery = (
  update: (before: ListQuery) => Record<string, string>,
  how?: { replace?: boolean },
) => void;

/**
 * What the address asks the list for; what it is about to ask for, so that a filter shows as chosen at once; and what
 * changes it. Changes may follow each other faster than the page is drawn, and each begins from the one before.
 */
export function useListQuery(): { query: ListQuery; wanted: ListQuery; change: ChangeQuery } {
  const [parameters, setParameters] = useSearchParams();
  const { location: goal } = useNavigation();
  const { pathname } = useLocation();
  const address = goal?.pathname === pathname ? goal.search : `?${parameters}`;
  const latest = useRef<ListQuery>({});
  useEffect(() => {
    latest.current = readListQuery(new URLSearchParams(address));
  }, [address]);
  const change: ChangeQuery = (update, how = {}) => {
    const next = update(latest.current);
    latest.current = next;
    setParameters(next, { ...how, preventScrollReset: true });
  };
  return {
    query: readListQuery(parameters),
    wanted: readListQuery(new URLSearchParams(address)),
    change,
  };
}
