import type { ListQuery } from '../../api/tables.ts';
import { icons } from '../../components/index.ts';
import { sortedBy, viewOf, type Sort } from './list-query.ts';
import { sortWords } from './sort-words.ts';
import type { ChangeQuery } from './use-list-query.ts';

interface SortHeadProps {
  sort: Sort;
  query: ListQuery;
  onChange: ChangeQuery;
  isNumber?: boolean;
}

/** Head of a column that the list can be sorted by. */
export function SortHead({ sort, query, onChange, isNumber = false }: SortHeadProps) {
  const view = viewOf(query);
  const isSorted = view.sort === sort;
  const Arrow = view.direction === 'asc' ? icons.arrowUp : icons.arrowDown;
  return (
    <th
      scope="col"
      aria-sort={isSorted ? (view.direction === 'asc' ? 'ascending' : 'descending') : undefined}
      className={isNumber ? 'is-number' : undefined}
    >
      <button
        type="button"
        className="sort-head"
        onClick={() => onChange((before) => sortedBy(before, sort))}
      >
        {sortWords[sort]}
        <span className="sort-arrow">{isSorted && <Arrow width="14" height="14" />}</span>
      </button>
    </th>
  );
}
