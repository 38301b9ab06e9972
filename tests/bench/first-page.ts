import type { Browser } from '@playwright/test';
import { scriptsOfFirstPage } from '../support/first-page-scripts.ts';
import { judge } from './judge.ts';

/** JavaScript of the first page, gzip, its worker in it. A size is no time: a test holds it, too. */
export async function measureFirstPage(address: string, browser: Browser): Promise<boolean> {
  const page = await browser.newPage();
  const scripts = await scriptsOfFirstPage(page, address);
  await page.close();
  const total = scripts.reduce((sum, { gzipBytes }) => sum + gzipBytes, 0);
  return judge(`JavaScript of the first page in ${scripts.length} files, gzip`, total / 1000, 260, ' kB');
}
