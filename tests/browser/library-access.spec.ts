import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import {
  linkIn,
  mailTo,
  makePerson,
  makeTeam,
  post,
  saveRevision,
  saveTable,
  signIn,
  test,
} from '../support/library-page.ts';

const widths = [
  { width: 1440, height: 900 },
  { width: 390, height: 844 },
];

/** A page as it stands, in light and dark, on a wide screen and on a phone. */
async function isOpenToAll(page: Page): Promise<void> {
  for (const viewport of [...widths].reverse()) {
    await page.setViewportSize(viewport);
    for (const colorScheme of ['dark', 'light'] as const) {
      await page.emulateMedia({ colorScheme });
      // In the page itself: there are no frames to bring together.
      const { violations } = await new AxeBuilder({ page }).setLegacyMode().analyze();
      const found = violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)]);
      expect(found, `${page.url()}, ${viewport.width} wide, ${colorScheme}`).toEqual([]);
      const needed = await page.evaluate(() => document.documentElement.scrollWidth);
      expect(needed, page.url()).toBeLessThanOrEqual(viewport.width);
    }
  }
}

/** Has a token's form and belongs to nobody. */
const noToken = 'A'.repeat(43);

/** A team with tables and an invitation that is open. */
async function library(page: Page) {
  const person = await makePerson(page.request, 'Ada Keel');
  await signIn(page.context(), person);
  const team = await makeTeam(page.request, 'Ninth Fathom');
  const table = await saveTable(page.request, team, 'Fog signal', { tags: ['fog', 'tone'], note: 'First.' });
  await saveRevision(page.request, team, table, { name: 'Fog signal', bits: 10, note: 'Second.' });
  await saveTable(page.request, team, 'Lamp fade', { tags: ['lamp'] });
  await post(page.request, `/teams/${team}/invitations`, {
    email: 'guest@ninthfathom.example',
    role: 'viewer',
  });
  return { person, team, table };
}

test('the places of an account have no barrier that axe finds', async ({ page }) => {
  test.setTimeout(240_000);
  for (const [path, heading] of [
    ['/sign-up', 'Make an account'],
    ['/sign-in', 'Sign in'],
    ['/forgot-password', 'Set a new password'],
    [`/verify#${noToken}`, 'Verify your address'],
    [`/reset-password#${noToken}`, 'Set a new password'],
    [`/confirm-address#${noToken}`, 'Use this address'],
    ['/verify#cut', 'This link is not whole'],
    ['/tables', 'Sign in first'],
    ['/http-api', 'HTTP API'],
  ]) {
    await page.goto(path);
    await expect(page.getByRole('heading', { name: heading }).first()).toBeVisible();
    if (path === '/sign-up') await page.getByRole('button', { name: 'Make the account' }).click();
    if (path === '/http-api')
      await page.locator('details > summary').filter({ hasText: 'Save a definition' }).first().click();
    await isOpenToAll(page);
  }
  const { person } = await library(page);
  await post(page.request, '/account/forgot-password', { email: person.email });
  await mailTo(page.request, person.email, 'Set a new password');
  await page.goto('/mailbox');
  await page.getByRole('link', { name: 'Set a new password' }).first().click();
  await expect(page.getByRole('article')).toBeVisible();
  await isOpenToAll(page);
  const link = linkIn(await mailTo(page.request, 'guest@ninthfathom.example', 'Invitation'));
  for (const path of ['/account', '/new-team', link]) {
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    await expect(page.getByText(/^(Reading|Opening)/)).toHaveCount(0);
    await isOpenToAll(page);
  }
});

test('the places of a team have no barrier that axe finds', async ({ page }) => {
  test.setTimeout(240_000);
  const { team, table } = await library(page);
  await page.goto(`/teams/${team}`);
  await expect(page.getByText('guest@ninthfathom.example')).toBeVisible();
  await isOpenToAll(page);

  await page.goto(`/teams/${team}/tables`);
  await expect(page.getByRole('link', { name: 'Fog signal' })).toBeVisible();
  await isOpenToAll(page);
  await page.goto(`/teams/${team}/tables?search=nothing`);
  await expect(page.getByText('No table passes these filters')).toBeVisible();
  await isOpenToAll(page);

  await page.goto(`/teams/${team}/tables/${table.slug}`);
  await expect(page.getByRole('figure', { name: 'Spectrum', exact: true })).toBeVisible();
  await page.getByRole('button', { name: 'Show the files' }).click();
  await expect(page.getByRole('tab').first()).toBeVisible();
  await isOpenToAll(page);
  await page.getByRole('button', { name: 'Rename and tag' }).click();
  await isOpenToAll(page);

  await page.goto(`/teams/${team}/tables/${table.slug}/revisions/1/bench`);
  await expect(page.getByText('This is revision 1 of')).toBeVisible();
  await page.getByRole('button', { name: 'Save revision' }).click();
  await expect(page.getByRole('dialog').getByRole('textbox', { name: 'Note' })).toBeVisible();
  await isOpenToAll(page);
  await page.getByRole('dialog').getByRole('button', { name: 'As a new table' }).click();
  await isOpenToAll(page);
});
