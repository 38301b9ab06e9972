import { expect } from '@playwright/test';
import { field, saidBeside } from '../support/bench-page.ts';
import {
  freshEmail,
  isKnown,
  join,
  linkIn,
  mailTo,
  makePerson,
  makeTeam,
  post,
  read,
  signIn,
  test,
} from '../support/library-page.ts';

const password = 'nine fathoms deep';

test('a refused sign-up says what is allowed beside each field and keeps what was typed', async ({
  page,
}) => {
  await page.goto('/sign-up');
  await field(page, 'E-mail address').fill('not an address');
  await page.getByLabel('Password', { exact: true }).fill('short');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await expect.poll(() => saidBeside(page, 'Name')).toContain('1 to 100 characters');
  expect(await saidBeside(page, 'E-mail address')).toContain('an e-mail address, as name@host.example');
  await expect(page.getByText('This is not allowed. Allowed: 10 to 200 characters.')).toBeVisible();
  await expect(field(page, 'Name')).toBeFocused();
  await expect(field(page, 'E-mail address')).toHaveValue('not an address');
  await expect(page.getByLabel('Password', { exact: true })).toHaveValue('short');
  await expect(page.getByText('short', { exact: true })).toBeHidden();
});

test('passwords are hidden until shown, can be pasted, and tell keepers what they are', async ({
  page,
  context,
}) => {
  await context.grantPermissions(['clipboard-read', 'clipboard-write']);
  await page.goto('/sign-up');
  const typed = page.getByLabel('Password', { exact: true });
  await expect(typed).toHaveAttribute('type', 'password');
  await expect(typed).toHaveAttribute('autocomplete', 'new-password');
  await page.evaluate((text) => navigator.clipboard.writeText(text), password);
  await typed.focus();
  await page.keyboard.press('Control+v');
  await expect(typed).toHaveValue(password);
  await page.getByRole('button', { name: 'Show password' }).click();
  await expect(typed).toHaveAttribute('type', 'text');
  await page.goto('/sign-in');
  await expect(field(page, 'E-mail address')).toHaveAttribute('autocomplete', 'username');
  await expect(page.getByLabel('Password', { exact: true })).toHaveAttribute(
    'autocomplete',
    'current-password',
  );
});

test('an account is of use only once its address is verified, and the link can be sent again', async ({
  page,
}) => {
  const email = freshEmail();
  await post(page.request, '/account/sign-up', { name: 'Ines Marlow', email, password });
  const first = linkIn(await mailTo(page.request, email, 'Verify'));
  await page.goto('/sign-in?to=%2Faccount');
  await field(page, 'E-mail address').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('main').getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByText('This address has not been verified yet.')).toBeVisible();
  await page.getByRole('button', { name: 'Send the link again' }).click();
  await expect(page.getByText('a new link is on its way')).toBeVisible();
  await expect.poll(async () => linkIn(await mailTo(page.request, email, 'Verify'))).not.toBe(first);

  await page.goto(first);
  await page.getByRole('button', { name: 'Verify this address' }).click();
  await expect(page.getByText('This link is not valid, or a newer one has replaced it.')).toBeVisible();
  await expect(page.getByText('have another link sent')).toBeVisible();

  const second = linkIn(await mailTo(page.request, email, 'Verify'));
  // Opening uses nothing up: programs that look through mail open links.
  for (let opened = 0; opened < 2; opened += 1) {
    await page.goto('/');
    await page.goto(second);
    await expect(page.getByRole('button', { name: 'Verify this address' })).toBeVisible();
  }
  await page.getByRole('button', { name: 'Verify this address' }).click();
  await expect(page.getByRole('heading', { name: 'Your address is verified' })).toBeVisible();
});

