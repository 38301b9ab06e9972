import { drizzle, type MySql2Database } from 'drizzle-orm/mysql2';
import mysql, { type Pool, type PoolOptions } from 'mysql2/promise';
import * as schema from './schema/index.ts';

export type Database = MySql2Database<typeof schema>;
/** What commands and queries take: the database or a transaction on it. */
export type Executor = Database | Parameters<Parameters<Database['transaction']>[0]>[0];

export interface OpenDatabase {
  readonly db: Database;
  readonly pool: Pool;
  close(): Promise<void>;
}

/** Turns a database URL into the driver's options: `mysql:` or `mariadb:`, `?socketPath=` for a Unix socket, `?ssl=true`. */
export function connectionOptions(url: string): PoolOptions & { database: string } {
  const { hostname, port, username, password, pathname, searchParams } = new URL(url);
  const socketPath = searchParams.get('socketPath');
  const ssl = searchParams.get('ssl');
  return {
    ...(socketPath
      ? { socketPath }
      : { host: hostname.replace(/^\[|\]$/g, ''), port: port ? Number(port) : 3306 }),
    ...(ssl === 'true' ? { ssl: {} } : {}),
    user: decodeURIComponent(username),
    password: decodeURIComponent(password),
    database: decodeURIComponent(pathname.slice(1)),
    charset: 'utf8mb4',
    timezone: 'Z',
    connectTimeout: 10_000,
  };
}

/** Opens a pool of connections; nothing is sent before the first query. */
export function openDatabase(url: string, { connectionLimit = 10 } = {}): OpenDatabase {
  const pool = mysql.createPool({ ...connectionOptions(url), connectionLimit, idleTimeout: 60_000 });
  // CURRENT_TIMESTAMP must be UTC like every time we write, wherever the server stands.
  pool.pool.on('connection', (connection) => connection.query("SET time_zone = '+00:00'"));
  return { db: drizzle(pool, { schema, mode: 'default' }), pool, close: () => pool.end() };
}
