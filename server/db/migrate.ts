import mysql, { type Connection, type ResultSetHeader, type RowDataPacket } from 'mysql2/promise';
import { connectionOptions } from './client.ts';
import { errnoOf } from './errors.ts';
import { readJournal, type Migration } from './journal.ts';
import { compareSchema, readApplied, refuseForeign, refuseInexact, SchemaFault } from './schema-state.ts';

export const collation = 'utf8mb4_uca1400_ai_ci';

/** How long a start waits for another one's migrations, in seconds. */
const patience = 600;

/**
 * Brings the database to the journal's state and answers which migrations ran.
 *
 * MariaDB cannot roll a schema change back, so each statement is noted before and after it runs: a run that was
 * ended in the middle is taken up where it stopped. Runs side by side on one server wait for each other.
 *
 * @throws {SchemaFault} where the database is ahead of the journal, or an applied migration has changed since
 */
export async function migrate(url: string, journal: readonly Migration[] = readJournal()): Promise<string[]> {
  const { database, ...options } = connectionOptions(url);
  const [guard, worker] = await Promise.all([
    mysql.createConnection({ ...options, database }),
    mysql.createConnection({ ...options, database, multipleStatements: false }),
  ]);
  try {
    await refuseCollation(worker, database);
    await lock(guard);
    await worker.query(
      'CREATE TABLE IF NOT EXISTS schema_steps (migration VARCHAR(190) NOT NULL, step INT UNSIGNED NOT NULL, ' +
        'hash CHAR(64) NOT NULL, done_at DATETIME(3) NULL, PRIMARY KEY (migration, step))',
    );
    const state = compareSchema(journal, await readApplied(worker, database));
    refuseForeign(state);
    for (const migration of journal) {
      if (state.behind.includes(migration.tag)) await apply(worker, migration);
    }
    return [...state.behind];
  } finally {
    await Promise.allSettled([worker.end(), guard.end()]);
  }
}

/** @throws {SchemaFault} unless the database is exactly in the journal's state */
export async function requireExactSchema(
  url: string,
  journal: readonly Migration[] = readJournal(),
): Promise<void> {
  const options = connectionOptions(url);
  const connection = await mysql.createConnection(options);
  try {
    refuseInexact(compareSchema(journal, await readApplied(connection, options.database)));
  } finally {
    await connection.end();
  }
}

/** Creates the URL's database where it is missing, with the collation that tells all characters apart. */
export async function createDatabase(url: string): Promise<void> {
  const { database, ...options } = connectionOptions(url);
  const connection = await mysql.createConnection(options);
  try {
    await connection.query(
      `CREATE DATABASE IF NOT EXISTS ${mysql.escapeId(database)} CHARACTER SET utf8mb4 COLLATE ${collation}`,
    );
  } finally {
    await connection.end();
  }
}

/** The generated tables take the database's collation; others would hold two different emoji to be the same. */
async function refuseCollation(connection: Connection, database: string): Promise<void> {
  const [[row]] = await connection.query<RowDataPacket[]>('SELECT @@collation_database AS found');
  if (row.found === collation) return;
  throw new SchemaFault(
    `The database ${database} has the collation ${String(row.found)}. Run: ` +
      `ALTER DATABASE ${mysql.escapeId(database)} CHARACTER SET utf8mb4 COLLATE ${collation}`,
  );
}

/** A row lock held for as long as the connection lives. Not GET_LOCK, which a Galera cluster does not have. */
async function lock(guard: Connection): Promise<void> {
  await guard.query(`SET SESSION innodb_lock_wait_timeout = ${patience}, lock_wait_timeout = ${patience}`);
  await guard.query('CREATE TABLE IF NOT EXISTS schema_lock (id TINYINT PRIMARY KEY)');
  await guard.query('INSERT IGNORE INTO schema_lock VALUES (1)');
  await guard.beginTransaction();
  await guard.query('SELECT id FROM schema_lock WHERE id = 1 FOR UPDATE');
}

async function apply(worker: Connection, { tag, hash, statements }: Migration): Promise<void> {
  for (const [step, statement] of statements.entries()) {
    const [noted] = await worker.query<ResultSetHeader>(
      'INSERT IGNORE INTO schema_steps (migration, step, hash) VALUES (?, ?, ?)',
      [tag, step, hash],
    );
    const begunBefore = noted.affectedRows === 0;
    if (begunBefore && (await isDone(worker, tag, step))) continue;
    // A change of rows and its note are one transaction; a change of the schema commits by itself.
    await worker.beginTransaction();
    try {
      await worker.query(statement);
    } catch (error) {
      if (!begunBefore || !alreadyThere.has(errnoOf(error) ?? 0)) {
        await worker.rollback();
        throw new SchemaFault(`Migration ${tag}, statement ${step + 1}: ${String(error)}`, { cause: error });
      }
    }
    await worker.query(
      'UPDATE schema_steps SET done_at = UTC_TIMESTAMP(3) WHERE migration = ? AND step = ?',
      [tag, step],
    );
    await worker.commit();
  }
}

async function isDone(worker: Connection, tag: string, step: number): Promise<boolean> {
  const [rows] = await worker.query<RowDataPacket[]>(
    'SELECT 1 FROM schema_steps WHERE migration = ? AND step = ? AND done_at IS NOT NULL',
    [tag, step],
  );
  return rows.length > 0;
}

/**
 * What MariaDB says to a schema change that was made already: table exists, unknown table, unknown column (renamed),
 * column exists, key exists, nothing to drop, foreign key exists (1005 with "errno: 121", or 1826), check exists.
 */
const alreadyThere = new Set([1005, 1050, 1051, 1054, 1060, 1061, 1091, 1826, 1146]);
