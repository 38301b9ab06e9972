import { expect } from '@playwright/test';
import { drawings, field, figure, flight, problems, saidBeside, test } from '../support/bench-page.ts';

test('a first visit finds a wave on the bench, built and measured', async ({ page }) => {
  await page.goto('/');
  await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');
  await expect(page.getByText('A fog-signal tone of five partials is on the bench')).toBeVisible();
  await expect(page.getByText('5 partials', { exact: true })).toBeVisible();
  await expect(figure(page, 'SNR')).toContainText(/4\d\.\d\s*dB of 49\.9/);
  await expect(figure(page, 'Size')).toContainText('256');
  for (const name of ['Cycle', 'Error', 'Spectrum']) {
    await expect(page.getByRole('figure', { name, exact: true })).toBeVisible();
  }
  await expect(page.getByText('Judge it by the unwanted line')).toBeVisible();
});

test('every figure explains itself in place', async ({ page }) => {
  await page.goto('/');
  await figure(page, 'Unwanted line').getByRole('button').click();
  const sheet = page.getByRole('dialog', { name: 'Unwanted line' });
  await expect(sheet).toContainText('max A_k(e) / max A_k(r)');
  await expect(sheet).toContainText('What is good');
});

test('undo and redo take back typing as one step, by keys and by buttons', async ({ page }) => {
  await page.goto('/?open=quantise');
  const bits = field(page, 'Bit depth');
  await expect(page.getByRole('button', { name: 'Undo', exact: true })).toHaveAttribute(
    'aria-disabled',
    'true',
  );
  await bits.fill('');
  await bits.pressSequentially('12');
  await bits.press('Tab');
  await expect(figure(page, 'SNR')).toContainText('of 74');
  await field(page, 'Table length').press('ArrowUp');
  await expect(figure(page, 'Size')).toContainText('514');

  await page.keyboard.press('Control+z');
  await expect(field(page, 'Table length')).toHaveValue('256');
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await expect(bits).toHaveValue('8');
  await expect(page.getByRole('button', { name: 'Undo', exact: true })).toHaveAttribute(
    'aria-disabled',
    'true',
  );

  await page.keyboard.press('Control+Shift+z');
  await expect(bits).toHaveValue('12');
  await page.keyboard.press('Control+y');
  await expect(field(page, 'Table length')).toHaveValue('257');
  await expect(figure(page, 'Size')).toContainText('514');
});

test('the code axis goes with the bit depth, though the scale stays the same', async ({ page }) => {
  await page.addInitScript(() => {
    const words: string[] = [];
    Object.assign(globalThis, { drawnWords: words });
    const { prototype } = CanvasRenderingContext2D;
    const fillText = prototype.fillText;
    prototype.fillText = function (text: string, ...place: [number, number]) {
      words.push(text);
      fillText.call(this, text, ...place);
    };
  });
  const drawn = () =>
    page.evaluate(() => (globalThis as unknown as { drawnWords: string[] }).drawnWords.splice(0));
  await page.goto('/?open=quantise');
  await expect(figure(page, 'Codes used')).toContainText('of 256');
  expect(await drawn()).toContain('255');
  await field(page, 'Bit depth').fill('12');
  await expect(figure(page, 'Codes used')).toContainText('of 4,096');
  const words = await drawn();
  expect(words).toContain('4095');
  expect(words.slice(words.lastIndexOf('4095'))).not.toContain('255');
});

test('nothing on the page moves under the first drag', async ({ page }) => {
  await page.goto('/');
  await expect(figure(page, 'SNR')).toBeVisible();
  const bars = page.getByRole('group', { name: 'Harmonics as bars' });
  const before = await bars.boundingBox();
  if (before === null) throw new Error('no bars');
  await page.mouse.move(before.x + before.width * 0.4, before.y + before.height * 0.4);
  await page.mouse.down();
  await page.mouse.move(before.x + before.width * 0.4, before.y + before.height * 0.3, { steps: 6 });
  expect(await bars.boundingBox()).toEqual(before);
  await page.mouse.up();
  expect(await bars.boundingBox()).toEqual(before);
  await page.getByRole('button', { name: 'Put this away' }).click();
  await expect(page.getByText('A fog-signal tone of five partials is on the bench')).toBeHidden();
});

