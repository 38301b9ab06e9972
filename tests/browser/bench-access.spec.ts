import AxeBuilder from '@axe-core/playwright';
import { expect } from '@playwright/test';
import { drawings, field, figure, flight, problems, test } from '../support/bench-page.ts';

test('the way down all four flights goes by keyboard alone', async ({ page }) => {
  await page.goto('/');
  await expect(figure(page, 'SNR')).toBeVisible();
  await page.keyboard.press('2');
  await expect(flight(page, 'Quantise')).toBeFocused();
  await expect(flight(page, 'Quantise')).toHaveAttribute('aria-expanded', 'true');
  for (let step = 0; step < 3; step += 1) await page.keyboard.press('Tab');
  await expect(page.locator(':focus')).not.toHaveAttribute('aria-expanded', 'true');
  await field(page, 'Bit depth').focus();
  await page.keyboard.press('ArrowUp');
  await expect(figure(page, 'Codes used')).toContainText('of 512');
  await field(page, 'Bit depth').press('4');
  await expect(field(page, 'Bit depth')).toHaveValue(/4/);
  await page.keyboard.press('Control+z');
  await expect(field(page, 'Bit depth')).toHaveValue('8');

  await flight(page, 'Output').focus();
  await page.keyboard.press('Enter');
  await expect(page.getByRole('button', { name: 'Play' })).toBeVisible();
  await page.keyboard.press('4');
  await expect(flight(page, 'Export')).toBeFocused();
  await expect(page.getByRole('tab', { name: 'fog_signal_tone.h' })).toBeVisible();
  await page.getByRole('tab', { name: 'fog_signal_tone.h' }).focus();
  await page.keyboard.press('ArrowRight');
  await expect(page.getByRole('tab', { name: 'fog_signal_tone.c' })).toBeFocused();
  await page.keyboard.press('?');
  await expect(page.getByRole('dialog', { name: 'Keys' })).toContainText('Copy a read-only link to the wave');
  await page.keyboard.press('Escape');
});

test('single keys can be turned off, in every tab and for the next visit; the sheet stays within reach', async ({
  page,
  context,
}) => {
  await page.goto('/?open=output');
  await expect(page.getByRole('button', { name: 'Play', exact: true })).toBeVisible();
  const other = await context.newPage();
  await other.goto('/');
  await expect(figure(other, 'SNR')).toBeVisible();

  await page.keyboard.press('?');
  const sheet = page.getByRole('dialog', { name: 'Keys' });
  await expect(sheet).toContainText('Play or stop');
  await sheet.getByText('Single-key shortcuts').click();
  await expect(sheet).not.toContainText('Play or stop');
  await expect(sheet).toContainText('Undo');
  await page.keyboard.press('Escape');

  for (const tab of [page, other]) {
    for (const key of ['2', 'l', 'p', '?']) await tab.keyboard.press(key);
    await expect(flight(tab, 'Quantise')).toHaveAttribute('aria-expanded', 'false');
    await expect(tab.getByText('Link copied')).toBeHidden();
    await expect(tab.getByRole('dialog')).toBeHidden();
  }
  await expect(page.getByRole('button', { name: 'Play', exact: true })).toBeVisible();
  await field(page, 'Name of the wave').fill('x');
  await page.keyboard.press('Control+z');
  await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');

  await page.reload();
  await expect(figure(page, 'SNR')).toBeVisible();
  await page.keyboard.press('2');
  await expect(flight(page, 'Quantise')).toHaveAttribute('aria-expanded', 'false');
  await page.getByRole('button', { name: 'Keys' }).click();
  await sheet.getByText('Single-key shortcuts').click();
  await page.keyboard.press('Escape');
  await page.keyboard.press('2');
  await expect(flight(page, 'Quantise')).toHaveAttribute('aria-expanded', 'true');
});

for (const colorScheme of ['light', 'dark'] as const) {
  for (const viewport of [
    { width: 1440, height: 900 },
    { width: 390, height: 844 },
  ]) {
    test.describe(`${colorScheme}, ${viewport.width} wide`, () => {
      test.use({ colorScheme, viewport });

      test('the bench has no barrier that axe finds, nor any sideways scroll', async ({ page }) => {
        await page.goto('/?open=shape,quantise,output,export');
        await expect(page.getByRole('tab', { name: 'fog_signal_tone.h' })).toBeVisible();
        await field(page, 'Bit depth').fill('17');
        await expect(problems(page)).toBeVisible();
        const { violations } = await new AxeBuilder({ page }).analyze();
        expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
        expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(
          viewport.width,
        );
      });

      test('drawings and flights stand in the order that the keyboard goes', async ({ page }) => {
        await page.goto('/');
        const places = page.locator('.bench > .bench-drawings, .bench > .bench-flights');
        await expect(drawings(page)).toBeVisible();
        const last = await places.last().getAttribute('class');
        expect(last).toContain(viewport.width > 1024 ? 'bench-drawings' : 'bench-flights');
      });
    });
  }
}
