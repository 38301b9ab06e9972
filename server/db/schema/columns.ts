import { sql } from 'drizzle-orm';
import { bigint, customType, datetime } from 'drizzle-orm/mysql-core';

/** Row number, below 2^53 so that it is an exact JavaScript number. */
export const id = () => bigint({ mode: 'number', unsigned: true }).autoincrement().primaryKey();

export const reference = (name: string) => bigint(name, { mode: 'number', unsigned: true });

/** A moment in UTC, to the millisecond. */
export const moment = (name: string) => datetime(name, { mode: 'date', fsp: 3 });

export const createdAt = () =>
  moment('created_at')
    .notNull()
    .default(sql`CURRENT_TIMESTAMP(3)`);

/** Text compared byte by byte, where the database's own collation would take `é` for `e`: addresses, slugs, digests. */
export const exactText = (length: number, name?: string) =>
  customType<{ data: string }>({
    dataType: () => `varchar(${length}) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin`,
  })(name as string);
