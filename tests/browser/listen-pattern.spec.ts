import AxeBuilder from '@axe-core/playwright';
import { expect, test as soundTest, type Page } from '@playwright/test';
import { test } from '../support/bench-page.ts';
import { heardOf, overhear } from '../support/listening.ts';

const part = (page: Page) => page.getByRole('group', { name: 'Pulses and pauses', exact: true });
const on = (page: Page, step: number) => part(page).getByRole('textbox', { name: `On of step ${step},` });
const button = (page: Page, name: string) => part(page).getByRole('button', { name, exact: true });
const drawing = (page: Page) => part(page).getByRole('img', { name: /^Pattern over time/ });

async function openPattern(page: Page): Promise<void> {
  await page.goto('/?open=output&more=pattern');
  await expect(button(page, 'Even beat')).toBeVisible();
}

test('a pattern is made and changed by the keyboard alone, taken back, and kept', async ({ page }) => {
  await openPattern(page);
  await expect(part(page).getByText('No pattern is kept with this table')).toBeVisible();
  await button(page, 'Two short, one long').press('Enter');
  await expect(drawing(page)).toHaveAccessibleName(/2 steps, 3 pulses: of 1,200 ms it sounds 900 ms, 75 %/);

  // What is typed and not allowed stays, goes along with its step, and the pattern keeps its last number.
  await on(page, 2).fill('60001');
  await expect(part(page).getByText('allowed: a whole number from 1 to 60000')).toBeVisible();
  await page.keyboard.press('Alt+ArrowUp');
  await expect(on(page, 1)).toHaveValue('60001');
  await expect(on(page, 1)).toBeFocused();
  await expect(on(page, 2)).toHaveValue('150');
  await expect(part(page).getByText('Step 2 is step 1 now.')).toBeAttached();
  await page.keyboard.press('Control+a');
  await page.keyboard.type('500');
  await page.keyboard.press('ArrowUp');
  await expect(on(page, 1)).toHaveValue('510');
  await expect(drawing(page)).toHaveAccessibleName(/2 steps, 3 pulses: of 1,110 ms it sounds 810 ms/);

  await button(page, 'Add a step after step 2').press('Enter');
  await expect(drawing(page)).toHaveAccessibleName(/3 steps, 5 pulses/);
  await button(page, 'Remove step 1').press('Space');
  await expect(drawing(page)).toHaveAccessibleName(/2 steps, 4 pulses: of 1,200 ms/);
  await part(page).getByRole('switch', { name: 'Endless' }).press('Space');
  await expect(drawing(page)).toHaveAccessibleName(/Then from the beginning, for ever/);
  await page.keyboard.press('Control+z');
  await expect(drawing(page)).toHaveAccessibleName(/Then silence/);
  await page.keyboard.press('Control+z');
  await expect(drawing(page)).toHaveAccessibleName(/3 steps, 5 pulses/);
  await expect(on(page, 1)).toHaveValue('510');

  await page.waitForTimeout(400);
  await page.reload();
  await expect(drawing(page)).toHaveAccessibleName(/3 steps, 5 pulses/);
});

test('the export carries the pattern that is kept, and leaves it out where that is asked for', async ({
  page,
}) => {
  await openPattern(page);
  await button(page, 'Quick pairs').click();
  await page.goto('/?open=export');
  await page.getByRole('combobox', { name: 'Target' }).selectOption('c99');
  const header = page.getByRole('tab', { name: 'fog_signal_tone_pulses.h' });
  await header.click();
  await expect(page.getByText('2 steps, 1200 ms a pass, endless')).toBeVisible();
  await expect(page.getByText("--pulses '80/110 80/930 endless' --out .")).toBeVisible();
  await page.getByRole('button', { name: 'Leave them out' }).click();
  await expect(header).toBeHidden();
  await expect(page.getByText('--pulses none --out .')).toBeVisible();
  await page.getByRole('button', { name: 'Put them in' }).click();
  await expect(header).toBeVisible();
  await page.getByRole('textbox', { name: 'Pulses and pauses' }).fill('0/5');
  await expect(page.getByText('Allowed: in step 1, on from 1 to 60000 ms.')).toBeVisible();
  await page.getByRole('textbox', { name: 'Pulses and pauses' }).fill('');
  await page.getByRole('combobox', { name: 'Target' }).selectOption('wav');
  await expect(page.getByText(/^WAV sound of the codes carries no pulses and pauses/)).toBeVisible();
});

