import { execFile } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import AxeBuilder from '@axe-core/playwright';
import { expect, test as base, type Download, type Page } from '@playwright/test';
import { projectFolder } from '../../server/project-folder.ts';

/** A page that must not complain: no error, no warning, no breach of the content policy, no failed request. */
const test = base.extend<{ quiet: string[] }>({
  quiet: [
    async ({ context }, use) => {
      const complaints: string[] = [];
      context.on('console', (message) => {
        if (['error', 'warning'].includes(message.type())) complaints.push(message.text());
      });
      context.on('weberror', (error) => complaints.push(String(error.error())));
      context.on('requestfailed', (request) => complaints.push(`${request.url()} failed`));
      await use(complaints);
      expect(complaints).toEqual([]);
    },
    { auto: true },
  ],
});

const field = (page: Page, name: string) => page.getByRole('textbox', { name, exact: false }).first();
const flight = (page: Page, name: string) =>
  page.getByRole('button', { name: new RegExp(`^(\\d )?${name}\\b`), expanded: undefined }).first();
const figure = (page: Page, name: string) => page.getByRole('group', { name, exact: true });
const drawings = (page: Page) => page.getByRole('region', { name: 'Drawings and figures' });
const problems = (page: Page) => page.getByRole('region', { name: 'What is wrong' });

async function textOf(download: Download): Promise<string> {
  return readFile(await download.path(), 'utf8');
}

/** What a screen reader says beside a field. */
async function saidBeside(page: Page, name: string): Promise<string> {
  const ids = (await field(page, name).getAttribute('aria-describedby'))?.split(' ') ?? [];
  const texts = await Promise.all(ids.map((id) => page.locator(`[id="${id}"]`).innerText()));
  return texts.join(' ');
}

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
    await page.goto('/?open=shape,quantise');
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

