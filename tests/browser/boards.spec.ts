import { writeFileSync } from 'node:fs';
import AxeBuilder from '@axe-core/playwright';
import { expect, type Locator, type Page } from '@playwright/test';
import { parseLadder } from '../../shared/contract/index.ts';
import { voltsOf } from '../../shared/output-stage/index.ts';
import { textOf } from '../support/bench-page.ts';
import { makeCrew } from '../support/vetting-page.ts';
import { beginWithTeam, post, read, saveTable, test } from '../support/library-page.ts';

interface RevisionAnswer {
  readonly codes: readonly number[];
  readonly definition: { readonly table: { readonly levels?: readonly number[] } };
}

interface BoardAnswer {
  readonly latestRevision: number;
  readonly board: {
    readonly output: { readonly R: number };
    readonly flashBytes?: number;
    readonly levels?: readonly number[];
  };
}

const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
async function expectAccessible(page: Page, part: string): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).include(part).withTags(tags).analyze();
    expect(violations).toEqual([]);
  }
}

async function expectNoSidewaysScroll(page: Page): Promise<void> {
  await page.setViewportSize({ width: 390, height: 844 });
  const wide = () => page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(await wide()).toBeLessThanOrEqual(0);
}

const decibels = async (fact: Locator) => Number.parseFloat((await fact.innerText()).replace('−', '-'));

