import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, expect, inject, it } from 'vitest';
import { openDatabase, type OpenDatabase } from '../../server/db/client.ts';
import { errno, errnoOf } from '../../server/db/errors.ts';
import { withTransaction } from '../../server/db/transaction.ts';
import { requireTestDatabase } from '../support/databases.ts';

let database: OpenDatabase;

beforeAll(async () => {
  requireTestDatabase(inject('databaseUrl'));
  database = openDatabase(inject('databaseUrl'));
  await database.pool.query('CREATE TABLE counters (id INT PRIMARY KEY, count INT NOT NULL)');
});
afterAll(async () => {
  await database.pool.query('DROP TABLE counters');
  await database.close();
});
beforeEach(() => database.pool.query('REPLACE INTO counters VALUES (1, 0), (2, 0)'));

const counts = async () => {
  const [rows] = await database.pool.query('SELECT id, count FROM counters ORDER BY id');
  return (rows as { count: number }[]).map(({ count }) => count);
};

it('runs the whole command again after a deadlock', async () => {
  let attempts = 0;
  const bothHold = barrier(2);
  const command = (ids: [number, number]) =>
    withTransaction(database.db, async (transaction) => {
      attempts++;
      for (const [index, id] of ids.entries()) {
        await transaction.execute(sql`UPDATE counters SET count = count + 1 WHERE id = ${id}`);
        // Each holds one row before either asks for the other's: a certain deadlock the first time.
        if (index === 0) await bothHold();
      }
    });
  await Promise.all([command([1, 2]), command([2, 1])]);

  expect(attempts).toBe(3);
  expect(await counts()).toEqual([2, 2]);
});

it('gives up after five tries and says what it was', async () => {
  let attempts = 0;
  const other = await database.pool.getConnection();
  await other.beginTransaction();
  await other.query('SELECT id FROM counters WHERE id = 1 FOR UPDATE');
  const command = withTransaction(database.db, async (transaction) => {
    attempts++;
    await transaction.execute(sql`SELECT id FROM counters WHERE id = 1 FOR UPDATE NOWAIT`);
  });
  await expect(command).rejects.toSatisfy((error) => errnoOf(error) === errno.lockWaitTimeout);
  expect(attempts).toBe(5);
  await other.rollback();
  other.release();
});

it('does not run again after any other error, and leaves nothing behind', async () => {
  let attempts = 0;
  const command = withTransaction(database.db, async (transaction) => {
    attempts++;
    await transaction.execute(sql`INSERT INTO counters VALUES (3, 0)`);
    await transaction.execute(sql`INSERT INTO counters VALUES (1, 0)`);
  });
  await expect(command).rejects.toSatisfy((error) => errnoOf(error) === errno.duplicate);
  expect(attempts).toBe(1);
  expect(await counts()).toEqual([0, 0]);
});

/** Lets nobody on before `count` have come; whoever comes later passes. */
function barrier(count: number): () => Promise<void> {
  let open: () => void;
  const opened = new Promise<void>((resolve) => (open = resolve));
  return () => {
    if (--count <= 0) open();
    return opened;
  };
}
