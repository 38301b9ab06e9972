import { sql, type SQL } from 'drizzle-orm';
import type { MySqlColumn } from 'drizzle-orm/mysql-core';
import type { TablesQuery } from '../../../shared/contract/index.ts';
import { waveTables } from '../../db/schema/index.ts';
import type { Position } from '../../http/list-cursor.ts';

const columns: Readonly<Record<TablesQuery['sort'], MySqlColumn>> = {
  changed: waveTables.changedAt,
  title: waveTables.title,
  snr: waveTables.snrDb,
  bytes: waveTables.tableBytes,
  length: waveTables.length,
  bits: waveTables.bits,
};

export interface Order {
  readonly column: MySqlColumn;
  /** The tables, by the index in this order. */
  readonly source: SQL;
  readonly by: SQL;
  /** Rows that come after a place. */
  beyond(place: Position): SQL;
}

/** An order of the list: by one column, by age where that is equal. What has no figure counts as less than any. */
export function orderOf(sort: TablesQuery['sort'], direction: TablesQuery['direction']): Order {
  const column = columns[sort];
  const word = sql.raw(direction);
  return {
    column,
    source: sql`${waveTables} force index (${sql.raw(`wave_tables_${sort}`)})`,
    by: sql`${column} ${word}, ${waveTables.id} ${word}`,
    beyond: ({ key, id }) => (direction === 'asc' ? above(column, key, id) : below(column, key, id)),
  };
}

const above = (column: MySqlColumn, key: Position['key'], id: number) =>
  key === null
    ? sql`(${column} is not null or (${column} is null and ${waveTables.id} > ${id}))`
    : sql`(${column} > ${key} or (${column} = ${key} and ${waveTables.id} > ${id}))`;

const below = (column: MySqlColumn, key: Position['key'], id: number) =>
  key === null
    ? sql`(${column} is null and ${waveTables.id} < ${id})`
    : sql`(${column} < ${key} or ${column} is null or (${column} = ${key} and ${waveTables.id} < ${id}))`;
