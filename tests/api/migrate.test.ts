import mysql, { type Connection, type RowDataPacket } from 'mysql2/promise';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { connectionOptions } from '../../server/db/client.ts';
import { readJournal, type Migration } from '../../server/db/journal.ts';
import { migrate, requireExactSchema } from '../../server/db/migrate.ts';
import {
  holdTestServer,
  makeTestDatabase,
  type TestDatabase,
  type TestServer,
} from '../support/databases.ts';

const journal = readJournal();

let server: TestServer;
let database: TestDatabase;
let connection: Connection;

beforeAll(async () => {
  server = await holdTestServer();
});
afterAll(() => server.release());
beforeEach(async () => {
  database = await makeTestDatabase(server, { migrated: false });
  connection = await mysql.createConnection(connectionOptions(database.url));
});
afterEach(async () => {
  await connection.end();
  await database.drop();
});

const migration = (tag: string, ...statements: string[]): Migration => ({
  tag,
  when: 0,
  hash: tag.padEnd(64, '0'),
  statements,
});

/** Every table, column, key and constraint, as the server itself would write them down. */
async function describeTables(): Promise<string[]> {
  const [tables] = await connection.query<RowDataPacket[]>(
    "SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name NOT LIKE 'schema\\_%' ORDER BY 1",
  );
  const texts: string[] = [];
  for (const { name } of tables) {
    const [[row]] = await connection.query<RowDataPacket[]>(
      `SHOW CREATE TABLE ${mysql.escapeId(String(name))}`,
    );
    texts.push(String(row['Create Table']));
  }
  return texts;
}

describe('the journal', () => {
  it('ascends, so that no migration of a merged branch hides behind a later one', () => {
    const times = journal.map(({ when }) => when);
    expect(times).toEqual([...times].sort((a, b) => a - b));
    expect(new Set(journal.map(({ tag }) => tag)).size).toBe(journal.length);
  });

  it('has one statement a step, as MariaDB cannot roll a change of the schema back', () => {
    for (const { tag, statements } of journal) {
      for (const statement of statements) {
        const withoutText = statement.replace(/'(?:[^']|'')*'/g, '').replace(/;\s*$/, '');
        expect(withoutText, tag).not.toContain(';');
      }
    }
  });
});

describe('migrate', () => {
  it('brings an empty database to the exact state, once', async () => {
    await expect(requireExactSchema(database.url)).rejects.toThrow(/behind.*npm run migrate/);
    expect(await migrate(database.url)).toEqual(journal.map(({ tag }) => tag));
    await requireExactSchema(database.url);
    expect(await migrate(database.url)).toEqual([]);
  });

  it('runs each statement once when three start side by side', async () => {
    const runs = await Promise.all([migrate(database.url), migrate(database.url), migrate(database.url)]);
    expect(runs.map((done) => done.length).sort((a, b) => a - b)).toEqual([0, 0, journal.length]);
    await requireExactSchema(database.url);
  });

  it('is taken up where it was cut off, at whichever statement that was', async () => {
    await migrate(database.url);
    const wanted = await describeTables();
    const steps = journal.flatMap(({ tag, hash, statements }) =>
      statements.map((statement, step) => ({ tag, hash, statement, step })),
    );
    await connection.query('SET foreign_key_checks = 0');
    const [tables] = await connection.query<RowDataPacket[]>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
    );
    for (const { name } of tables) await connection.query(`DROP TABLE ${mysql.escapeId(String(name))}`);

    // Each statement was made, and the process ended before it could note that.
    await migrate(database.url, []);
    for (const { tag, hash, statement, step } of steps) {
      await connection.query('INSERT INTO schema_steps (migration, step, hash) VALUES (?, ?, ?)', [
        tag,
        step,
        hash,
      ]);
      await connection.query(statement);
      const sofar = journal.slice(0, journal.findIndex((entry) => entry.tag === tag) + 1);
      const upToHere = sofar.map((entry) =>
        entry.tag === tag ? { ...entry, statements: entry.statements.slice(0, step + 1) } : entry,
      );
      await migrate(database.url, upToHere);
    }
    await requireExactSchema(database.url);
    expect(await describeTables()).toEqual(wanted);
  });

  it('stops at a statement that fails and goes on from there when it is mended', async () => {
    const good = migration('one', 'CREATE TABLE a (x INT)');
    await expect(
      migrate(database.url, [good, migration('two', 'CREATE TABLE b (x INT)', 'CREATE NONSENSE')]),
    ).rejects.toThrow(/Migration two, statement 2/);
    expect(
      await migrate(database.url, [
        good,
        migration('two', 'CREATE TABLE b (x INT)', 'CREATE TABLE c (x INT)'),
      ]),
    ).toEqual(['two']);
  });

  it('does not take an error for done work unless the statement was under way before', async () => {
    await connection.query('CREATE TABLE a (x INT)');
    await expect(migrate(database.url, [migration('one', 'CREATE TABLE a (y INT)')])).rejects.toThrow(
      /exists/,
    );
  });

  it('changes rows and notes it in one transaction', async () => {
    const rows = migration('one', 'CREATE TABLE a (x INT PRIMARY KEY)', 'INSERT INTO a VALUES (1), (2)');
    await migrate(database.url, [rows]);
    await connection.query('UPDATE schema_steps SET done_at = NULL WHERE step = 1');
    await expect(migrate(database.url, [rows])).rejects.toThrow(/Duplicate/);
  });
});

describe('a schema that is not the journal’s exact state', () => {
  it('is refused when behind', async () => {
    await migrate(database.url);
    const next = [...journal, migration('9999_next', 'CREATE TABLE next (x INT)')];
    await expect(requireExactSchema(database.url, next)).rejects.toThrow(/behind.*9999_next/);
  });

  it('is refused when ahead, by start and by migrate', async () => {
    await migrate(database.url, [...journal, migration('9999_next', 'CREATE TABLE next (x INT)')]);
    await expect(requireExactSchema(database.url)).rejects.toThrow(/ahead.*9999_next.*Update the program/);
    await expect(migrate(database.url)).rejects.toThrow(/ahead.*9999_next/);
  });

  it('is refused when an applied migration has changed since', async () => {
    await migrate(database.url, [migration('one', 'CREATE TABLE a (x INT)')]);
    const changed = [{ ...migration('one', 'CREATE TABLE a (x INT)'), hash: 'f'.repeat(64) }];
    await expect(requireExactSchema(database.url, changed)).rejects.toThrow(/another version of one/);
  });

  it('is refused when its collation would mix up characters, with the line that mends it', async () => {
    await connection.query('ALTER DATABASE COLLATE utf8mb4_general_ci');
    await expect(migrate(database.url)).rejects.toThrow(/ALTER DATABASE .* COLLATE utf8mb4_uca1400_ai_ci/);
  });
});
