import { spawn, type ChildProcess } from 'node:child_process';
import { setTimeout as delay } from 'node:timers/promises';
import { join } from 'node:path';
import { projectFolder } from '../../server/project-folder.ts';
import type { TestPerson } from './people.ts';
import { testSecret } from './test-app.ts';

export interface KillableApp {
  /** Starts it, or starts it again; its port is another one each time. */
  start(): Promise<void>;
  /** As `kill -9`: nothing is finished, nothing is said. */
  kill(): Promise<void>;
  /**
   * Sends the same request, under the same key, until it is answered: as a client does that loses nothing. What went
   * down in the middle of a request is 500 or 503.
   */
  insist(
    person: TestPerson,
    path: string,
    body: object,
    headers: Readonly<Record<string, string>>,
  ): Promise<{ readonly status: number; readonly body: unknown }>;
}

/** The built application on a database, as `npm start` runs it; build it first. */
export function killableApp(databaseUrl: string): KillableApp {
  let child: ChildProcess | undefined;
  let address = '';

  return {
    async start() {
      const started = spawn(process.execPath, [join(projectFolder, 'dist', 'server', 'main.js')], {
        cwd: projectFolder,
        env: {
          ...process.env,
          DATABASE_URL: '',
          PRIVATE_DATABASE_URL: databaseUrl,
          AUTH_SECRET: testSecret,
          HOST: '127.0.0.1',
          PORT: '0',
          LOG_LEVEL: 'silent',
          DEMO_FILE: '',
        },
        stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
      });
      child = started;
      const told = new Promise<{ address: string }>((resolve, reject) => {
        started.once('message', (message) => resolve(message as { address: string }));
        started.once('exit', () => reject(new Error('The application did not start.')));
      });
      ({ address } = await told);
    },

    async kill() {
      const killed = child;
      if (!killed || killed.exitCode !== null || killed.signalCode !== null) return;
      const gone = new Promise((resolve) => killed.once('exit', resolve));
      killed.kill('SIGKILL');
      await gone;
    },

    async insist(person, path, body, headers) {
      for (;;) {
        try {
          const response = await fetch(`${address}/api/v1${path}`, {
            method: 'POST',
            body: JSON.stringify(body),
            headers: {
              'Content-Type': 'application/json',
              Origin: address,
              Cookie: person.cookie,
              ...headers,
            },
          });
          const text = await response.text();
          if (response.status < 500) return { status: response.status, body: JSON.parse(text) };
        } catch {
          // Nobody answered: it is down.
        }
        await delay(50);
      }
    },
  };
}
