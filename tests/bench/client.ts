import { chromium, type Browser } from '@playwright/test';
import { preview } from 'vite';
import { projectFolder } from '../../server/project-folder.ts';
import { findProgram } from '../../server/setup/programs.mjs';

/** The built client on a port of its own, in Debian's Chromium as the browser tests start it. */
export async function withClient<Result>(
  work: (address: string, browser: Browser) => Promise<Result>,
): Promise<Result> {
  const server = await preview({
    root: projectFolder,
    logLevel: 'warn',
    preview: { host: '127.0.0.1', port: 0, strictPort: false, open: false },
  });
  const address = server.resolvedUrls?.local[0];
  if (address === undefined) throw new Error('The preview server has no address.');
  const browser = await chromium.launch({
    executablePath: findProgram('chromium'),
    args: [
      '--no-sandbox',
      '--disable-quic',
      '--disable-background-networking',
      '--disable-component-update',
      '--no-first-run',
    ],
  });
  try {
    return await work(address, browser);
  } finally {
    await browser.close();
    await server.close();
  }
}