// What overhears is deprecated, which the browser says on the console.
soundTest('it is heard in its pulses, each as long as it says', async ({ page }) => {
  await overhear(page);
  await openPattern(page);
  await button(page, 'Even beat').click();
  await on(page, 1).fill('200');
  await part(page).getByRole('textbox', { name: 'Off of step 1,' }).fill('300');
  await button(page, 'Play the pattern').press('Enter');
  await expect(page.getByText('Pulses and pauses decides what sounds.')).toBeVisible();
  await expect
    .poll(async () => (await heardOf(page).frames()).some((sample) => Math.abs(sample) > 1e-4))
    .toBe(true);
  await heardOf(page).forget();
  await page.waitForTimeout(3400);
  const frames = await heardOf(page).frames();
  await button(page, 'Stop the pattern').press('Enter');
  await expect(button(page, 'Play the pattern')).toBeVisible();

  // What overhears loses a buffer now and then, as the machine has it: medians do not mind.
  const perMs = (await rateOf(page)) / 1000;
  const edges = gateEdges(frames, Math.round(3 * perMs));
  const lasting = (isOn: boolean) =>
    edges.slice(1).flatMap(({ at }, k) => (edges[k].isOn === isOn ? [(at - edges[k].at) / perMs] : []));
  const starts = edges.filter(({ isOn }) => isOn).map(({ at }) => at / perMs);
  const periods = starts.slice(1).map((at, k) => at - starts[k]);
  expect(periods.length).toBeGreaterThanOrEqual(4);
  expect(Math.abs(median(periods) - 500), periods.join()).toBeLessThan(4);
  // The ramps at both ends of a pulse are 5 ms long.
  expect(Math.abs(median(lasting(true)) - 200), lasting(true).join()).toBeLessThan(8);
  expect(Math.abs(median(lasting(false)) - 300), lasting(false).join()).toBeLessThan(8);
});

const median = (values: readonly number[]) =>
  [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];

/** Frames a second of the context that plays. */
const rateOf = (page: Page) =>
  page.evaluate(
    () => (window as unknown as { heard: { contexts: AudioContext[] } }).heard.contexts[0].sampleRate,
  );

/** Where the level over blocks of so many frames crosses a third of its highest. */
function gateEdges(frames: readonly number[], block: number): { at: number; isOn: boolean }[] {
  const levels = Array.from({ length: Math.floor(frames.length / block) }, (_, k) =>
    frames.slice(k * block, (k + 1) * block).reduce((most, sample) => Math.max(most, Math.abs(sample)), 0),
  );
  const threshold = levels.reduce((a, b) => Math.max(a, b)) / 3;
  const edges: { at: number; isOn: boolean }[] = [];
  levels.slice(1).forEach((level, k) => {
    const isOn = level > threshold;
    if (isOn !== levels[k] > threshold) edges.push({ at: (k + 1) * block, isOn });
  });
  return edges;
}

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`${colorScheme}, 390 wide`, () => {
    test.use({ colorScheme, viewport: { width: 390, height: 844 } });

    test('the editor has no barrier that axe finds, nor any sideways scroll', async ({ page }) => {
      await openPattern(page);
      await button(page, 'Growing longer').click();
      await on(page, 4).fill('-1');
      await button(page, 'Explain Pattern').press('Enter');
      const { violations } = await new AxeBuilder({ page }).include('.bench-flights').analyze();
      expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
    });
  });
}
