import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { exampleBoardInput } from '../../src/boards/example-board.ts';
import { beginWithTeam, post, test } from '../support/library-page.ts';
import { openListening, play, stop } from '../support/listening.ts';

const heard = (page: Page, name: string) => page.getByRole('radio', { name, exact: true });
const summary = (page: Page) => page.locator('.plot-heard figcaption');

/** Levels of the five strongest lines as the live spectrum's words give them: by frequency, predicted and heard. */
async function toldLines(page: Page) {
  await expect(summary(page)).toContainText('heard at');
  const words = (await summary(page).innerText()).replace(/\s/g, ' ').replaceAll('−', '-');
  return [...words.matchAll(/([\d.]+) (k?)Hz (-[\d.]+) dBFS, heard at (-[\d.]+) dBFS/g)].map(
    ([, hz, kilo, predicted, level]) => ({
      hz: Number(hz) * (kilo === 'k' ? 1_000 : 1),
      predicted: Number(predicted),
      level: Number(level),
    }),
  );
}

test.describe('the listen panel', () => {
  test('plays the table through the chosen board where their bits agree, and offers to make them', async ({
    page,
  }) => {
    const { team } = await beginWithTeam(page);
    const board = {
      ...exampleBoardInput(10),
      name: 'Buoy board',
      output: { kind: 'on-chip', bits: 10, outputOhms: 1_000 },
    };
    await post(page.request, `/teams/${team}/boards`, { board, note: '' });
    await page.goto(`/?open=output&board=${team}/buoy-board`);
    await expect(heard(page, 'Through the converter')).toBeDisabled();
    await expect(heard(page, 'After the output stage')).toBeDisabled();
    await expect(page.getByText('The output takes codes of 10 bits; the table has 8 bits.')).toBeVisible();
    await page.getByRole('button', { name: 'Use 10 bits' }).click();
    await heard(page, 'Through the converter').check();
    await expect(page.getByText('The steps by the levels of the board. Board: Buoy board.')).toBeVisible();
    await play(page).click();
    await expect(page.getByText('Playing the table through the converter as a loop.')).toBeVisible();
    const before = await toldLines(page);

    // Its filter of 8 kHz takes 0.3 dB at 2.2 kHz and more above; the lines of the first partial stay.
    await heard(page, 'After the output stage').check();
    await expect(page.getByText('Playing the table after the output stage as a loop.')).toBeVisible();
    await expect(async () => {
      const after = await toldLines(page);
      const top = after.at(-1);
      const same = before.find(({ hz }) => hz === top?.hz);
      expect(top?.level ?? 0).toBeLessThan((same?.level ?? 0) - 0.05);
      for (const { predicted, level } of after) expect(Math.abs(predicted - level)).toBeLessThan(1);
    }).toPass({ timeout: 8_000 });
  });

  test('its words name the five partials as predicted and as heard, within 1 dB', async ({ page }) => {
    await openListening(page);
    await expect(summary(page)).toContainText('nothing sounds');
    await page.getByRole('textbox', { name: 'Tone' }).fill('440');
    await play(page).click();
    await page.waitForTimeout(1_500);
    const lines = await toldLines(page);
    expect(lines).toHaveLength(5);
    for (const { hz, predicted, level } of lines) {
      expect(hz % 440).toBe(0);
      expect(predicted).toBeLessThan(-18);
      expect(Math.abs(predicted - level), `line at ${hz} Hz`).toBeLessThan(1);
    }
    // What is predicted follows the volume.
    await page.getByRole('slider', { name: 'Volume' }).fill('-16');
    await expect(async () => {
      const quiet = await toldLines(page);
      expect(quiet[0].predicted).toBeCloseTo(lines[0].predicted - 10, 1);
      expect(Math.abs(quiet[0].level - quiet[0].predicted)).toBeLessThan(1);
    }).toPass({ timeout: 8_000 });
  });

  test('stops in a hidden tab, unless it is told to go on', async ({ page }) => {
    await openListening(page);
    const hide = (isHidden: boolean) =>
      page.evaluate((hidden) => {
        Object.defineProperty(document, 'hidden', { value: hidden, configurable: true });
        document.dispatchEvent(new Event('visibilitychange'));
      }, isHidden);
    await play(page).click();
    await expect(stop(page)).toBeVisible();
    await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
    await hide(true);
    await expect(page.getByText('It stopped because this tab was hidden.')).toBeVisible();
    await hide(false);
    await expect(play(page)).toBeVisible();

    const choice = page.getByRole('switch', { name: 'Stop when this tab is hidden' });
    await expect(choice).toBeChecked();
    await page.getByText('Stop when this tab is hidden').click();
    await page.reload();
    await expect(choice).not.toBeChecked();
    await play(page).click();
    await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
    await hide(true);
    await page.waitForTimeout(300);
    await expect(stop(page)).toBeVisible();
  });

  test('the accumulator is a way of playing where one is chosen and the length allows it', async ({
    page,
  }) => {
    await page.goto('/?open=quantise,output&more=accumulator');
    await expect(page.getByRole('heading', { name: 'Listen' })).toBeVisible();
    await expect(heard(page, 'By the phase accumulator')).toBeHidden();
    await page.getByRole('button', { name: 'Keep with the wave and set the export’s options' }).click();
    await heard(page, 'By the phase accumulator').check();
    await expect(page.getByText(/^Step word \d+ of 24 bits at this sample rate gives 220/)).toBeVisible();
    await play(page).click();
    await expect(page.getByText('Playing the quantised table by the phase accumulator.')).toBeVisible();
    await page.waitForTimeout(1_000);
    for (const { predicted, level } of await toldLines(page))
      expect(Math.abs(predicted - level)).toBeLessThan(1);

    await page.getByRole('textbox', { name: 'Table length' }).fill('200');
    await expect(heard(page, 'By the phase accumulator')).toBeDisabled();
    await expect(
      page.getByText('the table length must be a power of two, and 200 is none.', { exact: false }),
    ).toBeVisible();
    await expect(heard(page, 'As a loop')).toBeChecked();
  });

  test('goes by the keyboard alone', async ({ page }) => {
    await page.goto('/');
    await page.getByRole('figure', { name: 'Spectrum', exact: true }).waitFor();
    // Before the panel has ever been open, the stop is all that shows.
    await page.keyboard.press('p');
    const flag = page.getByRole('region', { name: 'Sound' });
    await expect(flag.getByRole('button', { name: 'Stop' })).toBeVisible();
    await page.keyboard.press('p');
    await expect(flag).toBeHidden();

    await page.keyboard.press('3');
    await expect(page.getByRole('heading', { name: 'Listen' })).toBeVisible();
    await play(page).focus();
    await page.keyboard.press('Space');
    await expect(stop(page)).toBeFocused();
    await page.keyboard.press('Tab');
    await expect(heard(page, 'Quantised table')).toBeFocused();
    await page.keyboard.press('ArrowRight');
    await expect(heard(page, 'Through the ladder')).toBeChecked();
    await expect(page.getByText('Playing the table through the ladder as a loop.')).toBeVisible();
    await page.keyboard.press('Tab');
    await expect(page.getByRole('slider', { name: 'Volume' })).toBeFocused();
    await page.keyboard.press('ArrowLeft');
    await expect(page.getByText('full scale peaks at −19 dBFS')).toBeVisible();

    await page.locator('summary').filter({ hasText: 'Bits by ear' }).focus();
    await page.keyboard.press('Enter');
    await expect(page).toHaveURL(/more=bits/);
    await page.getByRole('slider', { name: 'Off from the bottom up' }).press('ArrowRight');
    await expect(page.getByText('Bits by ear decides what sounds.')).toBeVisible();
    await page.getByRole('button', { name: 'Give back' }).press('Enter');
    await expect(page.getByText('Bits by ear decides what sounds.')).toBeHidden();
    await expect(page.getByText('Playing the table through the ladder as a loop.')).toBeVisible();
    await page.keyboard.press('p');
    await expect(play(page)).toBeVisible();
  });

  test.describe('of a wave that is read-only', () => {
    test.use({ permissions: ['clipboard-read', 'clipboard-write'] });

    test('plays the curve and the table, and has the parts that need no bench', async ({ page }) => {
      await page.goto('/');
      await page.getByRole('button', { name: 'Copy link' }).click();
      await expect(page.getByText('Link copied.')).toBeVisible();
      await page.goto(await page.evaluate(() => navigator.clipboard.readText()));
      await expect(page.getByText('A shared wave, read-only')).toBeVisible();
      await expect(heard(page, 'Ideal curve')).toBeVisible();
      await expect(heard(page, 'Through the ladder')).toBeHidden();
      const parts = page.locator('.listen .recess-title');
      await expect(parts).toHaveText(['Where it is heard', 'Bits by ear', 'Keys and notes', 'Keep a sound']);
      await heard(page, 'Ideal curve').check();
      await play(page).click();
      await expect(page.getByText('Playing the ideal curve as a loop.')).toBeVisible();
      await page.getByRole('radio', { name: 'Once through' }).check();
      await expect(summary(page)).toContainText('One pass has no lines of its own to predict.');
    });
  });
});

test('the sounding panel has no barrier that axe finds, nor any sideways scroll, light and dark, wide and narrow', async ({
  page,
}) => {
  await openListening(page);
  await play(page).click();
  await expect(page.getByRole('table', { name: /Strongest lines/ })).toBeVisible();
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: 900 });
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      const { violations } = await new AxeBuilder({ page }).include('.listen').analyze();
      expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
    }
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
  }
});
