import { bigint, index, int, mysqlTable } from 'drizzle-orm/mysql-core';
import { exactText } from './columns.ts';

/** Counters of the rate limiter: just the columns that rate-limiter-flexible fills, in its order. */
export const rateLimits = mysqlTable(
  'rate_limits',
  {
    key: exactText(255).primaryKey(),
    points: int().notNull().default(0),
    /** Milliseconds since 1970. */
    expire: bigint({ mode: 'number', unsigned: true }),
  },
  (table) => [index('rate_limits_expire').on(table.expire)],
);
