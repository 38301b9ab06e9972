import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, test } from '@playwright/test';
import { field } from '../support/bench-page.ts';
import { startBuiltApp } from '../support/browser-app.ts';
import { holdTestServer, makeTestDatabase } from '../support/databases.ts';
import { beginWithTeam, readTable, saveTable } from '../support/library-page.ts';

test('a save while the server restarts keeps everything and gets through afterwards', async ({ browser }) => {
  const server = await holdTestServer();
  const database = await makeTestDatabase(server, { migrated: false });
  const data = await mkdtemp(join(tmpdir(), 'stepwell-restart-'));
  let app = startBuiltApp(database.url, data);
  const address = await app.ready;
  const shared = process.env.STEPWELL_TEST_ADDRESS;
  process.env.STEPWELL_TEST_ADDRESS = address;
  const context = await browser.newContext({ baseURL: address });
  try {
    const page = await context.newPage();
    const { team } = await beginWithTeam(page);
    const table = await saveTable(page.request, team, 'Night watch');
    await page.goto(`/teams/${team}/tables/${table.slug}/revisions/1/bench?open=quantise`);
    await expect(page.getByText('This is revision 1 of Night watch')).toBeVisible();
    await page.keyboard.press('2');
    await field(page, 'Bit depth').fill('13');
    await page.getByRole('button', { name: 'Save revision', exact: true }).click();
    const dialog = page.getByRole('dialog', { name: /^Save/ });
    await dialog.getByRole('textbox', { name: 'Note' }).fill('Typed before the server went.');

    await app.stop();
    await dialog.getByRole('button', { name: 'Save revision' }).click();
    await expect(dialog).toContainText('Nothing you typed is lost');
    await expect(dialog.getByRole('textbox', { name: 'Note' })).toHaveValue('Typed before the server went.');

    app = startBuiltApp(database.url, data, new URL(address).port);
    expect(await app.ready).toBe(address);
    await dialog.getByRole('button', { name: 'Save revision' }).click();
    await expect(page.getByText('This is revision 2 of Night watch')).toBeVisible();
    const { revisions } = await readTable(page.request, team, table.slug);
    expect(revisions.map(({ note }) => note)).toEqual(['Typed before the server went.', '']);
  } finally {
    process.env.STEPWELL_TEST_ADDRESS = shared;
    await context.close();
    await app.stop();
    await database.drop();
    await server.release();
    await rm(data, { recursive: true, force: true });
  }
});
