import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Config } from './config.ts';

/** Starts listening and answers the port; takes any free one where the wanted one is in use and may move. */
export async function listen(server: Server, { host, port, portMayMove }: Config): Promise<number> {
  try {
    return await tryPort(server, host, port);
  } catch (error) {
    const inUse = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
    if (!inUse || !portMayMove) throw error;
    return tryPort(server, host, 0);
  }
}

const tryPort = (server: Server, host: string, port: number) =>
  new Promise<number>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      resolve((server.address() as AddressInfo).port);
    });
  });

/** The origins the server answers to: on this machine alone its own addresses, elsewhere just the configured one. */
export function originsOf({ host, appOrigin, local }: Config, port: number): readonly [string, ...string[]] {
  const own = `http://${host.includes(':') ? `[${host.replace(/[[\]]/g, '')}]` : host}:${port}`;
  if (!local) return [appOrigin ?? own];
  const names = [own, `http://127.0.0.1:${port}`, `http://localhost:${port}`];
  const [first = own, ...others] = new Set(appOrigin ? [appOrigin, ...names] : names);
  return [first, ...others];
}
