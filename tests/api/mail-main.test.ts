import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { projectFolder } from '../../server/project-folder.ts';
import { startApp, type AppProcess } from '../../server/setup/app-process.mjs';
import { ensureBuilt } from '../../server/setup/build.mjs';
import { withLock } from '../../server/setup/lock.mjs';
import {
  holdTestServer,
  makeTestDatabase,
  type TestDatabase,
  type TestServer,
} from '../support/databases.ts';
import { testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

let server: TestServer;
let database: TestDatabase;
let app: AppProcess;

beforeAll(async () => {
  await withLock(`set-up ${projectFolder}`, () => ensureBuilt('client'));
  server = await holdTestServer();
  database = await makeTestDatabase(server, { migrated: false });
  app = startApp(['--import', 'tsx', join(projectFolder, 'server', 'main.ts')], {
    ...{ HOST: '127.0.0.1', PORT: '0', DATABASE_URL: '', SMTP_URL: '', APP_ORIGIN: '', LOG_LEVEL: 'warn' },
    ...{ PRIVATE_DATABASE_URL: database.url, AUTH_SECRET: testSecret },
  });
});
afterAll(async () => {
  await app.stop();
  await database.drop();
  await server.release();
});

describe('the application on its own machine', () => {
  it('mails links to the address it really listens at, and ends in order', async () => {
    const address = await app.ready;
    const send = (path: string, body?: object) =>
      fetch(`${address}/api/v1${path}`, {
        method: body ? 'POST' : 'GET',
        headers: { Origin: address, 'Content-Type': 'application/json' },
        body: body && JSON.stringify(body),
      });
    const email = 'ines@ninthfathom.example';
    const signedUp = await send('/account/sign-up', { name: 'Ines', email, password: 'nine fathoms deep' });
    expect(signedUp.status).toBe(202);
    const mail = await waitUntil('the mail', async () => {
      const { items } = (await (await send('/mailbox')).json()) as { items: { id: number }[] };
      if (items.length === 0) return undefined;
      return (await (await send(`/mailbox/${items[0].id}`)).json()) as { text: string };
    });
    const link = /http:\/\/\S+/.exec(mail.text)?.[0] ?? '';
    expect(new URL(link).origin).toBe(address);
    const token = new URL(link).hash.slice(1);
    expect(await (await send('/account/verify-address', { token })).json()).toEqual({ email });
    const before = performance.now();
    await app.stop();
    expect(await app.ended).toBe(0);
    expect(performance.now() - before).toBeLessThan(5000);
  });
});
