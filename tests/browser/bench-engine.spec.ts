import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { field, figure, flight, problems, test } from '../support/bench-page.ts';
import { beginWithTeam } from '../support/library-page.ts';

test('noise, storage and measured levels open in place, are refused with the way out, and undone', async ({
  page,
}) => {
  await page.goto('/?open=quantise');
  await page.getByText('No dither, no shaping').click();
  await page.getByRole('radio', { name: 'Triangular' }).check();
  await expect(field(page, 'Seed')).toHaveValue('1');
  const before = await figure(page, 'RMS error').innerText();
  await page.getByRole('button', { name: 'Another seed' }).click();
  await expect(field(page, 'Seed')).toHaveValue('2');
  await expect(figure(page, 'RMS error')).not.toHaveText(before);

  await page.getByText('Offset binary, the whole table').click();
  await page.getByRole('radio', { name: 'The first quarter' }).check();
  await expect(problems(page)).toContainText('"centre" while table.fold is "quarter"');
  await page.getByRole('button', { name: 'Set what a quarter needs' }).click();
  // Five partials in all phases: now it is the codes that do not mirror.
  await expect(problems(page)).toContainText('Stored: "quarter" with code');
  await flight(page, 'Shape').click();
  await page.getByRole('button', { name: 'Sine', exact: true }).click();
  await expect(problems(page)).toBeHidden();
  await expect(figure(page, 'Size')).toContainText('64');

  // The view is in the URL, and a refusal leads back into what was shut.
  await page.reload();
  await expect(page.getByRole('radio', { name: 'The first quarter' })).toBeChecked();
  await page.getByText('None: the levels are taken as even').click();
  await field(page, 'Voltages').fill(
    Array.from({ length: 256 }, (_, code) => `${code},${code * 0.02}`).join('\n'),
  );
  await page.getByRole('radio', { name: 'Rectangular' }).check();
  await page.getByRole('button', { name: 'Use these levels' }).click();
  await expect(page.getByText('256 voltages', { exact: true })).toBeVisible();
  await page.getByText('Rectangular dither, seed').click();
  await expect(page.getByRole('radio', { name: 'Rectangular' })).toBeHidden();
  await problems(page).getByRole('link', { name: 'Dither' }).click();
  await expect(page.getByRole('radio', { name: 'None', exact: true }).first()).toBeFocused();
  await problems(page).getByRole('button', { name: 'Clear the measured levels' }).click();
  await expect(problems(page)).toContainText('Stored');
  await page.keyboard.press('Control+z');
  await expect(page.getByText('256 voltages', { exact: true })).toBeVisible();
});

test('a shaped table is quieter in its low band, in the figure and in the data of the drawing', async ({
  page,
}) => {
  await page.goto('/?open=quantise&more=noise');
  await field(page, 'Table length').fill('4096');
  // Below full scale, so that no code is clipped: shaping needs room.
  await page.getByRole('textbox', { name: 'Level', exact: true }).fill('0.9');
  const lowBand = async () => {
    const text = await figure(page, 'Low-band noise').locator('output').innerText();
    return Number(text.replace('−', '-'));
  };
  const lowBandOfData = async () => {
    await page.getByRole('button', { name: 'Export spectrum' }).click();
    const waiting = page.waitForEvent('download');
    await page.getByRole('menuitem', { name: 'All data as CSV' }).click();
    const stream = await (await waiting).createReadStream();
    const chunks: Buffer[] = [];
    for await (const chunk of stream) chunks.push(chunk as Buffer);
    const [head, ...rows] = Buffer.concat(chunks).toString('utf8').trim().split('\n');
    const column = head.split(',').findIndex((name) => name.startsWith('added'));
    const added = rows.slice(1, 1 + 4_096 / 32).map((row) => Number(row.split(',')[column]));
    return 10 * Math.log10(added.reduce((sum, value) => sum + value ** 2, 0));
  };
  await expect.poll(lowBand).toBeLessThan(-50);
  const [plain, plainData] = [await lowBand(), await lowBandOfData()];
  await page.getByRole('radio', { name: 'Order 2' }).check();
  await expect.poll(lowBand).toBeLessThan(plain - 20);
  expect((await lowBandOfData()) - (await lowBand())).toBeCloseTo(plainData - plain, 0);
});

