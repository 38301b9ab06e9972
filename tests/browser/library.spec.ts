import { expect, type Page } from '@playwright/test';
import { figure, textOf } from '../support/bench-page.ts';
import { beginWithTeam, read, saveRevision, saveTable, test } from '../support/library-page.ts';

const titles = (page: Page) => page.locator('[data-row]').allInnerTexts();

test.describe('the tables list', () => {
  test('keeps search, filters and order in the address', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    await saveTable(page.request, team, 'Fog signal', { tags: ['fog', 'tone'], length: 256, bits: 8 });
    await saveTable(page.request, team, 'Fog answer', { tags: ['fog'], length: 64, bits: 12 });
    await saveTable(page.request, team, 'Lamp fade', { tags: ['lamp'], length: 32, bits: 10 });
    await page.goto(`/teams/${team}/tables`);
    await expect.poll(() => titles(page)).toEqual(['Lamp fade', 'Fog answer', 'Fog signal']);

    await page.getByRole('button', { name: 'Name' }).click();
    await expect(page).toHaveURL(/sort=title&direction=asc/);
    await expect.poll(() => titles(page)).toEqual(['Fog answer', 'Fog signal', 'Lamp fade']);
    await expect(page.getByRole('columnheader', { name: 'Name' })).toHaveAttribute('aria-sort', 'ascending');
    await page.getByRole('button', { name: 'Name' }).click();
    await expect.poll(() => titles(page)).toEqual(['Lamp fade', 'Fog signal', 'Fog answer']);

    await page.keyboard.press('/');
    await page.keyboard.type('fo sig');
    await expect(page).toHaveURL(/search=fo\+sig/);
    await expect.poll(() => titles(page)).toEqual(['Fog signal']);
    await page.reload();
    await expect(page.getByRole('searchbox', { name: 'Search' })).toHaveValue('fo sig');
    await expect.poll(() => titles(page)).toEqual(['Fog signal']);

    await page.getByRole('button', { name: 'Clear the filters' }).click();
    await page.getByRole('combobox', { name: 'Tag' }).selectOption('fog');
    await expect(page).toHaveURL(/tag=fog/);
    await expect.poll(() => titles(page)).toEqual(['Fog signal', 'Fog answer']);
    await page.getByRole('combobox', { name: 'State' }).selectOption('vetted');
    await expect(page.getByText('No table passes these filters')).toBeVisible();
    await page.goBack();
    await expect.poll(() => titles(page)).toEqual(['Fog signal', 'Fog answer']);

    await page.getByRole('searchbox', { name: 'Search' }).fill('a b c d e f g h i');
    await expect(page.getByText('at most 8 different words')).toBeVisible();
    await expect(page.getByRole('searchbox', { name: 'Search' })).toHaveValue('a b c d e f g h i');
  });

  test('goes on page by page', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    for (let number = 1; number <= 51; number += 1)
      await saveTable(page.request, team, `Table ${String(number).padStart(2, '0')}`, { length: 8 });
    await page.goto(`/teams/${team}/tables?sort=title&direction=asc`);
    await expect(page.locator('[data-row]')).toHaveCount(50);
    await page.getByRole('link', { name: 'Next page' }).click();
    await expect.poll(() => titles(page)).toEqual(['Table 51']);
    await expect(page).toHaveURL(/cursor=/);
    await page.reload();
    await expect.poll(() => titles(page)).toEqual(['Table 51']);
    await page.getByRole('link', { name: 'First page' }).click();
    await expect(page.locator('[data-row]')).toHaveCount(50);
  });

  test('goes from table to table by arrows, and plays one at a time', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    await saveTable(page.request, team, 'Lower');
    await saveTable(page.request, team, 'Upper');
    await page.goto(`/teams/${team}/tables`);
    await page.getByRole('link', { name: 'Upper' }).focus();
    await page.keyboard.press('ArrowDown');
    await expect(page.getByRole('link', { name: 'Lower' })).toBeFocused();

    await page.getByRole('button', { name: 'Play Upper' }).click();
    await expect(page.getByText('Playing Upper, quietly.')).toBeVisible();
    await page.getByRole('button', { name: 'Play Lower' }).click();
    await expect(page.getByText('Playing Lower, quietly.')).toBeVisible();
    await expect(page.getByRole('button', { name: 'Play Upper' })).toBeVisible();
    await page.getByRole('button', { name: 'Stop', exact: true }).click();
    await expect(page.getByText('Playing Lower')).toBeHidden();
  });

  test('an empty library offers a working example', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    await page.goto(`/teams/${team}/tables`);
    await page.getByRole('button', { name: 'Add one working example' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Self-test sine' })).toBeVisible();
    await expect(figure(page, 'Codes used')).toContainText('of 1,024');
  });
});

