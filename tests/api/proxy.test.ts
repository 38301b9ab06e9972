import { request } from 'node:https';
import type { IncomingHttpHeaders } from 'node:http';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '../../server/db/client.ts';
import { mailOutbox } from '../../server/db/schema/index.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { startApp } from '../../server/setup/app-process.mjs';
import { freePort, startApache } from '../support/apache.ts';
import {
  holdTestServer,
  makeTestDatabase,
  type TestDatabase,
  type TestServer,
} from '../support/databases.ts';

const origin = 'https://tables.example';

interface Answer {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  readonly text: string;
}

describe('behind the proxy of the README', () => {
  let server: TestServer;
  let database: TestDatabase;
  let app: ReturnType<typeof startApp>;
  let apache: Awaited<ReturnType<typeof startApache>>;

  beforeAll(async () => {
    server = await holdTestServer();
    database = await makeTestDatabase(server);
    const appPort = await freePort();
    app = startApp([join(projectFolder, 'dist', 'server', 'main.js')], {
      HOST: '127.0.0.1',
      PORT: String(appPort),
      APP_ORIGIN: origin,
      TRUSTED_PROXIES: 'loopback',
      AUTH_SECRET: 'for the tests only, and known to everybody',
      // Nothing listens there: letters wait in the outbox.
      SMTP_URL: 'smtp://127.0.0.1:9',
      DATABASE_URL: database.url,
      PRIVATE_DATABASE_URL: '',
      LOG_LEVEL: 'silent',
    });
    expect(await app.ready).toBe(origin);
    apache = await startApache(appPort);
  });

  afterAll(async () => {
    await apache.stop();
    await app.stop();
    await database.drop();
    await server.release();
  });

  const ask = (path: string, { method = 'GET', headers = {}, body = '' } = {}) =>
    new Promise<Answer>((resolve, reject) => {
      const sent = request(
        {
          host: '127.0.0.1',
          port: apache.port,
          servername: 'tables.example',
          rejectUnauthorized: false,
          path,
          method,
          headers: { Host: 'tables.example', ...headers },
        },
        (response) => {
          let text = '';
          response.setEncoding('utf8').on('data', (part: string) => (text += part));
          response.on('end', () =>
            resolve({ status: response.statusCode ?? 0, headers: response.headers, text }),
          );
        },
      );
      sent.on('error', reject).end(body);
    });

  const json = { 'Content-Type': 'application/json' };

  it('serves the client under its own name only', async () => {
    const page = await ask('/');
    expect(page.status).toBe(200);
    expect(page.text).toContain('<div id="root"');
    expect(page.headers['content-security-policy']).toContain("default-src 'self'");
    expect((await ask('/', { headers: { Host: 'elsewhere.example' } })).status).toBe(421);
  });

  it('keeps its cookies to https', async () => {
    const { status, headers } = await ask('/auth/csrf');
    expect(status).toBe(200);
    expect(headers['set-cookie']?.length).toBeGreaterThan(0);
    for (const cookie of headers['set-cookie'] ?? []) {
      expect(cookie).toMatch(/^__(Host|Secure)-/);
      expect(cookie).toContain('Secure');
    }
  });

  it('takes writes from its own pages, and mails links to its own name', async () => {
    const person = { name: 'Aldo Brine', email: 'aldo@ninthfathom.example', password: 'nine fathoms deep' };
    const body = JSON.stringify(person);
    const path = '/api/v1/account/sign-up';
    const foreign = { ...json, Origin: 'http://tables.example' };
    expect((await ask(path, { method: 'POST', headers: foreign, body })).status).toBe(403);
    expect((await ask(path, { method: 'POST', headers: { ...json, Origin: origin }, body })).status).toBe(
      202,
    );
    const { db, close } = openDatabase(database.url);
    const letters = await db.select({ text: mailOutbox.textBody }).from(mailOutbox);
    await close();
    expect(letters).toHaveLength(1);
    expect(letters[0].text).toContain(`${origin}/verify#`);
  });
});