test('a mix is made, filled, moved and left by keyboard, and its parts keep the editors', async ({
  page,
}) => {
  await page.goto('/');
  await page.getByRole('radio', { name: 'Harmonics' }).focus();
  await page.keyboard.press('ArrowLeft');
  await expect(page.getByRole('radio', { name: 'Mix' })).toBeChecked();
  const parts = page.getByRole('group', { name: 'Parts of the mix' });
  const part = (name: string) => parts.getByRole('button', { name: new RegExp(`^${name}\\b(?!\\.)`) });
  await page.getByRole('button', { name: 'Add a part', exact: true }).press('Enter');
  await expect(part('Part 2')).toBeFocused();
  await page.keyboard.press('Alt+ArrowUp');
  await expect(part('Part 1')).toBeFocused();
  await expect(part('Part 1')).toContainText('1 partial');
  await expect(part('Part 2')).toContainText('5 partials');
  await page.keyboard.press('Tab');
  await expect(page.getByRole('textbox', { name: 'Gain of part 1' })).toBeFocused();
  await page.keyboard.press('Control+a');
  await page.keyboard.type('-6 dB');
  await part('Part 1').focus();
  await page.keyboard.press('ArrowDown');
  await expect(part('Part 2')).toBeFocused();
  const chosen = page.getByRole('region', { name: 'Part 2' });
  await chosen.getByRole('textbox', { name: 'Harmonic of partial 5' }).fill('0');
  await expect(problems(page)).toContainText('Part 2: Partial 5, harmonic number');
  await part('Part 1').press('ArrowUp');
  await part('Part 1').focus();
  await problems(page).getByRole('link', { name: 'Part 2' }).click();
  await expect(chosen.getByRole('textbox', { name: 'Harmonic of partial 5' })).toBeFocused();
  await page.keyboard.press('Control+a');
  await page.keyboard.type('9');
  await expect(problems(page)).toBeHidden();

  await page.getByRole('button', { name: 'Make part 1 a mix of its own' }).press('Enter');
  await expect(page.getByRole('button', { name: 'Add a part to Part 1' })).toBeVisible();
  await part('Part 2').focus();
  await page.keyboard.press('Delete');
  await expect(parts.getByRole('button', { name: /^Part 2\b/ })).toHaveCount(0);
  await page.keyboard.press('Control+z');
  await part('Part 2').focus();
  await page.getByRole('button', { name: 'Use this part alone' }).press('Enter');
  await expect(page.getByRole('radio', { name: 'Harmonics' })).toBeChecked();
  await expect(page.getByText('5 partials', { exact: true })).toBeVisible();
});

test('the definition as JSON goes both ways, says line and column, and loses nothing typed', async ({
  page,
}) => {
  await page.goto('/?open=quantise&more=text');
  const text = page.getByRole('textbox', { name: 'Definition as JSON' });
  await expect(text).toContainText('"name": "Fog-signal tone"');
  await field(page, 'Bit depth').fill('10');
  await expect(text).toContainText('"bits": 10');

  const short =
    '{ "schema": 1, "name": "Typed",\n"source": { "kind": "samples", "resampling": "hold", "values": [0, 1, 0, -1] },\n"table": { "bits": 4 } }';
  await text.fill(short);
  await expect(field(page, 'Name of the wave')).toHaveValue('Typed');
  await expect(field(page, 'Bit depth')).toHaveValue('4');
  await expect(figure(page, 'Codes used')).toContainText('of 16');
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await expect(text).toContainText('"name": "Fog-signal tone"');
  await page.getByRole('button', { name: 'Redo', exact: true }).click();
  await expect(text).toContainText('"bits": 4');

  await text.fill(short.replace('"bits": 4', '"bits": 44'));
  await expect(page.getByRole('button', { name: 'Line 3, column 20' })).toBeVisible();
  await expect(
    page.getByText('Bit depth: 44 is not allowed. Allowed: a whole number from 1 to 16.'),
  ).toBeVisible();
  await expect(field(page, 'Bit depth')).toHaveValue('4');
  await text.fill(short.replace('"name":', '"name"'));
  await expect(page.getByRole('button', { name: 'Line 1, column 23' })).toBeVisible();
  await expect(page.getByText('is not JSON here. Allowed: ":".')).toBeVisible();

  // The bench goes on meanwhile, and the page is left: what was typed is still there.
  await field(page, 'Bit depth').fill('6');
  await expect(page.getByText('the text here is yours and stays')).toBeVisible();
  await page.reload();
  await expect(text).toContainText('"name" "Typed"');
  await expect(field(page, 'Bit depth')).toHaveValue('6');
  await page.getByRole('button', { name: 'Show what is on the bench' }).click();
  await expect(text).toContainText('"bits": 6');
  await text.press('Control+z');
  await expect(text).toContainText('"name" "Typed"');
});