test('a wrong sign-in says so, tells when few tries are left, and keeps the address', async ({ page }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await page.goto('/sign-in?to=%2Faccount');
  await field(page, 'E-mail address').fill(person.email);
  const typed = page.getByLabel('Password', { exact: true });
  const send = page.getByRole('main').getByRole('button', { name: 'Sign in' });
  for (let tries = 1; tries <= 5; tries += 1) {
    await typed.fill(`wrong password ${tries}`);
    const [answer] = await Promise.all([page.waitForResponse(/callback\/credentials/), send.click()]);
    await answer.finished();
  }
  await expect(page.getByText('Address and password do not belong together.')).toBeVisible();
  await expect(page.getByText(/5 more tries are allowed in the next 1\d minutes/)).toBeVisible();
  await expect(field(page, 'E-mail address')).toHaveValue(person.email);
  await typed.fill(person.password);
  await send.click();
  await expect(page.getByRole('heading', { level: 1, name: 'Account' })).toBeVisible();
});

test('a forgotten password is set anew by mail, and every session ends', async ({ page, browser }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  const other = await browser.newContext();
  await signIn(other, person);
  await page.goto('/sign-in');
  await page.getByRole('link', { name: 'Forgotten the password?' }).click();
  // The page before has a field of the same name.
  await expect(page.getByRole('button', { name: 'Send the link' })).toBeVisible();
  await field(page, 'E-mail address').fill(person.email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByText(`If ${person.email} has an account, a link is on its way.`)).toBeVisible();
  await page.goto(linkIn(await mailTo(page.request, person.email, 'Set a new password')));
  await page.getByLabel('New password', { exact: true }).fill('a lamp at the mole');
  await page.getByRole('button', { name: 'Set the password' }).click();
  await expect(page.getByText('Every session has ended')).toBeVisible();
  await page.getByLabel('Password', { exact: true }).fill('a lamp at the mole');
  await page.getByRole('main').getByRole('button', { name: 'Sign in' }).click();
  await isKnown(page, person);

  const theirs = await other.newPage();
  await theirs.goto('/account');
  await expect(theirs.getByText('Sign in first')).toBeVisible();
  await other.close();
});

test('name, address and password are changed on the account page', async ({ page, context }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await signIn(context, person);
  await page.goto('/account');
  const name = page.getByRole('form', { name: 'Name' });
  await name.getByRole('textbox').fill('Ines Brook');
  await name.getByRole('button').click();
  await expect(page.getByRole('button', { name: 'Account of Ines Brook' })).toBeVisible();

  const address = page.getByRole('form', { name: 'E-mail address' });
  const next = freshEmail('next');
  await address.getByLabel('New address').fill(next);
  await address.getByLabel('Current password', { exact: true }).fill('not this one');
  await address.getByRole('button', { name: 'Ask for the change' }).click();
  await expect(address.getByText('Allowed: the current password of the account.')).toBeVisible();
  await expect(address.getByLabel('New address')).toHaveValue(next);
  await address.getByLabel('Current password', { exact: true }).fill(person.password);
  await address.getByRole('button', { name: 'Ask for the change' }).click();
  await expect(page.getByText(`The link sent to ${next} takes the address into use.`)).toBeVisible();

  const secret = page.getByRole('form', { name: 'Password' });
  await secret.getByLabel('Current password', { exact: true }).fill(person.password);
  await secret.getByLabel('New password', { exact: true }).fill('the tide is turning');
  await secret.getByRole('button', { name: 'Change the password' }).click();
  await expect(page.getByText('Your password was changed. All other sessions have ended.')).toBeVisible();

  await page.goto(linkIn(await mailTo(page.request, next, 'Confirm')));
  await page.getByRole('button', { name: 'Use the new address' }).click();
  await expect(page.getByText(`The account uses ${next} from now on.`)).toBeVisible();
  expect(await read<{ email: string }>(page.request, '/account')).toMatchObject({ email: next });
});

