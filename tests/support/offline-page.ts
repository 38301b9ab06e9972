import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { fileURLToPath } from 'node:url';
import type { Page } from '@playwright/test';
import { build } from 'vite';

export interface OfflinePage {
  /** Opens the blank page with the script in it. */
  readonly open: (page: Page) => Promise<void>;
  readonly close: () => void;
}

/**
 * Builds the player with the offline page's script, worklet and all, as the product's own build does, and serves them from
 * this machine's loopback: what a page must have for an audio worklet, whose script a test's own route does not reach.
 */
export async function serveOfflinePage(): Promise<OfflinePage> {
  const result = await build({
    configFile: false,
    logLevel: 'error',
    worker: { format: 'es' },
    build: {
      write: false,
      assetsInlineLimit: 0,
      rollupOptions: {
        input: fileURLToPath(new URL('../browser/listen-offline-page.ts', import.meta.url)),
        output: { entryFileNames: 'page.js' },
      },
    },
  });
  const files = new Map<string, string>();
  for (const part of [result].flat()) {
    if (!('output' in part)) throw new Error('The page’s script was not built.');
    for (const file of part.output) {
      files.set(`/${file.fileName}`, file.type === 'chunk' ? file.code : String(file.source));
    }
  }
  const server = createServer((request, response) => {
    const script = files.get(request.url ?? '');
    response.setHeader('Content-Type', script === undefined ? 'text/html' : 'text/javascript');
    response.end(script ?? '<!doctype html><script type="module" src="/page.js"></script>');
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    async open(page) {
      await page.goto(`http://127.0.0.1:${port}/`);
      await page.waitForFunction(() => 'offline' in window);
    },
    close: () => server.close(),
  };
}