test('a board is made; a table fitted to its measured levels gains SINAD, and is saved and exported', async ({
  page,
}, info) => {
  test.setTimeout(120_000);
  const { team } = await beginWithTeam(page);
  await page.goto('/boards');
  await expect(page.getByRole('heading', { name: 'There are no boards yet' })).toBeVisible();
  await page.getByRole('link', { name: 'Describe a board' }).click();
  await page.getByRole('textbox', { name: 'Name', exact: true }).fill('Test board');

  // What is wrong stands beside its field, and nothing typed goes.
  const r = page.getByRole('textbox', { name: 'R', exact: true });
  await r.fill('4,7k');
  await expect(page.getByText('4,7k can be read in two ways. Which is meant?')).toBeVisible();
  await r.fill('4k7');
  await page.getByRole('textbox', { name: 'Pin of bit 1' }).fill('0');
  await expect(page.getByText('Allowed: a pin that bit 0 does not use.')).toBeVisible();
  await page.reload();
  await expect(page.getByText('What you typed here before is still there.')).toBeVisible();
  await page.getByRole('textbox', { name: 'Pin of bit 1' }).fill('1');
  await expectAccessible(page, 'main');
  await page.getByRole('button', { name: 'Save the board' }).click();
  await expect(page.getByRole('heading', { name: 'Test board' })).toBeVisible();
  const path = `/teams/${team}/boards/test-board`;
  expect(await read<BoardAnswer>(page.request, path)).toMatchObject({
    latestRevision: 1,
    board: { output: { R: 4700 } },
  });

  // A ladder whose top rungs are 2 % off.
  const bits = 8;
  const rungs = Array.from({ length: bits }, (_, bit) => 9400 * (bit >= 6 ? 1.02 : 1));
  const volts = voltsOf(parseLadder({ bits, R: 4700, rungs }));
  const file = info.outputPath('measured.csv');
  writeFileSync(file, `code,volts\n${Array.from(volts, (volt, code) => `${code},${volt}\n`).join('')}`);

  await expect(page.getByRole('link', { name: 'Show on the bench' })).toHaveAttribute('href', /board=/);
  await saveTable(page.request, team, 'Sine');
  await page.goto(`/teams/${team}/tables/sine/revisions/1/bench`);
  await expect(page.getByText('This is revision 1 of Sine')).toBeVisible();
  await page.goto(`/?open=output&more=stage&board=${team}/test-board`);
  const stage = page.getByRole('group', { name: 'Board and output stage' });
  await expect(stage.getByRole('combobox', { name: 'Board' })).toHaveValue(`${team}/test-board`);
  await expect(stage.getByRole('heading', { name: 'Voltage over time' })).toBeVisible();
  await expect(stage.getByText('passed: within 20 mA').first()).toBeVisible();
  await expectAccessible(page, '#output');

  await page.getByText('Fit to measured levels').click();
  const fit = page.getByRole('group', { name: 'Fit to measured levels' });
  await fit.getByRole('textbox', { name: 'Level voltages' }).fill('0,0.01\n1,high');
  await expect(fit.getByText('Line 2: “high” is not allowed.')).toBeVisible();
  await fit.getByLabel('Open a CSV file of level voltages').setInputFiles(file);
  const facts = fit.locator('.stage-figures');
  await expect(facts.getByText('SINAD after')).toBeVisible();
  const [before, after] = [
    await decibels(facts.locator('dd').nth(0)),
    await decibels(facts.locator('dd').nth(1)),
  ];
  expect(after).toBeGreaterThan(before + 1);
  await fit.getByRole('button', { name: 'Fit the table' }).click();
  await expect(fit.getByText('The table on the bench is fitted to these levels.')).toBeVisible();
  // Somebody else changes the board before its levels are kept: both changes stay.
  const first = await page.request.get(`/api/v1${path}`);
  const { board: asRead } = (await first.json()) as { board: object };
  await post(
    page.request,
    `${path}/revisions`,
    { board: { ...asRead, flashBytes: 8000 }, note: 'Less flash' },
    { 'If-Match': first.headers().etag },
  );
  await fit.getByRole('button', { name: 'Keep the levels with Test board' }).click();
  await expect(
    fit.getByText('Test board has been changed meanwhile and is at revision 2 now.'),
  ).toBeVisible();
  await fit.getByRole('button', { name: 'Keep the levels with Test board' }).click();
  await expect(fit.getByText('Test board has these levels as its measured ones.')).toBeVisible();
  const kept = await read<BoardAnswer>(page.request, path);
  expect(kept.latestRevision).toBe(3);
  expect(kept.board.flashBytes).toBe(8000);
  expect(kept.board.levels?.[128]).toBeCloseTo(volts[128], 6);

  await page.getByText('Tolerance trials').click();
  const trials = page.getByRole('group', { name: 'Tolerance trials' });
  await trials.getByRole('textbox', { name: 'Trials' }).fill('200');
  await trials.getByRole('button', { name: 'Run the trials' }).click();
  await expect(trials.getByText('200 of 200 ladders, done.')).toBeVisible();
  await expectAccessible(page, '#output');

  // The export takes the board's pins, and says whether the words fit.
  await page.goto(`/?open=export&board=${team}/test-board`);
  await page.getByRole('combobox', { name: 'Target' }).selectOption('avr');
  await expect(page.getByText('From the board Test board: clock and pins.')).toBeVisible();
  await expect(page.getByRole('textbox', { name: 'Port map' })).not.toHaveValue('');
  await expect(page.locator('.command-line')).toContainText('--port-map');
  await expect(page.getByText('✓ Within the 8,000 bytes that Test board leaves for tables')).toBeVisible();
  await expectAccessible(page, '#export');

  await page.keyboard.press('Control+s');
  await page.getByRole('dialog', { name: /^Save/ }).getByRole('button', { name: 'Save' }).click();
  await expect(page.getByText('This is revision 2 of Sine')).toBeVisible();
  const saved = await read<RevisionAnswer>(page.request, `/teams/${team}/tables/sine/revisions/2`);
  expect(saved.definition.table.levels?.[128]).toBeCloseTo(volts[128], 6);
  const even = await read<RevisionAnswer>(page.request, `/teams/${team}/tables/sine/revisions/1`);
  expect(saved.codes).not.toEqual(even.codes);

  await page.goto(`/teams/${team}/tables/sine`);
  await page.getByRole('button', { name: 'Show the files' }).click();
  await page.getByRole('combobox', { name: 'Target' }).selectOption('csv');
  const download = page.waitForEvent('download');
  await page.getByRole('link', { name: /^Download .*csv$/ }).click();
  const rows = (await textOf(await download)).split(/\r?\n/).filter((row) => /^\d+,/.test(row));
  expect(rows.map((row) => Number(row.split(',')[1]))).toEqual(saved.codes);

  await page.goto(`/teams/${team}/boards/test-board/edit`);
  await expect(page.getByRole('button', { name: 'Save the board' })).toBeVisible();
  await expectNoSidewaysScroll(page);
  await page.goto('/?open=output&more=stage,fit,trials,advice');
  await expect(page.getByRole('heading', { name: 'How many bits matter' })).toBeVisible();
  await expectNoSidewaysScroll(page);
});