test('sessions are listed and ended, one or all others', async ({ page, context, browser }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await signIn(context, person);
  const others = [await browser.newContext(), await browser.newContext()];
  for (const other of others) await signIn(other, person);
  await page.goto('/account');
  const rows = page.getByRole('region', { name: 'Sessions' }).getByRole('row');
  await expect(rows).toHaveCount(4);
  await expect(rows.filter({ hasText: 'This one' })).toHaveCount(1);
  await page
    .getByRole('button', { name: /^End the session of/ })
    .first()
    .click();
  await expect(rows).toHaveCount(3);
  await page.getByRole('button', { name: 'End all others' }).click();
  await expect(rows).toHaveCount(2);
  await expect(page.getByRole('button', { name: 'End all others' })).toHaveAttribute('aria-disabled', 'true');
  const statuses = await Promise.all(
    others.map(async (other) =>
      (await other.request.get(`${process.env.STEPWELL_TEST_ADDRESS}/api/v1/account`)).status(),
    ),
  );
  expect(statuses).toEqual([401, 401]);
  for (const other of others) await other.close();
});

test('signing out forgets the person and leaves the wave on the bench', async ({ page, context }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await signIn(context, person);
  const team = await makeTeam(page.request, 'Night shift');
  await page.goto('/');
  await field(page, 'Name of the wave').fill('Stays here');
  await page.getByRole('link', { name: 'Tables', exact: true }).click();
  await expect(page).toHaveURL(new RegExp(`/teams/${team}/tables`));
  await page.getByRole('button', { name: `Account of ${person.name}` }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await expect(page.getByRole('banner').getByRole('link', { name: 'Sign in' })).toBeVisible();
  await expect(field(page, 'Name of the wave')).toHaveValue('Stays here');
  await page.goto('/account');
  await expect(page.getByText('Sign in first')).toBeVisible();
});

test('an account is deleted once its consequences are told', async ({ page, context }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await signIn(context, person);
  await makeTeam(page.request, 'Alone at the pier');
  await page.goto('/account');
  await page.getByRole('button', { name: 'Delete the account…' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog).toContainText(
    'Alone at the pier: you are its only member, so it is deleted with all its tables.',
  );
  await dialog.getByLabel('Current password', { exact: true }).fill('wrong one, sorry');
  await dialog.getByRole('button', { name: 'Delete it for good' }).click();
  await expect(dialog.getByText('Allowed: the current password of the account.')).toBeVisible();
  await dialog.getByLabel('Current password', { exact: true }).fill(person.password);
  await dialog.getByRole('button', { name: 'Delete it for good' }).click();
  await expect(page.getByText('Your account was deleted.')).toBeVisible();
  await page.goto('/sign-in');
  await field(page, 'E-mail address').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(person.password);
  await page.getByRole('main').getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByText('Address and password do not belong together.')).toBeVisible();
});

test('the last admin of a team with others cannot delete the account, and is told why', async ({
  page,
  context,
  browser,
}) => {
  const [person, mate] = [
    await makePerson(page.request, 'Ines Marlow'),
    await makePerson(page.request, 'Vera Quill'),
  ];
  await signIn(context, person);
  const team = await makeTeam(page.request, 'Two at the pier');
  const other = await browser.newContext();
  await signIn(other, mate);
  await join(page.request, team, mate, 'viewer', other.request);
  await page.goto('/account');
  await page.getByRole('button', { name: 'Delete the account…' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog).toContainText('Make somebody else an admin of Two at the pier first');
  await expect(dialog.getByRole('button', { name: 'Delete it for good' })).toHaveAttribute(
    'aria-disabled',
    'true',
  );
  await other.close();
});

test('a place that needs an account sends to sign in and comes back, and nowhere else', async ({ page }) => {
  const person = await makePerson(page.request, 'Ines Marlow');
  await page.goto('/teams/no-such-team/tables?tag=bell');
  await expect(page).toHaveURL(/\/sign-in\?to=%2Fteams%2Fno-such-team%2Ftables%3Ftag%3Dbell/);
  await page.goto('/sign-in?to=//elsewhere.example/');
  await field(page, 'E-mail address').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(person.password);
  await page.getByRole('main').getByRole('button', { name: 'Sign in' }).click();
  await expect(field(page, 'Name of the wave')).toBeVisible();
  expect(new URL(page.url()).origin).toBe(process.env.STEPWELL_TEST_ADDRESS);
});
