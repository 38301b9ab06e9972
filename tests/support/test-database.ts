import type { TestProject } from 'vitest/node';
import { holdTestServer, makeTestDatabase } from './databases.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    /** URL of a migrated database, emptied of nothing between test files: make your own rows. */
    databaseUrl: string;
  }
}

/** Vitest's global set-up of the API tests: one migrated database for them all, gone afterwards. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = await holdTestServer();
  const database = await makeTestDatabase(server);
  project.provide('databaseUrl', database.url);
  return async () => {
    await database.drop();
    await server.release();
  };
}
