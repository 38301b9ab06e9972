import { expect, type Page } from '@playwright/test';
import { field, figure } from '../support/bench-page.ts';
import {
  beginWithTeam,
  hear,
  join,
  makePerson,
  readTable,
  remove,
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

test('a wave becomes revision after revision, and the bench tells how it stands with them', async ({
  page,
}) => {
  const { team } = await beginWithTeam(page);
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
  await beginWithTeam(page);
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
  const { team } = await beginWithTeam(page, 'Ada Keel');
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
  await expect(sides.getByRole('row').filter({ hasText: 'Table length' })).toContainText(
    '128 entries64 entries',
  );
  await expect(sides.getByRole('row').filter({ hasText: 'Bit depth' })).toContainText('8 bits12 bits');
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
  const { team } = await beginWithTeam(page);
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
  const { team } = await beginWithTeam(page);
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
  const { team, person } = await beginWithTeam(page);
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
