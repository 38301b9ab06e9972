import { gzipSync } from 'node:zlib';
import type { Page, Response } from '@playwright/test';

export interface LoadedScript {
  readonly name: string;
  readonly gzipBytes: number;
}

/**
 * Opens a page and answers every JavaScript file that came over the network until the bench was at rest, workers'
 * too, each packed by gzip at its usual level 6 whatever the server itself packs by.
 */
export async function scriptsOfFirstPage(page: Page, address: string): Promise<LoadedScript[]> {
  const bodies = new Map<string, Promise<Buffer>>();
  const keep = (response: Response) => {
    const type = response.headers()['content-type'] ?? '';
    if (type.includes('javascript')) bodies.set(response.url(), response.body());
  };
  page.context().on('response', keep);
  await page.goto(address);
  await page.getByRole('figure', { name: 'Spectrum', exact: true }).waitFor();
  await page.waitForLoadState('networkidle');
  page.context().off('response', keep);
  return Promise.all(
    [...bodies].map(async ([url, body]) => ({
      name: new URL(url).pathname.split('/').pop() ?? url,
      gzipBytes: gzipSync(await body, { level: 6 }).length,
    })),
  );
}
