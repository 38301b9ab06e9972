import { cpSync, existsSync, mkdtempSync, rmSync, statSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest';
import { stepwell } from '../support/command-line.ts';
import { holdTestServer, makeTestDatabase } from '../support/databases.ts';
import { processesWith, startScript, type StartScript } from '../support/start-script.ts';
import { waitUntil } from '../support/wait-until.ts';

let folder: string;
const started: StartScript[] = [];
const start = (env?: Record<string, string>, args?: readonly string[]) => {
  const script = startScript(folder, env, args);
  started.push(script);
  return script;
};

const newFolder = () => mkdtempSync(join(tmpdir(), 'stepwell-start-'));

/** What a first start leaves behind: its database takes longest. Copied for tests that are about something else. */
let template: string | undefined;

async function keepAsTemplate(script: StartScript): Promise<void> {
  script.child.kill('SIGINT');
  await script.ended();
  template ??= newFolder();
  cpSync(folder, template, { recursive: true });
}

async function startedBefore(): Promise<void> {
  if (template === undefined) {
    const script = start();
    await script.address();
    await keepAsTemplate(script);
  } else cpSync(template, folder, { recursive: true });
}

beforeEach(() => {
  folder = newFolder();
});
afterAll(() => {
  if (template !== undefined) rmSync(template, { recursive: true, force: true });
});
afterEach(async () => {
  for (const { child, ended } of started.splice(0)) {
    child.kill('SIGTERM');
    await ended();
  }
  // Whatever a failed test has left: all of it names this test's own folder.
  for (const pid of processesWith(folder)) process.kill(pid, 'SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

const health = async (address: string) => (await fetch(new URL('/api/v1/health', address))).status;

describe('npm start', () => {
  it('ends by printing one address, where the application answers', async () => {
    const script = start();
    const address = await script.address();
    expect(script.output().trimEnd().split('\n').at(-1)).toBe(`Stepwell is open at ${address}`);
    expect(script.output().match(/https?:\/\//g)).toHaveLength(1);
    expect(await health(address)).toBe(200);
    const page = await fetch(address);
    expect(page.headers.get('content-type')).toContain('text/html');
    expect(statSync(join(folder, 'auth-secret')).mode & 0o777).toBe(0o600);
    await keepAsTemplate(script);
  });

  it('has its audit trail verified by the command line, while it runs and after', async () => {
    const verify = () => stepwell(['audit-verify'], { env: { DATABASE_URL: '', STEPWELL_DATA: folder } });
    await startedBefore();
    const script = start();
    await script.address();
    const during = await verify();
    expect(during).toMatchObject({ status: 0, stderr: '' });
    expect(during.stdout).toMatch(/^ninth-fathom: whole, \d+ events\n$/);
    script.child.kill('SIGINT');
    expect(await script.ended()).toBe(0);
    expect(await verify()).toEqual(during);
    expect(processesWith(folder)).toEqual([]);
  }, 120_000);

  it.each(['SIGINT', 'SIGTERM', 'SIGHUP'] as const)('leaves no process behind after %s', async (signal) => {
    await startedBefore();
    const script = start();
    await script.address();
    expect(processesWith(folder).length).toBeGreaterThanOrEqual(3);
    script.child.kill(signal);
    expect(await script.ended()).toBe(0);
    expect(processesWith(folder)).toEqual([]);
  });

  it('leaves no process behind when it is stopped in the middle of the set-up', async () => {
    const script = start();
    await waitUntil('the database on its way', () => processesWith(join(folder, 'mariadb')).length > 0);
    script.child.kill('SIGINT');
    await script.ended();
    expect(processesWith(folder)).toEqual([]);
    expect(await health(await start().address())).toBe(200);
  });

  it('works again after kill -9 of the script, and of everything', async () => {
    await startedBefore();
    const first = start();
    await first.address();
    first.child.kill('SIGKILL');
    await first.ended();
    const second = start();
    expect(await health(await second.address())).toBe(200);
    await waitUntil('the old application gone', () => processesWith(join(folder)).length === 3);

    for (const pid of processesWith(folder)) process.kill(pid, 'SIGKILL');
    const third = start();
    expect(await health(await third.address())).toBe(200);
    third.child.kill('SIGINT');
    expect(await third.ended()).toBe(0);
    expect(processesWith(folder)).toEqual([]);
  });

  it('runs twice side by side on one database; each end leaves the other in peace', async () => {
    // A first start in both: they meet on the way.
    const [one, other] = [start(), start()];
    const [first, second] = await Promise.all([one.address(), other.address()]);
    expect(first).not.toBe(second);
    one.child.kill('SIGINT');
    expect(await one.ended()).toBe(0);
    expect(await health(second)).toBe(200);
    other.child.kill('SIGINT');
    expect(await other.ended()).toBe(0);
    expect(processesWith(folder)).toEqual([]);
  });

  it('takes a free port where its own is in use, and only where nobody asked for that one', async () => {
    await startedBefore();
    const busy = createServer().listen(4173, '127.0.0.1');
    await new Promise((resolve) => busy.once('listening', resolve).once('error', resolve));
    try {
      const moved = start({ PORT: '' });
      const address = await moved.address();
      expect(new URL(address).port).not.toBe('4173');
      expect(await health(address)).toBe(200);
      const stubborn = start({ PORT: '4173' });
      expect(await stubborn.ended()).toBe(1);
      expect(stubborn.errors()).toContain('EADDRINUSE');
      expect(stubborn.output()).toBe('');
    } finally {
      busy.close();
    }
  });

  it('lists what is missing where it is to be reached from outside', async () => {
    const script = start({ HOST: '0.0.0.0' });
    expect(await script.ended()).toBe(1);
    expect(script.errors()).toMatch(/APP_ORIGIN.*\n.*SMTP_URL.*\n.*DATABASE_URL/);
    expect(processesWith(folder)).toEqual([]);
  });
});

describe('npm start on a database of one’s own', () => {
  it('starts no server, refuses a schema that nobody has migrated, and runs after npm run migrate', async () => {
    const server = await holdTestServer();
    const database = await makeTestDatabase(server, { migrated: false });
    const port = String(await freePort());
    const env = {
      DATABASE_URL: database.url,
      APP_ORIGIN: `http://127.0.0.1:${port}`,
      PORT: port,
      SMTP_URL: 'smtp://127.0.0.1:9',
      AUTH_SECRET: 'a secret of more than thirty-two characters',
    };
    const early = start(env);
    expect(await early.ended()).toBe(1);
    expect(early.errors()).toContain('npm run migrate');

    const migration = start(env, ['migrate.mjs']);
    expect(await migration.ended()).toBe(0);
    expect(migration.output()).toMatch(/^Migrated: /);

    const script = start(env);
    const address = await script.address();
    expect(address).toBe(env.APP_ORIGIN);
    expect(await health(address)).toBe(200);
    expect(existsSync(join(folder, 'mariadb'))).toBe(false);
    script.child.kill('SIGTERM');
    expect(await script.ended()).toBe(0);
    await database.drop();
    await server.release();
  });
});

describe('npm run dev', () => {
  it('serves the sources as they are, under the same address as the API, and ends as cleanly', async () => {
    await startedBefore();
    const script = start({}, ['start.mjs', '--dev']);
    const address = await script.address();
    expect(await health(address)).toBe(200);
    const page = await (await fetch(address)).text();
    expect(page).toContain('src="/@vite/client"');
    expect((await fetch(new URL('/src/main.tsx', address))).headers.get('content-type')).toBe(
      'text/javascript',
    );
    script.child.kill('SIGINT');
    expect(await script.ended()).toBe(0);
    expect(processesWith(folder)).toEqual([]);
  });
});

/** A port that was free a moment ago. */
async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await new Promise((resolve) => server.once('listening', resolve));
  const { port } = server.address() as AddressInfo;
  await new Promise((resolve) => server.close(resolve));
  return port;
}
