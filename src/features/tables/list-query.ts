import { tablesQuerySchema, tableSorts, type TablesQuery } from '../../../shared/contract/index.ts';
import type { ListQuery } from '../../api/tables.ts';

export type Sort = TablesQuery['sort'];
export type Direction = TablesQuery['direction'];

/** What the address asks the list for: its names are the API's own. */
export interface ListView {
  readonly search: string;
  readonly tag: string | undefined;
  readonly state: TablesQuery['state'];
  readonly isArchived: boolean;
  readonly sort: Sort;
  readonly direction: Direction;
  /** Where the page begins; none for the first. */
  readonly cursor: string | undefined;
}

const names = ['search', 'tag', 'state', 'archived', 'sort', 'direction', 'cursor'] as const;
const filterNames = ['search', 'tag', 'state', 'archived'] as const;

/** What is asked for where the address does not say. */
const standard: Readonly<Record<string, string>> = { archived: 'no', sort: 'changed', direction: 'desc' };

/** Which end comes first when a column is first sorted by. */
const firstDirections: Readonly<Record<Sort, Direction>> = {
  changed: 'desc',
  title: 'asc',
  snr: 'desc',
  bytes: 'asc',
  length: 'asc',
  bits: 'asc',
};

/** Reads an address's query; what the list does not know or take is left out, as nobody typed it here. */
export function readListQuery(parameters: URLSearchParams): ListQuery {
  const query: Record<string, string> = {};
  for (const name of names) {
    const value = parameters.get(name);
    if (value === null || value === '' || value === standard[name]) continue;
    if (tablesQuerySchema.shape[name].safeParse(value).success) query[name] = value;
  }
  return query;
}

/** The same, with every default filled in. */
export function viewOf(query: ListQuery): ListView {
  const whole = tablesQuerySchema.parse(query);
  return {
    search: whole.search ?? '',
    tag: whole.tag,
    state: whole.state,
    isArchived: whole.archived === 'yes',
    sort: whole.sort,
    direction: whole.direction,
    cursor: whole.cursor,
  };
}

/** The query with some of it changed. A cursor is good for its own filters and order only, so it goes. */
export function changedQuery(
  query: ListQuery,
  part: Readonly<Record<string, string | undefined>>,
): Record<string, string> {
  const { cursor: _old, ...kept } = query;
  const merged = { ...kept, ...part };
  return Object.fromEntries(
    Object.entries(merged).flatMap(([name, value]) =>
      value === undefined || value === '' || value === standard[name] ? [] : [[name, value]],
    ),
  );
}

/** Sorted by a column: the other way round where it is already. */
export function sortedBy(query: ListQuery, sort: Sort): Record<string, string> {
  const view = viewOf(query);
  const direction = view.sort !== sort ? firstDirections[sort] : view.direction === 'asc' ? 'desc' : 'asc';
  return changedQuery(query, { sort, direction });
}

export const isFiltered = (query: ListQuery): boolean =>
  filterNames.some((name) => query[name] !== undefined);

/** Without filters, in the same order. */
export const unfiltered = (query: ListQuery): Record<string, string> =>
  changedQuery(query, Object.fromEntries(filterNames.map((name) => [name, undefined])));

export const isSort = (value: string): value is Sort => tableSorts.some((sort) => sort === value);
