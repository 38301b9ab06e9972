import { expect, type Page } from '@playwright/test';
import { field, figure, test, textOf } from '../support/bench-page.ts';

test.describe('a read-only link', () => {
  test.use({ permissions: ['clipboard-read', 'clipboard-write'] });

  async function copiedLink(page: Page): Promise<string> {
    await page.getByRole('button', { name: 'Copy link' }).click();
    await expect(page.getByText('Link copied.')).toBeVisible();
    return page.evaluate(() => navigator.clipboard.readText());
  }

  test('carries the whole wave, is not to be changed, and goes on the bench as one step', async ({
    page,
    browser,
  }) => {
    await page.goto('/?open=quantise');
    await field(page, 'Name of the wave').fill('Bell at the mole');
    await field(page, 'Bit depth').fill('11');
    await expect(figure(page, 'Codes used')).toContainText('of 2,048');
    const snr = await figure(page, 'SNR').innerText();
    const link = await copiedLink(page);
    expect(link).toMatch(/\/wave#w1\.[\w-]+$/);

    const other = await browser.newContext();
    const guest = await other.newPage();
    await guest.goto(link);
    await expect(guest.getByRole('heading', { level: 1, name: 'Bell at the mole' })).toBeVisible();
    await expect(guest.getByText('A shared wave, read-only')).toBeVisible();
    await expect(figure(guest, 'SNR')).toHaveText(snr, { useInnerText: true });
    await expect(field(guest, 'Bit depth')).toBeHidden();
    await expect(field(guest, 'Name of the wave')).toBeHidden();

    await guest.getByRole('button', { name: 'Open on my bench' }).click();
    await expect(field(guest, 'Name of the wave')).toHaveValue('Bell at the mole');
    await guest.getByRole('button', { name: 'Undo', exact: true }).click();
    await expect(field(guest, 'Name of the wave')).toHaveValue('Fog-signal tone');
    await other.close();
  });

  test('is refused for a wave that does not build', async ({ page }) => {
    await page.goto('/?open=quantise');
    await field(page, 'Bit depth').fill('17');
    await page.getByRole('button', { name: 'Copy link' }).click();
    await expect(page.getByText('A link can carry only a wave that builds')).toBeVisible();
  });

  test('says that it is damaged', async ({ page }) => {
    await page.goto('/');
    const link = await copiedLink(page);
    await page.goto(`${link.slice(0, -20)}`);
    await expect(page.getByText('has been cut or altered on its way')).toBeVisible();
    await page.getByRole('link', { name: 'Go to the bench' }).click();
    await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');
  });
});

test('damaged storage is set aside and told', async ({ page }) => {
  await page.goto('/');
  await page.evaluate(() => localStorage.setItem('stepwell.bench', '{"version":1,"definition":{"sch'));
  await page.reload();
  await expect(page.getByText('Kept work could not be read')).toBeVisible();
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Download it' }).click();
  expect(await textOf(await download)).toBe('{"version":1,"definition":{"sch');
  await page.getByRole('button', { name: 'Let it go' }).click();
  await expect(page.getByText('Kept work could not be read')).toBeHidden();
  await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');
});

test('two tabs show the newest work, and undo brings this tab’s own back', async ({ page, context }) => {
  await page.goto('/');
  await field(page, 'Name of the wave').fill('Mine');
  const other = await context.newPage();
  await other.goto('/');
  await expect(field(other, 'Name of the wave')).toHaveValue('Mine');
  await field(other, 'Name of the wave').fill('Theirs');
  await expect(field(page, 'Name of the wave')).toHaveValue('Theirs');
  await expect(page.getByText('Another tab of this browser changed the bench')).toBeVisible();
  await page.bringToFront();
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await expect(field(page, 'Name of the wave')).toHaveValue('Mine');
  await expect(field(other, 'Name of the wave')).toHaveValue('Mine');
});
