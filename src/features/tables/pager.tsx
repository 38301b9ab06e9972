import { Link, useLocation } from 'react-router-dom';
import type { ListQuery } from '../../api/tables.ts';
import { changedQuery } from './list-query.ts';

interface PagerProps {
  query: ListQuery;
  count: number;
  nextCursor: string | null;
}

/** Pages go forward from the first; the browser's own Back goes back one. */
export function Pager({ query, count, nextCursor }: PagerProps) {
  const { pathname } = useLocation();
  const first = changedQuery(query, {});
  const to = (next: Record<string, string>) => ({ pathname, search: String(new URLSearchParams(next)) });
  const isFirst = query.cursor === undefined;
  return (
    <nav className="pager" aria-label="Pages">
      <span className="quiet">
        {count} {count === 1 ? 'table' : 'tables'} on this page
        {isFirst && nextCursor === null && ', all there are'}
      </span>
      {!isFirst && (
        <Link to={to(first)} className="button button-plain button-small">
          First page
        </Link>
      )}
      {nextCursor !== null && (
        <Link to={to({ ...first, cursor: nextCursor })} className="button button-plain button-small">
          Next page
        </Link>
      )}
    </nav>
  );
}
