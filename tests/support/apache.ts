import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { connect, createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { findProgram } from '../../server/setup/programs.mjs';
import { run } from '../outside/support/programs.ts';
import { waitUntil } from './wait-until.ts';

const modules = ['mpm_event', 'authz_core', 'ssl', 'headers', 'proxy', 'proxy_http'];

/** The lines that the README tells people to use, with this run's ports and certificate. */
async function virtualHost(port: number, appPort: number, folder: string): Promise<string> {
  const readme = await readFile(new URL('../../README.md', import.meta.url), 'utf8');
  const found = /```apache\n([\s\S]*?)```/.exec(readme);
  if (found === null) throw new Error('The README shows no proxy.');
  const changes: [string, string][] = [
    ['*:443', `127.0.0.1:${port}`],
    ['/etc/ssl/certs/tables.example.pem', join(folder, 'certificate.pem')],
    ['/etc/ssl/private/tables.example.key', join(folder, 'key.pem')],
    ['http://127.0.0.1:4173/', `http://127.0.0.1:${appPort}/`],
  ];
  return changes.reduce((text, [from, to]) => {
    if (!text.includes(from)) throw new Error(`The README's proxy no longer says ${from}.`);
    return text.replace(from, to);
  }, found[1]);
}

/** A port that nothing listens at just now. */
export async function freePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = server.address();
  await new Promise((resolve) => server.close(resolve));
  if (address === null || typeof address === 'string') throw new Error('No port is free.');
  return address.port;
}

const listens = (port: number) =>
  new Promise<boolean>((resolve) => {
    const socket = connect(port, '127.0.0.1', () => {
      socket.destroy();
      resolve(true);
    });
    socket.on('error', () => resolve(false));
  });

/** Debian's Apache in front of the application, https with a certificate of its own. */
export async function startApache(appPort: number): Promise<{ port: number; stop(): Promise<void> }> {
  const folder = await mkdtemp(join(tmpdir(), 'stepwell-proxy-'));
  const port = await freePort();
  const subject = ['-subj', '/CN=tables.example', '-days', '2'];
  const key = ['-newkey', 'rsa:2048', '-nodes', '-keyout', 'key.pem', '-out', 'certificate.pem'];
  await run('openssl', ['req', '-x509', ...key, ...subject], folder);
  const asRoot = process.getuid?.() === 0 ? 'User www-data\nGroup www-data\n' : '';
  await writeFile(
    join(folder, 'apache.conf'),
    `ServerRoot ${folder}
DefaultRuntimeDir ${folder}
PidFile ${folder}/pid
ErrorLog ${folder}/error.log
Mutex posixsem
ServerName tables.example
Listen 127.0.0.1:${port}
${modules.map((name) => `LoadModule ${name}_module /usr/lib/apache2/modules/mod_${name}.so`).join('\n')}
${asRoot}${await virtualHost(port, appPort, folder)}`,
  );
  const server = spawn(
    findProgram('apache2') ?? 'apache2',
    ['-f', join(folder, 'apache.conf'), '-D', 'FOREGROUND'],
    {
      stdio: ['ignore', 'inherit', 'inherit'],
    },
  );
  const ended = new Promise<void>((resolve) => server.once('exit', () => resolve()));
  await waitUntil('Apache to listen', async () => (await listens(port)) || undefined);
  return {
    port,
    stop: async () => {
      server.kill('SIGTERM');
      await ended;
      await rm(folder, { recursive: true, force: true });
    },
  };
}
