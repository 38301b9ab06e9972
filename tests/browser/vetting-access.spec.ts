import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { post, saveRevision, saveTable, readTable, signIn, test } from '../support/library-page.ts';
import { decide, makeCrew, submit } from '../support/vetting-page.ts';

async function isOpenToAll(page: Page, width: number): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
}

let made: { team: string; admin: Parameters<typeof signIn>[1] } | undefined;

/** One team for all of them: what a page looks like does not change it. */
async function reviewed(page: Page, quiet: string[]) {
  if (made === undefined) {
    const browser = page.context().browser();
    if (browser === null) throw new Error('This page has no browser of its own.');
    const crew = await makeCrew(browser, quiet, { author: 'author' });
    const { team, admin, author } = crew;
    const own = author.context.request;
    await post(admin.context.request, `/teams/${team}/limit-sets`, {
      tag: null,
      limits: { minSnrDb: 60, maxClipped: 0, bits: [8, 10] },
    });
    const { slug } = await saveTable(own, team, 'Fog signal', { bits: 8 });
    await submit(own, team, slug);
    await decide(admin.context.request, team, slug, 1, { verdict: 'vetted', note: 'For the trial.' });
    await saveRevision(own, team, await readTable(own, team, slug), { name: 'Fog signal 2', bits: 10 });
    await submit(own, team, slug, 2);
    await post(own, `/teams/${team}/tables/${slug}/revisions/2/comments`, {
      text: 'More.',
      path: 'table.bits',
    });
    const gone = await saveTable(own, team, 'Lamp fade');
    await submit(own, team, gone.slug);
    await decide(admin.context.request, team, gone.slug, 1, { verdict: 'vetted', note: 'Good.' });
    await decide(admin.context.request, team, gone.slug, 1, { reason: 'It flickers.' }, 'withdraw');
    await crew.close();
    made = { team, admin: admin.person };
  }
  await signIn(page.context(), made.admin);
  return made;
}

// Colours do not depend on the width: two of the four pairs show each of them, and each width.
for (const [colorScheme, viewport] of [
  ['light', { width: 1440, height: 900 }],
  ['dark', { width: 390, height: 844 }],
] as const) {
  test.describe(`${colorScheme}, ${viewport.width} wide`, () => {
    test.use({ colorScheme, viewport });
    const { width } = viewport;

    test('the places of vetting have no barrier that axe finds', async ({ page, quiet }) => {
      test.setTimeout(120_000);
      const { team } = await reviewed(page, quiet);
      await page.goto(`/teams/${team}/reviews`);
      await expect(page.getByRole('link', { name: 'Fog signal, revision 2' })).toBeVisible();
      await isOpenToAll(page, width);
      await page.goto(`/teams/${team}/reviews?show=mine`);
      await expect(page.getByText('You have submitted nothing yet')).toBeVisible();
      await isOpenToAll(page, width);

      await page.goto(`/teams/${team}/tables/fog-signal/revisions/2/review`);
      await expect(page.getByRole('figure', { name: 'Both spectra' })).toBeVisible();
      await expect(page.getByRole('list', { name: 'Comments on Bit depth' })).toBeVisible();
      await page.getByRole('button', { name: 'Comment on Bit depth' }).click();
      await page.getByRole('radio', { name: 'Return it' }).check();
      await page.getByRole('button', { name: 'Return it' }).click();
      await expect(page.getByText('as a return needs its reasons')).toBeVisible();
      await page.locator('details > summary').filter({ hasText: 'differences' }).click();
      await isOpenToAll(page, width);

      await page.goto(`/teams/${team}/tables/lamp-fade/revisions/1/review`);
      await expect(page.getByRole('region', { name: 'How it is set' })).toBeVisible();
      await isOpenToAll(page, width);
      await page.goto(`/teams/${team}/compare?a=fog-signal:1&b=lamp-fade:1`);
      await expect(page.getByRole('figure', { name: 'Both spectra' })).toBeVisible();
      await isOpenToAll(page, width);

      await page.goto(`/teams/${team}/tables/lamp-fade`);
      await expect(page.getByText('Withdrawn: do not build it in.')).toBeVisible();
      await isOpenToAll(page, width);
      await page.goto(`/teams/${team}/tables/fog-signal?revision=1`);
      await page.getByRole('button', { name: 'Withdraw' }).click();
      await isOpenToAll(page, width);

      await page.goto(`/teams/${team}`);
      await expect(page.getByRole('switch', { name: 'Somebody else must judge' })).toBeVisible();
      await page.getByRole('button', { name: 'Change the limits of all tables' }).click();
      await isOpenToAll(page, width);
      await page.goto('/');
      await page.locator('.bench-limits > summary').click();
      await isOpenToAll(page, width);
    });
  });
}