test('a drag of a bar is one step', async ({ page }) => {
  await page.goto('/');
  const before = await figure(page, 'SNR').innerText();
  const bars = await page.getByRole('group', { name: 'Harmonics as bars' }).boundingBox();
  if (bars === null) throw new Error('no bars');
  await page.mouse.move(bars.x + bars.width * 0.72, bars.y + bars.height * 0.3);
  await page.mouse.down();
  await page.mouse.move(bars.x + bars.width * 0.72, bars.y + bars.height * 0.2, { steps: 12 });
  await page.mouse.up();
  await expect(page.getByText('6 partials', { exact: true })).toBeVisible();
  await expect(figure(page, 'SNR')).not.toHaveText(before);
  await page.keyboard.press('Control+z');
  await expect(page.getByText('5 partials', { exact: true })).toBeVisible();
  await expect(page.getByRole('button', { name: 'Undo', exact: true })).toHaveAttribute(
    'aria-disabled',
    'true',
  );
});

test('what was made survives a reload, and so does the view', async ({ page }) => {
  await page.goto('/');
  await field(page, 'Name of the wave').fill('Harbour horn');
  await flight(page, 'Quantise').click();
  await field(page, 'Bit depth').fill('10');
  await expect(figure(page, 'Codes used')).toContainText('of 1,024');
  await page.reload();
  await expect(field(page, 'Name of the wave')).toHaveValue('Harbour horn');
  await expect(field(page, 'Bit depth')).toHaveValue('10');
  await expect(figure(page, 'Codes used')).toContainText('of 1,024');
  await expect(page.getByText('A fog-signal tone of five partials is on the bench')).toBeHidden();
});

for (const { name, typed, allowed, link, mend } of [
  {
    name: 'Bit depth',
    typed: '17',
    allowed: 'a whole number from 1 to 16',
    link: 'Bit depth',
    mend: 'Use 16',
  },
  { name: 'Bit depth', typed: '0', allowed: 'a whole number from 1 to 16', link: 'Bit depth', mend: 'Use 1' },
  {
    name: 'Table length',
    typed: '65537',
    allowed: 'a whole number from 2 to 65536',
    link: 'Table length',
    mend: 'Use 65536',
  },
  {
    name: 'Start phase',
    typed: '-90',
    allowed: 'from 0 up to, not including, 360',
    link: 'Start phase',
    mend: 'Use 270°',
  },
]) {
  test(`refuses ${typed} for ${name} beside the field, keeps it as typed and offers a mend`, async ({
    page,
  }) => {
    await page.goto('/?open=shape,quantise&more=sampling');
    await field(page, name).fill(typed);
    await expect(field(page, name)).toHaveAttribute('aria-invalid', 'true');
    await expect.poll(() => saidBeside(page, name)).toContain(allowed);
    expect(await saidBeside(page, name)).toContain(typed);
    await expect(drawings(page)).toHaveAttribute('data-stale', '');
    await expect(problems(page)).toContainText(allowed);

    await page.reload();
    await expect(field(page, name)).toHaveValue(typed);
    await flight(page, 'Quantise').click();
    await problems(page).getByRole('link', { name: link }).click();
    await expect(field(page, name)).toBeFocused();

    await problems(page).getByRole('button', { name: mend, exact: true }).click();
    await expect(problems(page)).toBeHidden();
    await expect(drawings(page)).not.toHaveAttribute('data-stale', '');
  });
}

test('refuses a table of one entry beside the field', async ({ page }) => {
  await page.goto('/?open=quantise');
  await field(page, 'Table length').fill('1');
  await expect.poll(() => saidBeside(page, 'Table length')).toContain('1 is not allowed');
  await expect(problems(page)).toContainText('a whole number from 2 to 65536');
  await page.keyboard.press('Control+z');
  await expect(field(page, 'Table length')).toHaveValue('256');
  await expect(problems(page)).toBeHidden();
});

test('a text that is no number is listed in the summary once its field is left, which leads back to it', async ({
  page,
}) => {
  await page.goto('/?open=shape,quantise');
  await field(page, 'Bit depth').fill('abc');
  await expect(problems(page)).toBeHidden();
  await field(page, 'Bit depth').press('Tab');
  await expect(problems(page)).toContainText('Bit depth: “abc” is not allowed');
  await expect(problems(page)).toContainText('a whole number from 1 to 16');
  await expect(drawings(page)).not.toHaveAttribute('data-stale', '');
  await flight(page, 'Quantise').click();
  await expect(field(page, 'Bit depth')).toBeHidden();
  await problems(page).getByRole('link', { name: 'Bit depth' }).click();
  await expect(field(page, 'Bit depth')).toBeFocused();
  await field(page, 'Bit depth').fill('9');
  await expect(problems(page)).toBeHidden();
  await expect(figure(page, 'Codes used')).toContainText('of 512');
});

