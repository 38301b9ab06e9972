import { bigint, index, int, mysqlTable, varchar } from 'drizzle-orm/mysql-core';

/** Counters of the rate limiter, in the shape that rate-limiter-flexible keeps them in. */
export const rateLimits = mysqlTable(
  'rate_limits',
  {
    key: varchar({ length: 255 }).primaryKey(),
    points: int().notNull().default(0),
    /** Milliseconds since 1970. */
    expire: bigint({ mode: 'number', unsigned: true }),
  },
  (table) => [index('rate_limits_expire').on(table.expire)],
);