test('a serial converter has its mask, and a viewer reads the form without saving it', async ({
  browser,
  quiet,
}) => {
  const { team, author, viewer, close } = await makeCrew(browser, quiet, {
    author: 'author',
    viewer: 'viewer',
  });
  const { page } = author;
  await page.goto(`/teams/${team}/boards`);
  await page.getByRole('link', { name: 'Describe a board' }).click();
  await page.getByRole('textbox', { name: 'Name', exact: true }).fill('Serial board');
  await page.getByRole('combobox', { name: 'Converter' }).selectOption('serial');
  const mask = page.getByRole('textbox', { name: 'Mask' });
  await mask.fill('0x1');
  await expect(page.getByText(/a mask that holds every bit of the code/)).toBeVisible();
  await mask.fill('0xfff');
  await page.getByRole('button', { name: 'Save the board' }).click();
  await expect(page.getByRole('heading', { name: 'Serial board' })).toBeVisible();
  const path = `/teams/${team}/boards/serial-board`;
  expect(await read(page.request, path)).toMatchObject({
    board: { output: { kind: 'serial', mask: 0xfff } },
  });

  await viewer.page.goto(`${path}/edit`);
  const name = viewer.page.getByRole('textbox', { name: 'Name', exact: true });
  await expect(name).toHaveValue('Serial board');
  await expect(viewer.page.getByText('saving one takes the role author').first()).toBeVisible();
  await name.press('Enter');
  await expect(viewer.page).toHaveURL(/edit$/);
  await close();
});

test('a revision saved second shows both sides and loses nothing typed', async ({ page }) => {
  const { team } = await beginWithTeam(page);
  await page.goto(`/teams/${team}/boards`);
  await page.getByRole('button', { name: 'Add one working example' }).click();
  await expect(page.getByRole('heading', { name: 'Example board' })).toBeVisible();
  await page.getByRole('link', { name: 'Edit' }).click();
  await page.getByRole('textbox', { name: 'R', exact: true }).fill('22k');

  const path = `/teams/${team}/boards/example-board`;
  const other = await page.context().newPage();
  await other.goto(`${path}/edit`);
  await other.getByRole('textbox', { name: 'R', exact: true }).fill('15k');
  await other.getByRole('button', { name: 'Save the board' }).click();
  await expect(other.getByText('Saved as revision 2.')).toBeVisible();
  await other.close();

  await page.getByRole('button', { name: 'Save the board' }).click();
  const both = page.getByRole('region', { name: 'Both sides' });
  await expect(both.getByRole('row', { name: /^R / })).toContainText('22 kΩ');
  await expect(both.getByRole('row', { name: /^R / })).toContainText('15 kΩ');
  await page.getByRole('button', { name: 'Save mine as the next revision' }).click();
  await expect(page.getByText('Saved as revision 3.')).toBeVisible();
  expect((await read<BoardAnswer>(page.request, path)).board.output.R).toBe(22_000);

  await page.getByRole('button', { name: 'Retire' }).click();
  await expect(page.getByText('Retired.', { exact: false }).first()).toBeVisible();
  await page.getByRole('button', { name: 'Restore' }).click();
  await expect(page.getByRole('link', { name: 'Edit' })).toBeVisible();
});
