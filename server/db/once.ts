import type { Database } from './client.ts';

/** Makes a query once for each database: putting a statement's text together costs as much as running it. */
export function once<Query extends object>(make: (db: Database) => Query): (db: Database) => Query {
  const made = new WeakMap<Database, Query>();
  return (db) => {
    const query = made.get(db) ?? make(db);
    made.set(db, query);
    return query;
  };
}
