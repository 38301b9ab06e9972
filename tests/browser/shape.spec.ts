import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Locator, type Page } from '@playwright/test';

const bar = (page: Page, harmonic: number) =>
  page.getByRole('slider', { name: `Harmonic ${harmonic}`, exact: true });
const undo = (page: Page) => page.getByRole('button', { name: 'Undo' });

async function valueOf(slider: Locator): Promise<number> {
  return Number(await slider.getAttribute('aria-valuenow'));
}

/** Middle of a bar, at a height of −1…1 of the field's scale. */
async function placeOn(slider: Locator, height: number): Promise<[number, number]> {
  await slider.scrollIntoViewIfNeeded();
  const box = await slider.boundingBox();
  if (box === null) throw new Error('The bar is not on the page.');
  return [box.x + box.width / 2, box.y + box.height * (0.5 - 0.46 * height)];
}

async function openShape(page: Page): Promise<void> {
  await page.goto('/');
  await expect(bar(page, 1)).toBeVisible();
}

test.describe('harmonics', () => {
  test('a drag across draws many bars in one stroke, and one undo takes it back', async ({ page }) => {
    await openShape(page);
    const before = await Promise.all([1, 2, 3, 4, 5, 6].map((n) => valueOf(bar(page, n))));
    const [x1, y1] = await placeOn(bar(page, 2), 0.8);
    const [x2, y2] = await placeOn(bar(page, 6), -0.4);
    await page.mouse.move(x1, y1);
    await page.mouse.down();
    await page.mouse.move(x2, y2, { steps: 12 });
    await page.mouse.up();
    const drawn = await Promise.all([2, 3, 4, 5, 6].map((n) => valueOf(bar(page, n))));
    expect(drawn[0]).toBeGreaterThan(0.6);
    expect(drawn[4]).toBeCloseTo(-0.4, 1);
    for (let i = 1; i < drawn.length; i += 1) expect(drawn[i]).toBeLessThan(drawn[i - 1]);
    await expect(page.getByText('7 partials', { exact: true })).toBeVisible();

    await undo(page).click();
    expect(await Promise.all([1, 2, 3, 4, 5, 6].map((n) => valueOf(bar(page, n))))).toEqual(before);
  });

  test('keys walk the bars, set them, open the exact field and take a partial away', async ({ page }) => {
    await openShape(page);
    await bar(page, 1).focus();
    await page.keyboard.press('ArrowRight');
    await expect(bar(page, 2)).toBeFocused();
    await expect(bar(page, 2)).toHaveAttribute('aria-valuetext', 'harmonic 2, amplitude 0.62');
    await page.keyboard.press('ArrowUp');
    await page.keyboard.press('Shift+ArrowDown');
    await expect(bar(page, 2)).toHaveAttribute('aria-valuetext', 'harmonic 2, amplitude 0.53');
    await page.keyboard.press('End');
    await expect(bar(page, 16)).toBeFocused();
    await page.keyboard.press('Home');
    await expect(bar(page, 1)).toBeFocused();
    await page.keyboard.press('ArrowRight');

    await page.keyboard.type('0.3x');
    const exact = page.getByRole('textbox', { name: 'Harmonic 2', exact: true });
    await page.keyboard.press('Enter');
    await expect(page.getByText('“0.3x” is not allowed')).toBeVisible();
    await expect(exact).toHaveValue('0.3x');
    await exact.fill('-6 dB');
    await page.keyboard.press('Enter');
    await expect(bar(page, 2)).toBeFocused();
    expect(await valueOf(bar(page, 2))).toBeCloseTo(0.501187, 6);

    await page.keyboard.type('9');
    await page.keyboard.press('Escape');
    expect(await valueOf(bar(page, 2))).toBeCloseTo(0.501187, 6);
    await page.keyboard.press('Delete');
    expect(await valueOf(bar(page, 2))).toBe(0);
    await expect(page.getByRole('textbox', { name: /^Harmonic of partial/ })).toHaveCount(4);
  });

  test('what the table cannot hold is marked, in the bars and in the list', async ({ page }) => {
    await openShape(page);
    await page.locator('#quantise').getByRole('button').first().click();
    await page.getByRole('textbox', { name: 'Table length' }).fill('16');
    // 2·8 ≥ 16: harmonic 8 does not fit, 7 does.
    await expect(bar(page, 8)).toHaveAttribute(
      'aria-valuetext',
      'harmonic 8, amplitude 0.12, left out, above what the table holds',
    );
    await expect(bar(page, 7)).toHaveAttribute('aria-valuetext', 'harmonic 7, amplitude 0');
    const row = page
      .getByRole('row')
      .filter({ has: page.getByRole('textbox', { name: 'Harmonic of partial 5' }) });
    await expect(row.getByText('left out')).toBeVisible();
  });

  test('standard shapes fill the table or stop where told, and change while they are as they were set', async ({
    page,
  }) => {
    await openShape(page);
    await page.getByRole('button', { name: 'Square' }).click();
    await expect(page.getByText('64 partials', { exact: true })).toBeVisible();
    await page.getByRole('radio', { name: 'Up to a number' }).check();
    await page.getByRole('textbox', { name: 'Highest harmonic' }).fill('9');
    await expect(page.getByText('5 partials', { exact: true })).toBeVisible();
    expect(await valueOf(bar(page, 9))).toBeCloseTo(4 / (9 * Math.PI), 9);

    await page.getByRole('button', { name: 'Pulse' }).click();
    await page.getByRole('textbox', { name: 'Duty of the pulse' }).fill('50');
    await expect(page.getByText('5 partials', { exact: true })).toBeVisible();
    await bar(page, 3).focus();
    await page.keyboard.press('ArrowUp');
    await expect(page.getByRole('textbox', { name: 'Duty of the pulse' })).toBeHidden();
    await expect(page.getByRole('button', { name: 'Pulse' })).toHaveAttribute('aria-pressed', 'false');
  });

  test('hundreds of partials keep only what is in sight on the page', async ({ page }) => {
    await openShape(page);
    await page.locator('#quantise').getByRole('button').first().click();
    await page.getByRole('textbox', { name: 'Table length' }).fill('4096');
    await page.getByRole('button', { name: 'Sawtooth' }).click();
    await expect(page.getByText('2,047 partials', { exact: true })).toBeVisible();
    await page.getByRole('radio', { name: 'All', exact: true }).check();
    expect(await page.getByRole('slider', { name: /^Harmonic/ }).count()).toBeLessThan(150);
    await bar(page, 1).focus();
    await page.keyboard.press('End');
    await expect(bar(page, 2_047)).toBeFocused();
    await expect(bar(page, 2_047)).toBeInViewport();
    expect(await valueOf(bar(page, 2_047))).toBeCloseTo(2 / (2_047 * Math.PI), 12);
  });
});