test.describe('a table’s page', () => {
  test('shows, exports and opens any revision', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    const table = await saveTable(page.request, team, 'Stepping', { bits: 8, note: 'Eight bits.' });
    await saveRevision(page.request, team, table, { name: 'Stepping', bits: 12, note: 'Twelve bits.' });
    await page.goto(`/teams/${team}/tables/${table.slug}`);
    await expect(figure(page, 'Codes used')).toContainText('of 4,096');
    await page.getByRole('link', { name: 'Revision 1', exact: true }).click();
    await expect(page.getByRole('heading', { name: 'Revision 1 of 2' })).toBeVisible();
    await expect(figure(page, 'Codes used')).toContainText('of 256');

    await page.getByRole('button', { name: 'Show the files' }).click();
    await page.getByRole('textbox', { name: 'Array name' }).fill('2nd');
    await expect(page.getByText('"2nd" is not allowed.')).toBeVisible();
    await page.getByRole('textbox', { name: 'Array name' }).fill('stepOne');
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Download stepOne.h' }).click(),
    ]);
    const answer = await read<{ files: { name: string; text: string }[] }>(
      page.request,
      `/teams/${team}/tables/${table.slug}/revisions/1/export?target=c99&arrayName=stepOne`,
    );
    expect(await textOf(download)).toBe(answer.files.find(({ name }) => name === 'stepOne.h')?.text);
    await expect(page.getByRole('textbox', { name: 'stepOne.h, read-only' })).toContainText('64 entries');

    await page.getByRole('link', { name: 'Open revision 1 on the bench' }).click();
    await expect(page.getByText('This is revision 1 of Stepping')).toBeVisible();
    await expect(figure(page, 'Codes used')).toContainText('of 256');
  });

  test('is renamed with both sides shown, duplicated, archived and restored', async ({ page, context }) => {
    const { team } = await beginWithTeam(page);
    const table = await saveTable(page.request, team, 'Old name', { tags: ['one'] });
    await page.goto(`/teams/${team}/tables/${table.slug}`);
    await page.getByRole('button', { name: 'Rename and tag' }).click();
    const sheet = page.getByRole('dialog', { name: 'Rename and tag' });
    await sheet.getByRole('textbox', { name: 'Title' }).fill('My name');
    await sheet.getByRole('textbox', { name: 'Tags' }).fill('Two, three');
    const origin = process.env.STEPWELL_TEST_ADDRESS ?? '';
    await context.request.patch(`${origin}/api/v1/teams/${team}/tables/${table.slug}`, {
      headers: { Origin: origin, 'If-Match': '"1"' },
      data: { title: 'Their name' },
    });
    await sheet.getByRole('button', { name: 'Change' }).click();
    const sides = sheet.getByRole('region', { name: 'Both sides' });
    await expect(sides.getByRole('row').filter({ hasText: 'Title' })).toContainText('My nameTheir name');
    await sheet.getByRole('button', { name: 'Change it to mine' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'My name' })).toBeVisible();
    await expect(page.getByRole('link', { name: 'Tables tagged three' })).toBeVisible();

    await page.getByRole('button', { name: 'Archive', exact: true }).click();
    await expect(page.getByText('Archived', { exact: true })).toBeVisible();
    await page.goto(`/teams/${team}/tables`);
    await expect(page.getByText('Nothing has been saved yet')).toBeVisible();
    await page.getByRole('radio', { name: 'Archive' }).check();
    await page.getByRole('link', { name: 'My name' }).click();
    await page.getByRole('button', { name: 'Restore' }).click();
    await expect(page.getByText('It is in the library again.')).toBeVisible();

    await page.getByRole('button', { name: 'Duplicate' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'My name copy' })).toBeVisible();
  });

  test('shows what people typed as text and nothing else', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    const title = '<img src=x onerror=alert(1)> */';
    await saveTable(page.request, team, title, { note: '<script>alert(2)</script>\n??/ */' });
    page.on('dialog', () => {
      throw new Error('A script ran.');
    });
    await page.goto(`/teams/${team}/tables`);
    await page.getByRole('link', { name: title }).click();
    await expect(page.getByRole('heading', { level: 1, name: title })).toBeVisible();
    await expect(page.getByText('<script>alert(2)</script>').first()).toBeVisible();
    await expect(page.locator('main img, main script')).toHaveCount(0);
  });
});
