import { createHash } from 'node:crypto';
import { connect, createServer } from 'node:net';

/**
 * One holder at a time among all processes of this machine, for one name. The lock is an abstract Unix socket
 * (Linux): the kernel lets go of it with the process, so a holder ended by `kill -9` leaves nothing stale.
 */
export async function withLock(name, work, { onWait } = {}) {
  const address = `\0stepwell-${createHash('sha256').update(name).digest('hex').slice(0, 40)}`;
  let release;
  for (let told = false; !(release = await take(address)); told = true) {
    if (!told) onWait?.();
    await holderGone(address);
  }
  try {
    return await work();
  } finally {
    await release();
  }
}

function take(address) {
  const waiting = new Set();
  const server = createServer((socket) => {
    waiting.add(socket);
    socket.on('error', () => {}).on('close', () => waiting.delete(socket));
  });
  const release = () =>
    new Promise((resolve) => {
      server.close(resolve);
      for (const socket of waiting) socket.destroy();
    });
  return new Promise((resolve, reject) => {
    server.once('error', (error) => (error.code === 'EADDRINUSE' ? resolve(undefined) : reject(error)));
    server.listen(address, () => resolve(release));
  });
}

const holderGone = (address) =>
  new Promise((resolve) => {
    connect(address)
      .on('error', () => {})
      .on('close', resolve);
  });
