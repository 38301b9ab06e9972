import { expect, type Page } from '@playwright/test';
import { field, figure, textOf } from '../support/bench-page.ts';
import {
  freshEmail,
  hear,
  isKnown,
  join,
  linkIn,
  mailTo,
  makePerson,
  makeTeam,
  post,
  read,
  saveTable,
  signIn,
  test,
} from '../support/library-page.ts';

const row = (page: Page, name: string) => page.getByRole('row').filter({ hasText: name });

test('from a wave shaped by nobody to a second person who exports it and may not edit', async ({
  page,
  browser,
  quiet,
}) => {
  test.setTimeout(180_000);
  const email = freshEmail('ada');
  await page.goto('/?open=quantise');
  await field(page, 'Name of the wave').fill('Bell at the mole');
  await field(page, 'Bit depth').fill('9');
  await expect(figure(page, 'Codes used')).toContainText('of 512');

  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await page.getByRole('dialog').getByRole('link', { name: 'Make an account' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Make an account' })).toBeVisible();
  await field(page, 'Name').fill('Ada Keel');
  await field(page, 'E-mail address').fill(email);
  await page.getByLabel('Password', { exact: true }).fill('nine fathoms deep');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await expect(page.getByRole('heading', { name: 'Look in your mail' })).toBeVisible();

  await page.getByRole('main').getByRole('link', { name: 'local mailbox' }).click();
  await page.getByRole('link', { name: 'Verify your address' }).filter({ hasText: email }).click();
  await page
    .getByRole('article')
    .getByRole('link', { name: /\/verify#/ })
    .click();
  await page.getByRole('button', { name: 'Verify this address' }).click();
  await expect(page.getByRole('heading', { name: 'Your address is verified' })).toBeVisible();
  await expect(field(page, 'E-mail address')).toHaveValue(email);
  await page.getByLabel('Password', { exact: true }).fill('nine fathoms deep');
  await page.getByRole('main').getByRole('button', { name: 'Sign in' }).click();

  await expect(field(page, 'Name of the wave')).toHaveValue('Bell at the mole');
  await expect(figure(page, 'Codes used')).toContainText('of 512');

  await page.getByRole('button', { name: 'Save', exact: true }).click();
  const dialog = page.getByRole('dialog');
  await field(page, 'Name of the team').fill('Harbour office');
  await dialog.getByRole('button', { name: 'Make the team' }).click();
  await expect(dialog.getByRole('textbox', { name: 'Title' })).toHaveValue('Bell at the mole');
  await dialog.getByRole('textbox', { name: 'Tags' }).fill('Bell, mole');
  await dialog.getByRole('textbox', { name: 'Note' }).fill('First try.');
  await dialog.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByText('Saved as revision 1 of Bell at the mole.')).toBeVisible();
  await expect(page.getByText('This is revision 1 of Bell at the mole, Harbour office')).toBeVisible();

  const guest = await browser.newContext();
  hear(guest, quiet);
  const other = await guest.newPage();
  const guestEmail = freshEmail('vera');
  await page.getByRole('link', { name: 'Team', exact: true }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Harbour office' })).toBeVisible();
  await page.getByRole('textbox', { name: 'E-mail address' }).fill(guestEmail);
  await page.getByRole('button', { name: 'Invite', exact: true }).click();
  await expect(page.getByText(`${guestEmail} is invited as viewer.`)).toBeVisible();

  await other.goto(linkIn(await mailTo(guest.request, guestEmail, 'Invitation')));
  await expect(other.getByRole('heading', { name: 'Join Harbour office' })).toBeVisible();
  await expect(other.getByText('as viewer')).toBeVisible();
  await other.getByRole('link', { name: 'make one with it' }).click();
  await expect(other.getByRole('heading', { level: 1, name: 'Make an account' })).toBeVisible();
  await expect(field(other, 'E-mail address')).toHaveValue(guestEmail);
  await field(other, 'Name').fill('Vera Quill');
  await other.getByLabel('Password', { exact: true }).fill('down with the lamp');
  await other.getByRole('button', { name: 'Make the account' }).click();
  await expect(other.getByRole('heading', { name: 'Look in your mail' })).toBeVisible();
  await other.goto(linkIn(await mailTo(guest.request, guestEmail, 'Verify')));
  await other.getByRole('button', { name: 'Verify this address' }).click();
  await other.getByLabel('Password', { exact: true }).fill('down with the lamp');
  await other.getByRole('main').getByRole('button', { name: 'Sign in' }).click();
  await other.getByRole('button', { name: 'Join the team' }).click();

  await expect(other.getByText('As a viewer you read, listen and export.')).toBeVisible();
  await other.getByRole('link', { name: 'Bell at the mole' }).click();
  await expect(other.getByText('First try.').first()).toBeVisible();
  await expect(figure(other, 'Codes used')).toContainText('of 512');
  for (const name of ['Rename and tag', 'Duplicate', 'Archive'])
    await expect(other.getByRole('button', { name })).toBeHidden();

  await other.getByRole('button', { name: 'Show the files' }).click();
  const [download] = await Promise.all([
    other.waitForEvent('download'),
    other.getByRole('link', { name: 'Download bell_at_the_mole.c' }).click(),
  ]);
  const source = await textOf(download);
  expect(source).toContain('bell_at_the_mole');
  const answer = await read<{ files: { name: string; text: string }[] }>(
    page.request,
    '/teams/harbour-office/tables/bell-at-the-mole/revisions/1/export?target=c99',
  );
  expect(source).toBe(answer.files.find(({ name }) => name === 'bell_at_the_mole.c')?.text);

  await other.getByRole('link', { name: 'Open on the bench', exact: true }).click();
  await expect(field(other, 'Name of the wave')).toHaveValue('Bell at the mole');
  await expect(other.getByText('As a viewer there you can listen and export')).toBeVisible();
  await expect(other.getByRole('button', { name: 'Save revision' })).toBeHidden();
  await field(other, 'Name of the wave').fill('Mine now');
  await other.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(other.getByRole('dialog')).toContainText('You are a viewer in Harbour office');
  const forced = await guest.request.post(
    `${process.env.STEPWELL_TEST_ADDRESS}/api/v1/teams/harbour-office/tables/bell-at-the-mole/archive`,
    { headers: { Origin: process.env.STEPWELL_TEST_ADDRESS ?? '' } },
  );
  expect(forced.status()).toBe(403);
  await guest.close();
});

test('roles are changed and members removed; the last admin stays, and is told why', async ({
  page,
  context,
  browser,
  quiet,
}) => {
  const [admin, mate] = [
    await makePerson(page.request, 'Ada Keel'),
    await makePerson(page.request, 'Aldo Brine'),
  ];
  await signIn(context, admin);
  const team = await makeTeam(page.request, 'Lamp shop');
  const other = await browser.newContext();
  hear(other, quiet);
  await signIn(other, mate);
  await join(page.request, team, mate, 'viewer', other.request);

  await page.goto(`/teams/${team}`);
  const own = row(page, admin.email);
  await expect(own.getByRole('button', { name: 'Leave the team' })).toHaveAttribute('aria-disabled', 'true');
  await expect(own).toContainText('The last admin stays: make somebody else one first');
  await expect(own.getByRole('combobox')).toBeHidden();

  await page.getByRole('combobox', { name: 'Role of Aldo Brine' }).selectOption('admin');
  await expect(page.getByText('Aldo Brine is admin now.')).toBeVisible();
  await expect(own.getByRole('button', { name: 'Leave the team' })).not.toHaveAttribute(
    'aria-disabled',
    'true',
  );

  const theirs = await other.newPage();
  await theirs.goto(`/teams/${team}`);
  await row(theirs, admin.email).getByRole('button', { name: 'Remove Ada Keel' }).click();
  await theirs.getByRole('dialog').getByRole('button', { name: 'Remove' }).click();
  await expect(theirs.getByText('Ada Keel was removed.')).toBeVisible();
  await expect(theirs.getByRole('heading', { name: 'Members: 1' })).toBeVisible();

  await page.reload();
  await expect(page.getByRole('heading', { name: 'This is not there, or not yours to see' })).toBeVisible();
  await other.close();
});

test('who may not look after a team is not offered to, and leaves it by themselves', async ({
  page,
  context,
  browser,
}) => {
  const [admin, mate] = [
    await makePerson(page.request, 'Ada Keel'),
    await makePerson(page.request, 'Vera Quill'),
  ];
  await signIn(context, mate);
  const office = await browser.newContext();
  await signIn(office, admin);
  const team = await makeTeam(office.request, 'Bell house');
  await join(office.request, team, mate, 'author', page.request);

  await page.goto(`/teams/${team}`);
  await expect(page.getByText('Roles are changed and members removed by an admin.')).toBeVisible();
  await expect(page.getByText('Set by an admin.')).toBeVisible();
  for (const name of ['Invitations', 'Name of the team'])
    await expect(page.getByRole('heading', { name })).toBeHidden();
  await expect(page.getByRole('combobox')).toHaveCount(0);

  await page.getByRole('button', { name: 'Leave the team' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Leave' }).click();
  await expect(page.getByText('You belong to no team yet')).toBeVisible();
  await office.close();
});

test('an invitation is bound to its address, and can be withdrawn', async ({ page, context, browser }) => {
  const [admin, stranger] = [
    await makePerson(page.request, 'Ada Keel'),
    await makePerson(page.request, 'Somebody Else'),
  ];
  await signIn(context, admin);
  const team = await makeTeam(page.request, 'Signal box');
  await page.goto(`/teams/${team}`);
  const address = freshEmail('guest');
  const invited = page.getByRole('textbox', { name: 'E-mail address' });
  await invited.fill('no address');
  await page.getByRole('button', { name: 'Invite', exact: true }).click();
  await expect(page.getByText('an e-mail address, as name@host.example')).toBeVisible();
  await expect(invited).toHaveValue('no address');
  await expect(invited).toBeFocused();
  await invited.fill(address);
  await page.getByRole('combobox', { name: 'Role', exact: true }).selectOption('reviewer');
  await page.getByRole('button', { name: 'Invite', exact: true }).click();
  await expect(row(page, address)).toContainText('reviewer');
  await expect(row(page, address)).toContainText(/on its way|sent/);
  const link = linkIn(await mailTo(page.request, address, 'Invitation'));

  const other = await browser.newContext();
  await signIn(other, stranger);
  const theirs = await other.newPage();
  await theirs.goto(link);
  await expect(theirs.getByText('The invitation is for another address.')).toBeVisible();
  await expect(theirs.getByText(`you are signed in as ${stranger.email}`)).toBeVisible();
  await expect(theirs.getByRole('button', { name: 'Join the team' })).toBeHidden();

  await page.getByRole('button', { name: `Withdraw the invitation of ${address}` }).click();
  await expect(page.getByText('No invitation is open.')).toBeVisible();
  await theirs.reload();
  await expect(theirs.getByText('This invitation cannot be opened')).toBeVisible();
  await other.close();
});

test('defaults changed by two admins are shown side by side, and new waves begin with them', async ({
  page,
  context,
}) => {
  const admin = await makePerson(page.request, 'Ada Keel');
  await signIn(context, admin);
  const team = await makeTeam(page.request, 'Tone room');
  await page.goto(`/teams/${team}`);
  await field(page, 'Bit depth').fill('17');
  await expect(page.getByRole('button', { name: 'Keep these' })).toHaveAttribute('aria-disabled', 'true');
  await field(page, 'Bit depth').fill('10');
  await field(page, 'Prefix of array names').fill('tr_');

  const origin = process.env.STEPWELL_TEST_ADDRESS ?? '';
  const faster = await context.request.patch(`${origin}/api/v1/teams/${team}`, {
    headers: { Origin: origin, 'If-Match': '"1"' },
    data: { defaults: { bits: 12, licenceLine: 'SPDX-License-Identifier: MIT' } },
  });
  expect(faster.ok()).toBe(true);
  await page.getByRole('button', { name: 'Keep these' }).click();
  const sides = page.getByRole('region', { name: 'Both sides' });
  await expect(sides).toContainText('Somebody else has kept other defaults meanwhile.');
  await expect(sides.getByRole('row').filter({ hasText: 'Bit depth' })).toContainText('10 bits12 bits');
  await expect(field(page, 'Prefix of array names')).toHaveValue('tr_');
  await page.getByRole('button', { name: 'Keep mine' }).click();
  await expect(page.getByText('New tables begin with these from now on.')).toBeVisible();
  await expect(sides).toBeHidden();

  await page.getByRole('link', { name: 'Bench', exact: true }).click();
  await isKnown(page, admin);
  await page.getByRole('button', { name: 'Start anew' }).click();
  await page
    .getByRole('menuitem', { name: /Plain sine: as Tone room begins, 256 entries of 10 bits/ })
    .click();
  await expect(figure(page, 'Codes used')).toContainText('of 1,024');
  await page.keyboard.press('4');
  await expect(page.getByRole('tab', { name: 'tr_new_wave.h' })).toBeVisible();
});

test('the team in use is switched from the header, and places follow it', async ({ page, context }) => {
  const person = await makePerson(page.request, 'Ada Keel');
  await signIn(context, person);
  const [first, second] = [
    await makeTeam(page.request, 'Alpha pier'),
    await makeTeam(page.request, 'Beta pier'),
  ];
  await saveTable(page.request, second, 'Only in beta');
  await page.goto(`/teams/${first}/tables`);
  await expect(page.getByText('Nothing has been saved yet')).toBeVisible();
  await page.getByRole('button', { name: 'Team in use: Alpha pier' }).click();
  await page.getByRole('menuitem', { name: 'Beta pier, admin' }).click();
  await expect(page).toHaveURL(new RegExp(`/teams/${second}/tables`));
  await expect(page.getByRole('link', { name: 'Only in beta' })).toBeVisible();
  await page.getByRole('link', { name: 'Team', exact: true }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Beta pier' })).toBeVisible();
  await page.goto('/tables');
  await expect(page).toHaveURL(new RegExp(`/teams/${second}/tables`));
});

test('what another team has does not exist', async ({ page, context, browser }) => {
  const [one, two] = [await makePerson(page.request, 'One'), await makePerson(page.request, 'Two')];
  const other = await browser.newContext();
  await signIn(other, two);
  const team = await makeTeam(other.request, 'Closed door');
  await saveTable(other.request, team, 'Secret');
  await signIn(context, one);
  for (const path of [`/teams/${team}`, `/teams/${team}/tables`, `/teams/${team}/tables/secret`]) {
    await page.goto(path);
    await expect(page.getByRole('heading', { name: 'This is not there, or not yours to see' })).toBeVisible();
    await expect(page.getByText('Secret', { exact: true })).toBeHidden();
  }
  await post(page.request, '/teams', { name: 'Own' });
  await other.close();
});