test.describe('points', () => {
  test.beforeEach(async ({ page }) => {
    await openShape(page);
    await page.getByRole('radio', { name: 'Points' }).check();
    await page.getByRole('button', { name: 'Trapezoid' }).click();
  });

  test('a point dragged on the cycle stops short of its neighbour; the drag is one step', async ({
    page,
  }) => {
    const handle = page.getByRole('button', { name: /^Point 2 of 4/ });
    const next = page.getByRole('button', { name: /^Point 3 of 4/ });
    const [from, to] = [await handle.boundingBox(), await next.boundingBox()];
    if (from === null || to === null) throw new Error('The points are not on the drawing.');
    const middle = [from.x + from.width / 2, from.y + from.height / 2] as const;
    await page.mouse.move(...middle);
    await page.mouse.down();
    await page.mouse.move(to.x + 200, middle[1] + 40, { steps: 15 });
    await page.mouse.up();
    const x = page.getByRole('textbox', { name: 'x of point 2, in cycles' });
    expect(Number(await x.inputValue())).toBeGreaterThan(0.49);
    expect(Number(await x.inputValue())).toBeLessThan(0.5);
    expect(Number(await page.getByRole('textbox', { name: 'y of point 2' }).inputValue())).toBeLessThan(0.9);
    await undo(page).click();
    await expect(x).toHaveValue('0.25');
  });

  test('an x out of order is kept as typed, told beside the field, and put right by a press', async ({
    page,
  }) => {
    const x3 = page.getByRole('textbox', { name: 'x of point 3, in cycles' });
    await x3.fill('0.9');
    const x4 = page.getByRole('textbox', { name: 'x of point 4, in cycles' });
    await expect(x4).toHaveAccessibleDescription(
      '0.75 is not allowed. Allowed: more than the x before it, 0.9.',
    );
    await expect(x3).toHaveValue('0.9');
    await page.getByRole('button', { name: 'Put in order' }).click();
    await expect(x3).toHaveValue('0.75');
    await expect(x4).toHaveValue('0.9');
    await expect(x4).not.toHaveAttribute('aria-invalid');
  });

  test('degrees and cycles are one number, and rows are inserted between', async ({ page }) => {
    await page.getByRole('textbox', { name: 'x of point 2, in degrees' }).fill('45');
    await expect(page.getByRole('textbox', { name: 'x of point 2, in cycles' })).toHaveValue('0.125');
    await page.getByRole('button', { name: 'Insert a point after point 1' }).click();
    await expect(page.getByRole('textbox', { name: 'x of point 2, in cycles' })).toHaveValue('0.0625');
    await expect(page.getByRole('textbox', { name: 'y of point 2' })).toHaveValue('0');
    await page.getByRole('button', { name: 'Remove point 2' }).click();
    await expect(page.getByText('4 points, linear')).toBeVisible();
  });

  test('each kind keeps its work, and going over is one step', async ({ page }) => {
    await page.getByRole('textbox', { name: 'y of point 1' }).fill('-0.7');
    await page.getByRole('radio', { name: 'Harmonics' }).check();
    await expect(bar(page, 2)).toHaveAttribute('aria-valuetext', 'harmonic 2, amplitude 0.62');
    await page.getByRole('radio', { name: 'Points' }).check();
    await expect(page.getByRole('textbox', { name: 'y of point 1' })).toHaveValue('-0.7');
    await undo(page).click();
    await expect(bar(page, 2)).toHaveAttribute('aria-valuetext', 'harmonic 2, amplitude 0.62');
  });

  test('each interpolation is explained, and a spline asks for a third point', async ({ page }) => {
    const between = page.getByRole('combobox', { name: 'Between the points' });
    for (const [value, words] of [
      ['step', 'Holds each value'],
      ['linear', 'Straight lines'],
      ['monotone', 'never beyond the points'],
      ['spline', 'The smoothest curve'],
    ] as const) {
      await between.selectOption(value);
      await expect(page.locator('#shape').getByText(words)).toBeVisible();
    }
    await page.getByRole('button', { name: 'Step' }).click();
    await between.selectOption('spline');
    await expect(between).toHaveAccessibleDescription(/Allowed: at least 3 points/);
  });
});

for (const scheme of ['light', 'dark'] as const) {
  test(`shape and listening have no fault that axe finds, ${scheme}`, async ({ page }) => {
    await page.emulateMedia({ colorScheme: scheme });
    await openShape(page);
    await page.getByRole('button', { name: 'Pulse' }).click();
    await page.locator('#output').getByRole('button').first().click();
    await page.getByRole('button', { name: 'Play', exact: true }).click();
    await expect(page.getByRole('table', { name: /Strongest lines/ }).getByRole('row')).not.toHaveCount(1);
    const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
    const check = () =>
      new AxeBuilder({ page }).include('#shape').include('#output').withTags(tags).analyze();
    expect((await check()).violations).toEqual([]);
    await page.getByRole('radio', { name: 'Points' }).check();
    expect((await check()).violations).toEqual([]);
  });
}
