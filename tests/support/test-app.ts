import type { Express } from 'express';
import { pino } from 'pino';
import { inject } from 'vitest';
import { buildApp, type AppDeps } from '../../server/app.ts';
import { readConfig } from '../../server/config.ts';
import { openDatabase, type OpenDatabase } from '../../server/db/client.ts';
import { createJobPool, type JobPool } from '../../server/jobs/pool.ts';
import type { jobs } from '../../server/jobs/registry.ts';
import { requireTestDatabase } from './databases.ts';

/** The one origin that the test application answers to; send it as Origin, and its host as Host. */
export const origin = 'http://127.0.0.1:4173';
export const host = new URL(origin).host;

export const testSecret = 'for the tests only, and known to everybody';

export interface TestApp {
  readonly app: Express;
  readonly deps: AppDeps;
  readonly database: OpenDatabase;
  readonly jobs: JobPool<typeof jobs>;
  close(): Promise<void>;
}

/** The whole application on the test database, listening nowhere: hand `app` to supertest. */
export function makeTestApp(changes: Partial<AppDeps> = {}): TestApp {
  const url = inject('databaseUrl');
  requireTestDatabase(url);
  const database = changes.database ?? openDatabase(url);
  const pool = changes.jobs ?? createJobPool();
  const deps: AppDeps = {
    config: readConfig({
      PRIVATE_DATABASE_URL: url,
      AUTH_SECRET: testSecret,
      // So that each person of a test can come from an address of their own, as X-Forwarded-For says.
      TRUSTED_PROXIES: 'loopback',
    }),
    origins: [origin],
    logger: pino({ level: 'silent' }),
    client: (_request, _response, next) => next(),
    contentPolicy: true,
    ...changes,
    database,
    jobs: pool,
  };
  return {
    app: buildApp(deps),
    deps,
    database,
    jobs: pool,
    close: async () => {
      await pool.close();
      await database.close();
    },
  };
}
