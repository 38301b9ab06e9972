import { expect, type Page } from '@playwright/test';
import { field, figure, textOf } from '../support/bench-page.ts';
import {
  hear,
  join,
  makePerson,
  makeTeam,
  read,
  readTable,
  remove,
  saveRevision,
  saveTable,
  signIn,
  test,
} from '../support/library-page.ts';

async function openOnBench(page: Page, team: string, slug: string, number = 1): Promise<void> {
  await page.goto(`/teams/${team}/tables/${slug}/revisions/${number}/bench`);
  await expect(page.getByText(`This is revision ${number} of`)).toBeVisible();
}

const save = (page: Page) => page.getByRole('button', { name: 'Save revision', exact: true });
const dialog = (page: Page) => page.getByRole('dialog', { name: /^Save/ });
const send = (page: Page) => dialog(page).getByRole('button', { name: 'Save revision' });
const titles = (page: Page) => page.locator('[data-row]').allInnerTexts();

async function begin(page: Page, name = 'Aldo Brine') {
  const person = await makePerson(page.request, name);
  await signIn(page.context(), person);
  return { person, team: await makeTeam(page.request, 'Ninth Fathom') };
}

test.describe('saving', () => {
  test('a wave becomes revision after revision, and the bench tells how it stands with them', async ({
    page,
  }) => {
    const { team } = await begin(page);
    await page.goto('/?open=quantise');
    await expect(figure(page, 'SNR')).toBeVisible();
    await page.keyboard.press('Control+s');
    await dialog(page).getByRole('textbox', { name: 'Title' }).fill('Fog horn');
    await dialog(page).getByRole('button', { name: 'Save' }).click();
    await expect(page.getByText('This is revision 1 of Fog horn, Ninth Fathom')).toBeVisible();

    await field(page, 'Bit depth').fill('10');
    await expect(page.getByText('Changed since revision 1 of Fog horn')).toBeVisible();
    await page.reload();
    await expect(page.getByText('Changed since revision 1 of Fog horn')).toBeVisible();
    await save(page).click();
    await dialog(page).getByRole('textbox', { name: 'Note' }).fill('Two bits more.');
    await send(page).click();
    await expect(page.getByText('This is revision 2 of Fog horn')).toBeVisible();
    await page.reload();
    await expect(page.getByText('This is revision 2 of Fog horn')).toBeVisible();

    const { revisions } = await readTable(page.request, team, 'fog-horn');
    expect(revisions.map(({ number, note }) => [number, note])).toEqual([
      [2, 'Two bits more.'],
      [1, ''],
    ]);

    await page.getByRole('button', { name: 'Start anew' }).click();
    await page.getByRole('menuitem', { name: /^Lamp fade/ }).click();
    await expect(page.getByRole('button', { name: 'Save', exact: true })).toBeVisible();
    await page.getByRole('button', { name: 'Undo', exact: true }).first().click();
    await expect(page.getByText('This is revision 2 of Fog horn')).toBeVisible();
  });

  test('a wave that does not build is not sent', async ({ page }) => {
    await begin(page);
    await page.goto('/?open=quantise');
    await field(page, 'Bit depth').fill('17');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByText('Only a wave that builds can be saved.')).toBeVisible();
    await expect(page.getByRole('dialog')).toHaveCount(0);
  });

  test('two people who save at once see both sides, and nothing typed is lost', async ({
    page,
    browser,
    quiet,
  }) => {
    const { team } = await begin(page, 'Ada Keel');
    const other = await browser.newContext();
    hear(other, quiet);
    const mate = await makePerson(other.request, 'Rhea Sound');
    await signIn(other, mate);
    await join(page.request, team, mate, 'author', other.request);
    const table = await saveTable(page.request, team, 'Contested tone', { bits: 8 });
    const theirs = await other.newPage();
    for (const one of [page, theirs]) await openOnBench(one, team, table.slug);

    await theirs.keyboard.press('2');
    await field(theirs, 'Bit depth').fill('12');
    await save(theirs).click();
    await dialog(theirs).getByRole('textbox', { name: 'Note' }).fill('Deeper.');
    await send(theirs).click();
    await expect(theirs.getByText('This is revision 2 of Contested tone')).toBeVisible();

    await page.keyboard.press('2');
    await field(page, 'Table length').fill('128');
    await save(page).click();
    await dialog(page).getByRole('textbox', { name: 'Note' }).fill('Longer.');
    await send(page).click();
    const sides = page.getByRole('region', { name: 'Both sides' });
    await expect(sides).toContainText(
      'Somebody else was faster. Revision 2 was saved while you worked on revision 1.',
    );
    await expect(sides).toContainText(/Rhea Sound, .*: Deeper\./);
    await expect(sides.getByRole('row').filter({ hasText: 'Table length' })).toContainText('12864');
    await expect(sides.getByRole('row').filter({ hasText: 'Bit depth' })).toContainText('812');
    await expect(sides.getByRole('img')).toHaveCount(2);
    await expect(dialog(page).getByRole('textbox', { name: 'Note' })).toHaveValue('Longer.');

    const [look] = await Promise.all([
      page.waitForEvent('popup'),
      sides.getByRole('link', { name: 'Look at theirs' }).click(),
    ]);
    await expect(look.getByRole('heading', { name: 'Revision 2, the newest' })).toBeVisible();
    await look.close();

    await page.getByRole('button', { name: 'Save mine as revision 3' }).click();
    await expect(page.getByText('This is revision 3 of Contested tone')).toBeVisible();
    const { revisions } = await readTable(page.request, team, table.slug);
    expect(revisions.map(({ note }) => note)).toEqual(['Longer.', 'Deeper.', '']);
    await other.close();
  });

  test('a save without a connection keeps everything and gets through later', async ({ page, context }) => {
    const { team } = await begin(page);
    const table = await saveTable(page.request, team, 'Far out');
    await openOnBench(page, team, table.slug);
    await page.keyboard.press('2');
    await field(page, 'Bit depth').fill('11');
    await save(page).click();
    await dialog(page).getByRole('textbox', { name: 'Note' }).fill('Written at sea.');
    await context.setOffline(true);
    await send(page).click();
    await expect(dialog(page)).toContainText('This device is offline.');
    await expect(dialog(page)).toContainText('Nothing you typed is lost');
    await page.keyboard.press('Escape');
    await expect(page.getByText('Not saved yet: This device is offline.')).toBeVisible();
    await context.setOffline(false);

    await page.reload();
    await expect(field(page, 'Bit depth')).toHaveValue('11');
    await save(page).click();
    await expect(dialog(page).getByRole('textbox', { name: 'Note' })).toHaveValue('Written at sea.');
    await send(page).click();
    await expect(page.getByText('This is revision 2 of Far out')).toBeVisible();
    const { revisions } = await readTable(page.request, team, table.slug);
    expect(revisions.map(({ note }) => note)).toEqual(['Written at sea.', '']);
  });

  test('a save whose answer was lost is done once, however often it is sent', async ({ page }) => {
    const { team } = await begin(page);
    const table = await saveTable(page.request, team, 'Only once');
    await openOnBench(page, team, table.slug);
    await page.keyboard.press('2');
    await field(page, 'Bit depth').fill('11');
    const keys: (string | null)[] = [];
    await page.route('**/revisions', async (route) => {
      keys.push(await route.request().headerValue('Idempotency-Key'));
      // The server has done it, and the connection breaks before anybody hears.
      await route.fetch();
      if (keys.length === 1) await route.abort('failed');
      else await route.continue();
    });
    await save(page).click();
    await send(page).click();
    await expect(dialog(page)).toContainText('The server does not answer.');
    await send(page).click();
    await expect(page.getByText('This is revision 2 of Only once')).toBeVisible();
    expect(keys).toHaveLength(2);
    expect(keys[0]).toBe(keys[1]);
    expect((await readTable(page.request, team, table.slug)).latestRevision).toBe(2);
  });

  test('an expired sign-in is renewed on top, and the save goes on', async ({ page, browser }) => {
    const { team, person } = await begin(page);
    const table = await saveTable(page.request, team, 'Long night');
    await openOnBench(page, team, table.slug);
    await page.keyboard.press('2');
    await field(page, 'Bit depth').fill('9');
    await save(page).click();
    await dialog(page).getByRole('textbox', { name: 'Note' }).fill('Past midnight.');
    const elsewhere = await browser.newContext();
    await signIn(elsewhere, person);
    await remove(elsewhere.request, '/account/sessions');
    await send(page).click();
    const again = page.getByRole('dialog', { name: 'Sign in' });
    await expect(again).toContainText('Your sign-in has run out or was ended.');
    await expect(again.getByRole('textbox', { name: 'E-mail address' })).toHaveValue(person.email);
    await again.getByLabel('Password', { exact: true }).fill(person.password);
    await again.getByRole('button', { name: 'Sign in' }).click();
    await expect(page.getByText('This is revision 2 of Long night')).toBeVisible();
    const { revisions } = await readTable(page.request, team, table.slug);
    expect(revisions[0].note).toBe('Past midnight.');
    await elsewhere.close();
  });
});