test.describe('a read-only link', () => {
  test.use({ permissions: ['clipboard-read', 'clipboard-write'] });

  async function copiedLink(page: Page): Promise<string> {
    await page.getByRole('button', { name: 'Copy link' }).click();
    await expect(page.getByText('Link copied.')).toBeVisible();
    return page.evaluate(() => navigator.clipboard.readText());
  }

  test('carries the whole wave, is not to be changed, and goes on the bench as one step', async ({
    page,
    browser,
  }) => {
    await page.goto('/?open=quantise');
    await field(page, 'Name of the wave').fill('Bell at the mole');
    await field(page, 'Bit depth').fill('11');
    await expect(figure(page, 'Codes used')).toContainText('of 2,048');
    const snr = await figure(page, 'SNR').innerText();
    const link = await copiedLink(page);
    expect(link).toMatch(/\/wave#w1\.[\w-]+$/);

    const other = await browser.newContext();
    const guest = await other.newPage();
    await guest.goto(link);
    await expect(guest.getByRole('heading', { level: 1, name: 'Bell at the mole' })).toBeVisible();
    await expect(guest.getByText('A shared wave, read-only')).toBeVisible();
    await expect(figure(guest, 'SNR')).toHaveText(snr, { useInnerText: true });
    await expect(field(guest, 'Bit depth')).toBeHidden();
    await expect(field(guest, 'Name of the wave')).toBeHidden();

    await guest.getByRole('button', { name: 'Open on my bench' }).click();
    await expect(field(guest, 'Name of the wave')).toHaveValue('Bell at the mole');
    await guest.getByRole('button', { name: 'Undo', exact: true }).click();
    await expect(field(guest, 'Name of the wave')).toHaveValue('Fog-signal tone');
    await other.close();
  });

  test('is refused for a wave that does not build', async ({ page }) => {
    await page.goto('/?open=quantise');
    await field(page, 'Bit depth').fill('17');
    await page.getByRole('button', { name: 'Copy link' }).click();
    await expect(page.getByText('A link can carry only a wave that builds')).toBeVisible();
  });

  test('says that it is damaged', async ({ page }) => {
    await page.goto('/');
    const link = await copiedLink(page);
    await page.goto(`${link.slice(0, -20)}`);
    await expect(page.getByText('has been cut or altered on its way')).toBeVisible();
    await page.getByRole('link', { name: 'Go to the bench' }).click();
    await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');
  });
});

test('damaged storage is set aside and told', async ({ page }) => {
  await page.goto('/');
  await page.evaluate(() => localStorage.setItem('stepwell.bench', '{"version":1,"definition":{"sch'));
  await page.reload();
  await expect(page.getByText('Kept work could not be read')).toBeVisible();
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Download it' }).click();
  expect(await textOf(await download)).toBe('{"version":1,"definition":{"sch');
  await page.getByRole('button', { name: 'Let it go' }).click();
  await expect(page.getByText('Kept work could not be read')).toBeHidden();
  await expect(field(page, 'Name of the wave')).toHaveValue('Fog-signal tone');
});

test('two tabs show the newest work, and undo brings this tab’s own back', async ({ page, context }) => {
  await page.goto('/');
  await field(page, 'Name of the wave').fill('Mine');
  const other = await context.newPage();
  await other.goto('/');
  await expect(field(other, 'Name of the wave')).toHaveValue('Mine');
  await field(other, 'Name of the wave').fill('Theirs');
  await expect(field(page, 'Name of the wave')).toHaveValue('Theirs');
  await expect(page.getByText('Another tab of this browser changed the bench')).toBeVisible();
  await page.bringToFront();
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await expect(field(page, 'Name of the wave')).toHaveValue('Mine');
  await expect(field(other, 'Name of the wave')).toHaveValue('Mine');
});

test.describe('export', () => {
  test.use({ permissions: ['clipboard-read', 'clipboard-write'] });

  test('loads its code when the flight opens, not before', async ({ page }) => {
    const scripts: string[] = [];
    page.on('request', (request) => scripts.push(request.url()));
    await page.goto('/');
    await expect(figure(page, 'SNR')).toBeVisible();
    await page.waitForLoadState('networkidle');
    expect(scripts.filter((url) => /export-panel/.test(url))).toEqual([]);
    await flight(page, 'Export').click();
    await expect(page.getByRole('tab', { name: 'fog_signal_tone.h' })).toBeVisible();
    expect(scripts.filter((url) => /export-panel/.test(url))).not.toEqual([]);
  });

  for (const target of ['c99', 'avr']) {
    test(`shows, copies and downloads the same ${target} files that the command line writes`, async ({
      page,
    }) => {
      await page.goto('/?open=export');
      await page.getByRole('combobox', { name: 'Target' }).selectOption(target);
      await page.getByRole('textbox', { name: 'Array name' }).fill('buoyTone');
      if (target === 'avr') await page.getByRole('combobox', { name: 'Port', exact: true }).selectOption('D');
      await expect(page.getByRole('tab', { name: 'buoyTone.h' })).toBeVisible();

      const folder = await mkdtemp(join(tmpdir(), 'stepwell-export-'));
      try {
        const shown = new Map<string, string>();
        for (const tab of await page.getByRole('tab').all()) {
          await tab.click();
          const name = await tab.innerText();
          const code = page.getByRole('textbox', { name: `${name}, read-only` });
          await expect(code).toHaveAttribute('aria-readonly', 'true');
          await page.getByRole('button', { name: `Copy ${name}` }).click();
          await expect(page.getByText(`${name} copied.`)).toBeVisible();
          const copied = await page.evaluate(() => navigator.clipboard.readText());
          const [download] = await Promise.all([
            page.waitForEvent('download'),
            page.getByRole('button', { name: `Download ${name}` }).click(),
          ]);
          expect(download.suggestedFilename()).toBe(name);
          expect(await textOf(download)).toBe(copied);
          const lines = await code.locator('.cm-line').allInnerTexts();
          expect(copied.split('\n').slice(0, 10)).toEqual(
            lines.slice(0, 10).map((line) => line.replace(/\n$/, '')),
          );
          shown.set(name, copied);
        }

        const [definition] = await Promise.all([
          page.waitForEvent('download'),
          page.getByRole('button', { name: 'Download fog_signal_tone.json' }).click(),
        ]);
        await definition.saveAs(join(folder, definition.suggestedFilename()));
        const command = await page.locator('.command-line').innerText();
        const [, args] = command.split('npm run --silent stepwell -- ');
        await promisify(execFile)(
          process.execPath,
          [join(projectFolder, 'server/setup/stepwell.mjs'), ...args.trim().split(/\s+/)],
          { cwd: folder },
        );
        const written = (await readdir(folder)).filter((name) => name !== 'fog_signal_tone.json');
        expect(written.sort()).toEqual([...shown.keys()].sort());
        for (const name of written) expect(await readFile(join(folder, name), 'utf8')).toBe(shown.get(name));
      } finally {
        await rm(folder, { recursive: true });
      }
    });
  }

  test('refuses an array name that C does not take, beside the field', async ({ page }) => {
    await page.goto('/?open=export');
    await page.getByRole('textbox', { name: 'Array name' }).fill('2nd-tone');
    await expect.poll(() => saidBeside(page, 'Array name')).toContain('"2nd-tone" is not allowed');
    await page.getByRole('textbox', { name: 'Array name' }).fill('volatile');
    await expect.poll(() => saidBeside(page, 'Array name')).toContain('"volatile" is not allowed');
    await page.getByRole('textbox', { name: 'Array name' }).fill('');
    await expect(page.getByRole('tab', { name: 'fog_signal_tone.c' })).toBeVisible();
  });
});

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
