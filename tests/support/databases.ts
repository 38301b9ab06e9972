import { randomBytes } from 'node:crypto';
import { join } from 'node:path';
import mysql from 'mysql2/promise';
import { connectionOptions } from '../../server/db/client.ts';
import { createDatabase, migrate } from '../../server/db/migrate.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { holdDatabase } from '../../server/setup/database.mjs';

export const testPrefix = 'stepwell_test_';

export interface TestServer {
  /** URL of the database `name` on the server. */
  urlOf(name: string): string;
  release(): Promise<void>;
}

/** The server the tests use: the one of DATABASE_URL, or a private one that is the tests' own. */
export async function holdTestServer(): Promise<TestServer> {
  const given = process.env.DATABASE_URL;
  if (!given) return holdDatabase(join(projectFolder, '.data', 'tests', 'mariadb'));
  return {
    urlOf: (name) => Object.assign(new URL(given), { pathname: `/${name}` }).href,
    release: () => Promise.resolve(),
  };
}

/** Tests empty and drop databases: any other name is somebody's work. */
export function requireTestDatabase(url: string): void {
  const { database } = connectionOptions(url);
  if (!database.startsWith(testPrefix)) {
    throw new Error(
      `Tests do not touch the database "${database}"; allowed: a name that begins with ${testPrefix}`,
    );
  }
}

export interface TestDatabase {
  readonly url: string;
  drop(): Promise<void>;
}

/** A database of its own for one test, empty or in the journal's state. */
export async function makeTestDatabase(server: TestServer, { migrated = true } = {}): Promise<TestDatabase> {
  const url = server.urlOf(`${testPrefix}${randomBytes(6).toString('hex')}`);
  requireTestDatabase(url);
  await createDatabase(url);
  if (migrated) await migrate(url);
  return {
    url,
    drop: async () => {
      const { database, ...options } = connectionOptions(url);
      const connection = await mysql.createConnection(options);
      await connection.query(`DROP DATABASE IF EXISTS ${mysql.escapeId(database)}`);
      await connection.end();
    },
  };
}
