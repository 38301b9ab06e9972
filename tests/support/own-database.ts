import { readConfig } from '../../server/config.ts';
import { openDatabase } from '../../server/db/client.ts';
import type { AppDeps } from '../../server/app.ts';
import { holdTestServer, makeTestDatabase } from './databases.ts';
import { makeTestApp, testSecret, type TestApp } from './test-app.ts';

export interface OwnTestApp extends TestApp {
  readonly url: string;
}

/** The application on a database that no other test writes to: for what looks at all rows, or breaks a table. */
export async function makeOwnTestApp(
  changes: Partial<AppDeps> = {},
  environment: Readonly<Record<string, string>> = {},
): Promise<OwnTestApp> {
  const server = await holdTestServer();
  const { url, drop } = await makeTestDatabase(server);
  const config = readConfig({
    PRIVATE_DATABASE_URL: url,
    AUTH_SECRET: testSecret,
    TRUSTED_PROXIES: 'loopback',
    ...environment,
  });
  const test = makeTestApp({ config, database: openDatabase(url), ...changes });
  return {
    ...test,
    url,
    close: async () => {
      await test.close();
      await drop();
      await server.release();
    },
  };
}
