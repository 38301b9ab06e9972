import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { textOf } from '../support/bench-page.ts';
import {
  hear,
  join,
  mailTo,
  makePerson,
  makeTeam,
  post,
  saveTable,
  signIn,
  test,
} from '../support/library-page.ts';

/** Axe, and no pushing sideways, in both colours and on a phone. */
async function isOpenToAll(page: Page): Promise<void> {
  for (const [colorScheme, width] of [
    ['light', 1440],
    ['dark', 390],
  ] as const) {
    await page.emulateMedia({ colorScheme });
    await page.setViewportSize({ width, height: 900 });
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
  }
  await page.emulateMedia({ colorScheme: 'light' });
  await page.setViewportSize({ width: 1440, height: 900 });
}

test('a mailed notice is ended by its link, chosen again with the account, and what happened is in the trail', async ({
  page,
  context,
  browser,
  quiet,
}) => {
  test.setTimeout(120_000);
  const office = await browser.newContext();
  hear(office, quiet);
  const [admin, reviewer, viewer] = [
    await makePerson(page.request, 'Ada Keel'),
    await makePerson(page.request, 'Rhea Sound'),
    await makePerson(page.request, 'Vera Quill'),
  ];
  await signIn(office, admin);
  const team = await makeTeam(office.request, 'Fog room');
  for (const [person, role] of [
    [reviewer, 'reviewer'],
    [viewer, 'viewer'],
  ] as const) {
    const own = await browser.newContext();
    await signIn(own, person);
    await join(office.request, team, person, role, own.request);
    await own.close();
  }
  const { slug } = await saveTable(office.request, team, 'Fog signal');
  await post(office.request, `/teams/${team}/tables/${slug}/revisions/1/submit`, {
    message: 'Mind the steps.',
  });

  const mail = await mailTo(page.request, reviewer.email, 'Review asked for');
  expect(mail).toContain(`/teams/${team}/tables/${slug}/revisions/1/review`);
  const link = /\/unsubscribe#\S+/.exec(mail)?.[0] ?? '';
  await page.goto(link.slice(0, link.indexOf('#')));
  await expect(page.getByRole('heading', { name: 'This link is not whole' })).toBeVisible();
  await page.goto('/mailbox');
  await page.goto(`${link.slice(0, -3)}AAA`);
  await page.getByRole('button', { name: 'Send me no more of these' }).click();
  await expect(page.getByText('This link is not valid.')).toBeVisible();
  await page.goto('/mailbox');
  await page.goto(link);
  await expect(page.getByRole('heading', { level: 1, name: 'Notices: Reviews asked for' })).toBeVisible();
  await isOpenToAll(page);
  await page.getByRole('button', { name: 'Send me no more of these' }).press('Enter');
  await expect(page.getByRole('heading', { level: 1, name: 'No longer sent' })).toBeVisible();
  await expect(page.getByText('You get no more notices of the kind Reviews asked for.')).toBeVisible();

  await expect(page.getByRole('link', { name: 'your account' })).toHaveAttribute('href', '/account');
  await signIn(context, reviewer);
  await page.goto('/account');
  const notices = page.getByRole('region', { name: 'Notices' });
  const asked = notices.getByRole('switch', { name: 'Reviews asked for' });
  await expect(asked).not.toBeChecked();
  await expect(notices.getByRole('switch', { name: 'Verdicts' })).toBeChecked();
  await notices.getByRole('switch', { name: 'Comments' }).focus();
  await page.keyboard.press('Space');
  await expect(notices.getByRole('switch', { name: 'Comments' })).not.toBeChecked();
  await asked.press('Space');
  await expect(asked).toBeChecked();
  await page.reload();
  await expect(asked).toBeChecked();
  await expect(notices.getByRole('switch', { name: 'Comments' })).not.toBeChecked();

  await page.goto(`/teams/${team}`);
  await page.getByRole('link', { name: 'Audit trail' }).press('Enter');
  await expect(page.getByRole('heading', { level: 1, name: 'Audit trail' })).toBeVisible();
  const events = page.getByRole('main').locator('.audit-events > li');
  await expect(events).toHaveCount(7);
  await expect(events.first()).toContainText('Ada Keel submitted revision 1 of Fog signal');
  await expect(events.last()).toContainText('Ada Keel made the team Fog room');

  await events.first().getByText('Details').press('Enter');
  await expect(events.first()).toContainText('Mind the steps.');
  await isOpenToAll(page);
  await events
    .first()
    .getByRole('link', { name: `Only what was done to table:${slug}` })
    .click();
  await expect(page).toHaveURL(/subject=table%3Afog-signal/);
  await expect(events).toHaveCount(2);
  await page.getByRole('combobox', { name: 'What' }).selectOption({ label: 'Revisions: all' });
  await expect(events).toHaveCount(1);
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Download these as CSV' }).click(),
  ]);
  expect(download.suggestedFilename()).toBe(`audit-${team}.csv`);
  const lines = (await textOf(download)).trimEnd().split('\r\n');
  expect(lines).toHaveLength(2);
  expect(lines[1]).toContain('Ada Keel,revision.submitted,table:fog-signal,');

  await page.goBack();
  await expect(events).toHaveCount(2);
  await page.getByRole('button', { name: 'Clear the filters' }).click();
  await page.getByRole('combobox', { name: 'Who' }).selectOption('Rhea Sound');
  await expect(events).toHaveCount(1);
  await page.getByLabel('To', { exact: true }).fill('2001-01-01');
  await expect(page.getByText('No event fits these filters.')).toBeVisible();
  await page.reload();
  await expect(page.getByLabel('To', { exact: true })).toHaveValue('2001-01-01');
  await office.close();

  await context.clearCookies();
  await signIn(context, viewer);
  await page.goto(`/teams/${team}`);
  await expect(page.getByRole('heading', { level: 1, name: 'Fog room' })).toBeVisible();
  await expect(page.getByRole('link', { name: 'Audit trail' })).toBeHidden();
  await page.goto(`/teams/${team}/audit`);
  await expect(page.getByText('This takes the role reviewer; yours in')).toBeVisible();
});