for (const width of [1440, 390]) {
  test(`an exponent stays in sight, and the whole number comes with the focus, ${width} wide`, async ({
    page,
  }) => {
    await page.setViewportSize({ width, height: 844 });
    await page.goto('/');
    for (const name of ['Amplitude of partial 1', 'Phase of partial 1', 'Offset']) {
      const number = page.getByRole('textbox', { name, exact: false });
      await number.fill('3.8981718325193755e-17');
      await number.press('Tab');
      await expect(number).toHaveValue(/^(3\.?\d*)?…e-17$|^3\.8981718325193755e-17$/);
      expect(await number.evaluate((input) => input.scrollWidth <= input.clientWidth)).toBe(true);
      await number.focus();
      await expect(number).toHaveValue('3.8981718325193755e-17');
    }
  });
}

for (const text of ['NaN', 'Infinity', 'twelve', '']) {
  test(`refuses “${text}” for a number beside the field and keeps the last one`, async ({ page }) => {
    await page.goto('/?open=quantise');
    await field(page, 'Bit depth').fill(text);
    await expect(field(page, 'Bit depth')).toHaveAttribute('aria-invalid', 'true');
    await expect(field(page, 'Bit depth')).toHaveValue(text);
    expect(await saidBeside(page, 'Bit depth')).toContain('a whole number from 1 to 16');
    await expect(figure(page, 'Codes used')).toContainText('of 256');
  });
}

test('a range that rules a scale out says so and changes nothing by itself', async ({ page }) => {
  await page.goto('/?open=quantise');
  await page.getByRole('radio', { name: 'Mid-tread' }).check();
  await expect(problems(page)).toBeHidden();
  await page.getByRole('radio', { name: 'Unipolar' }).check();
  await expect(problems(page)).toContainText('"full-span" while table.range is "unipolar"');
  await expect(page.getByRole('radio', { name: 'Mid-tread' })).toBeChecked();
  await problems(page).getByRole('button', { name: 'Use full span' }).click();
  await expect(page.getByRole('radio', { name: 'Full span' })).toBeChecked();
  await expect(page.getByRole('radio', { name: 'Unipolar' })).toBeChecked();
  await expect(problems(page)).toBeHidden();
});

test('a silent wave is refused after it was built, and comes right without normalising', async ({ page }) => {
  await page.goto('/?open=shape,quantise');
  for (let index = 0; index < 5; index += 1) {
    await page
      .getByRole('textbox', { name: /^Amplitude of partial/ })
      .nth(index)
      .fill('0');
  }
  await expect(problems(page)).toContainText('a zero signal');
  await problems(page).getByRole('button', { name: 'Do not normalise' }).click();
  await expect(problems(page)).toBeHidden();
  await expect(figure(page, 'SNR')).toContainText('–');
});

test('starts anew from each example and brings the old wave back', async ({ page }) => {
  await page.goto('/');
  for (const title of ['Low-battery chirp', 'Lamp fade', 'Self-test sine', 'Fog-signal tone']) {
    await page.getByRole('button', { name: 'Start anew' }).click();
    await page.getByRole('menuitem', { name: title }).click();
    await expect(field(page, 'Name of the wave')).toHaveValue(title);
    await expect(problems(page)).toBeHidden();
  }
  await page.keyboard.press('Control+z');
  await expect(field(page, 'Name of the wave')).toHaveValue('Self-test sine');
});

test('an engine that cannot be loaded is told, and builds once it can', async ({ page }) => {
  await page.route('**/engine.worker*', (route) => route.abort('connectionfailed'), { times: 1 });
  await page.goto('/');
  await expect(page.getByText('The engine could not build the table')).toBeVisible();
  await page.getByRole('button', { name: 'Build it again' }).click();
  await expect(figure(page, 'SNR')).toContainText('dB of 49.9');
  await expect(page.getByText('The engine could not build the table')).toBeHidden();
});