test.describe('the tables list', () => {
  test('keeps search, filters and order in the address', async ({ page }) => {
    const { team } = await begin(page);
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
    const { team } = await begin(page);
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
    const { team } = await begin(page);
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
    const { team } = await begin(page);
    await page.goto(`/teams/${team}/tables`);
    await page.getByRole('button', { name: 'Add one working example' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Self-test sine' })).toBeVisible();
    await expect(figure(page, 'Codes used')).toContainText('of 1,024');
  });
});

test.describe('a table’s page', () => {
  test('shows, exports and opens any revision', async ({ page }) => {
    const { team } = await begin(page);
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
    await expect(page.getByRole('textbox', { name: 'stepOne.h, read-only' })).toContainText('stepOne');

    await page.getByRole('link', { name: 'Open revision 1 on the bench' }).click();
    await expect(page.getByText('This is revision 1 of Stepping')).toBeVisible();
    await expect(figure(page, 'Codes used')).toContainText('of 256');
  });

  test('is renamed with both sides shown, duplicated, archived and restored', async ({ page, context }) => {
    const { team } = await begin(page);
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
    const { team } = await begin(page);
    const title = '<img src=x onerror=alert(1)> */';
    await saveTable(page.request, team, title, { note: '<script>alert(2)</script>\n?\u003f/ *\/' });
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
