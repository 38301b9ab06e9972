import { readFile } from 'node:fs/promises';
import { expect, test as base, type Download, type Page } from '@playwright/test';

/** A page that must not complain: no error, no warning, no breach of the content policy, no failed request. */
export const test = base.extend<{ quiet: string[] }>({
  quiet: [
    async ({ context }, use) => {
      const complaints: string[] = [];
      context.on('console', (message) => {
        if (['error', 'warning'].includes(message.type())) complaints.push(message.text());
      });
      context.on('weberror', (error) => complaints.push(String(error.error())));
      context.on('requestfailed', (request) => {
        // A page that is left behind gives up what it was still loading.
        const why = request.failure()?.errorText;
        if (why !== 'net::ERR_ABORTED') complaints.push(`${request.url()} failed: ${why}`);
      });
      await use(complaints);
      expect(complaints).toEqual([]);
    },
    { auto: true },
  ],
});

export const field = (page: Page, name: string) => page.getByRole('textbox', { name, exact: false }).first();
export const flight = (page: Page, name: string) =>
  page
    .getByRole('heading', { level: 2 })
    .getByRole('button', { name: new RegExp(`^(\\d )?${name}\\b`) })
    .first();
export const figure = (page: Page, name: string) => page.getByRole('group', { name, exact: true });
export const drawings = (page: Page) => page.getByRole('region', { name: 'Drawings and figures' });
export const problems = (page: Page) => page.getByRole('region', { name: 'What is wrong' });

export async function textOf(download: Download): Promise<string> {
  return readFile(await download.path(), 'utf8');
}

/** What a screen reader says beside a field. */
export async function saidBeside(page: Page, name: string): Promise<string> {
  const ids = (await field(page, name).getAttribute('aria-describedby'))?.split(' ') ?? [];
  const texts = await Promise.all(ids.map((id) => page.locator(`[id="${id}"]`).innerText()));
  return texts.join(' ');
}