test('a note’s timer values chosen from the ranked list reach the export, with the step word beside', async ({
  page,
}) => {
  await page.goto('/?open=output&more=rates');
  await page.getByRole('textbox', { name: 'Wanted tone' }).fill('H4');
  await expect(page.getByText('“H4” is not allowed')).toBeVisible();
  await page.getByRole('textbox', { name: 'Wanted tone' }).fill('A4');
  const cost = page.getByRole('combobox', { name: 'Cost of one sample' });
  const cycles = page.getByRole('textbox', { name: 'Cycles of a sample' });
  await cycles.fill('150');
  // A proven code's cycles fill the field; what was typed waits under its own choice, over a reload, too.
  await cost.selectOption('avr timer, 256 × 8');
  await expect(cycles).toHaveValue('52');
  await expect(page.getByText(/^Measured in a simulator: 48 cycles at most.*: 52 in all/)).toBeVisible();
  await expect(page.getByText('too few')).toHaveCount(0);
  await page.reload();
  await expect(cycles).toHaveValue('52');
  await cost.selectOption('cortex-m timer, 256 × 8');
  await expect(cycles).toHaveValue('12');
  await expect(page.getByText(/^Counted in the disassembly, not measured/)).toBeVisible();
  await cycles.fill('13');
  await expect(cost).toHaveValue('own');
  await cycles.fill('150');
  const rows = page.getByRole('table', { name: /Timer settings/ }).getByRole('row');
  // 16 MHz/(1·(141 + 1))/256 = 440.14 Hz, and between two samples lie 142 cycles, fewer than asked for.
  await expect(rows.nth(1)).toContainText('440.141 Hz');
  await expect(rows.nth(1)).toContainText('+0.55 cents');
  await expect(rows.nth(1)).toContainText('too few');
  await page.getByRole('button', { name: 'Use prescaler 1, compare 141' }).click();
  await expect(rows.nth(1)).toContainText('in use');
  await expect(page.getByText('Prescaler 1, compare 141 at 16 MHz')).toBeVisible();

  await page.getByText('None chosen: the table is a loop').click();
  await page.getByRole('textbox', { name: 'Wanted frequency' }).fill('C5');
  await expect(page.getByRole('figure', { name: 'Spurs' })).toBeVisible();
  await expect(page.getByText(/^24 bits, step word \d+: 523\.25\sHz$/)).toBeVisible();
  await expect(page.getByText('Repeats after')).toBeVisible();

  await page.reload();
  await expect(page.getByText('Prescaler 1, compare 141 at 16 MHz')).toBeVisible();
  await page.locator('#export').getByRole('button').first().click();
  await page.getByRole('combobox', { name: 'Target' }).selectOption('avr');
  await expect(page.locator('.command-line')).toContainText('--prescaler 1 --compare 141');
  await expect(page.locator('.command-line')).toContainText('--clock-hz 16000000');
});

test('the smallest table for two limits is found, taken and saved', async ({ page }) => {
  const { team } = await beginWithTeam(page);
  await page.goto('/?open=quantise');
  await page.getByRole('button', { name: 'Find the smallest table…' }).click();
  const search = page.getByRole('dialog', { name: 'Find the smallest table' });
  const limits = search.getByRole('textbox', { name: 'Limits' });
  await limits.fill('SNR ≤ 45 dB');
  await expect(search.getByText('“SNR ≤ 45 dB” is not allowed')).toBeVisible();
  await limits.fill('SNR ≥ 55 dB, ≤ 512 bytes');
  await expect(search.getByText('The smallest that keeps the limits')).toBeVisible();
  // Nine bits take two bytes an entry, and 16 entries would leave out harmonic 8.
  await expect(
    search.getByText(/The smallest that keeps the limits: 32 entries of 9 bits: .*, 64 bytes/),
  ).toBeVisible();
  const cells = search.getByRole('grid', { name: /^Sizes/ });
  await cells.getByRole('button', { name: /^256 entries of 8 bits/ }).focus();
  await page.keyboard.press('ArrowRight');
  await expect(cells.getByRole('button', { name: /^256 entries of 9 bits/ })).toBeFocused();
  await expect(search.getByText(/^256 entries of 9 bits: SNR/)).toBeVisible();
  await search.getByRole('button', { name: 'Take the smallest that meets them' }).click();
  await expect(search).toBeHidden();
  await expect(page.getByRole('button', { name: 'Find the smallest table…' })).toBeFocused();
  await expect(field(page, 'Table length')).toHaveValue('32');
  await expect(field(page, 'Bit depth')).toHaveValue('9');

  await flight(page, 'Output').click();
  await page.getByText('None chosen', { exact: true }).click();
  await page
    .getByRole('button', { name: /^Use prescaler/ })
    .first()
    .click();
  await page.keyboard.press('Control+s');
  const saving = page.getByRole('dialog', { name: /^Save/ });
  await saving.getByRole('textbox', { name: 'Title' }).fill('Small horn');
  await saving.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByText('This is revision 1 of Small horn')).toBeVisible();
  const answer = await page.request.get(`/api/v1/teams/${team}/tables/small-horn/revisions/1`);
  const { definition, playback } = (await answer.json()) as Record<string, Record<string, unknown>>;
  expect(definition.table).toMatchObject({ length: 32, bits: 9 });
  expect(playback.timer).toMatchObject({ clockHz: 16e6 });
});

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`${colorScheme}`, () => {
    test.use({
      colorScheme,
      viewport: colorScheme === 'light' ? { width: 390, height: 844 } : { width: 1440, height: 900 },
    });

    const check = async (page: Page, part: string) => {
      const { violations } = await new AxeBuilder({ page }).include(part).analyze();
      expect(violations.map(({ id, nodes }) => [part, id, nodes.map(({ html }) => html)])).toEqual([]);
      expect(
        await page.evaluate(() => document.documentElement.scrollWidth - innerWidth),
      ).toBeLessThanOrEqual(0);
    };

    test('what opens in the quantise flight has no barrier that axe finds', async ({ page }) => {
      await page.goto('/?open=quantise&more=noise,sampling,storage,levels,text');
      await page.getByRole('radio', { name: 'Triangular' }).check();
      await page.getByText('Why a quarter would be refused now').click();
      await field(page, 'Voltages').fill('0,1\n1,25');
      await expect(page.getByRole('button', { name: 'a decimal comma: 0.1' })).toBeVisible();
      await field(page, 'Voltages').fill(
        Array.from({ length: 256 }, (_, code) => code * 0.02 + (code % 7) * 0.004).join('\n'),
      );
      await page.getByRole('button', { name: 'Use these levels' }).click();
      await expect(page.getByRole('textbox', { name: 'Definition as JSON' })).toBeVisible();
      await check(page, '.bench-flights');
      await page.getByRole('button', { name: 'Find the smallest table…' }).click();
      await expect(page.getByText('Put the marked fields right first.')).toBeVisible();
      await page.getByRole('button', { name: 'Clear the measured levels' }).first().click();
      await page.getByRole('button', { name: 'Find the smallest table…' }).click();
      await expect(page.getByText('The smallest that keeps the limits')).toBeVisible();
      await check(page, 'dialog[open]');
    });

    test('fades, rates, mixes and samples have no barrier that axe finds', async ({ page }) => {
      await page.goto('/?open=shape,output&more=fades,rates,accumulator,two-tones,pulses');
      await page.getByRole('radio', { name: 'Points' }).check();
      await page.getByRole('combobox', { name: 'Fade' }).selectOption('exponential');
      await page.getByRole('button', { name: 'Start from this fade' }).click();
      await expect(page.getByRole('figure', { name: 'Spurs' })).toBeVisible();
      await expect(page.getByRole('img', { name: /^Entries 0 to/ })).toBeVisible();
      await check(page, '.bench-flights');
      await flight(page, 'Output').click();
      await page.getByRole('radio', { name: 'Mix' }).check();
      await page.getByRole('button', { name: 'Add a part', exact: true }).click();
      await page.getByRole('button', { name: 'Make part 2 a mix of its own' }).click();
      await check(page, '#shape');
      await page.getByRole('radio', { name: 'Samples' }).first().click();
      await expect(page.getByRole('textbox', { name: 'Value of sample 1', exact: true })).toBeVisible();
      await check(page, '#shape');
    });
  });
}
