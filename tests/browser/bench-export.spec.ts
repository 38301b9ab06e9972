import { execFile } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { expect } from '@playwright/test';
import { projectFolder } from '../../server/project-folder.ts';
import { figure, flight, saidBeside, test, textOf } from '../support/bench-page.ts';

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

  for (const target of ['c99', 'avr', 'rust']) {
    test(`shows, copies and downloads the same ${target} files that the command line writes`, async ({
      page,
    }) => {
      await page.goto('/?open=export');
      await page.getByRole('combobox', { name: 'Target' }).selectOption(target);
      await page.getByRole('textbox', { name: 'Array name', exact: true }).fill('buoyTone');
      await page
        .getByRole('textbox', { name: 'Licence line' })
        .fill("Ninth Fathom's own; $HOME stays as it is");
      if (target === 'avr') {
        await page.getByRole('combobox', { name: 'Port', exact: true }).selectOption('D');
        await page.getByRole('combobox', { name: 'Playback' }).selectOption('timer');
        await page.getByRole('textbox', { name: 'Compare value' }).fill('999');
      }
      await expect(
        page.getByRole('tab', { name: `buoyTone.${target === 'rust' ? 'rs' : 'h'}`, exact: true }),
      ).toBeVisible();
      await expect(page.getByText(/^Proven: \d+ cases, by /)).toBeVisible();

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
        const stepwell = `${process.execPath} ${join(projectFolder, 'server/setup/stepwell.mjs')}`;
        expect(command).toContain('npm run --silent stepwell -- ');
        await promisify(execFile)('sh', ['-c', command.replace('npm run --silent stepwell --', stepwell)], {
          cwd: folder,
        });
        const written = (await readdir(folder)).filter((name) => name !== 'fog_signal_tone.json');
        expect(written.sort()).toEqual([...shown.keys()].sort());
        for (const name of written) expect(await readFile(join(folder, name), 'utf8')).toBe(shown.get(name));
      } finally {
        await rm(folder, { recursive: true });
      }
    });
  }

  test('shows bytes in hexadecimal, downloads them as the command line writes them, offers what applies', async ({
    page,
  }) => {
    await page.goto('/?open=export');
    await page.getByRole('combobox', { name: 'Target' }).selectOption('wav');
    await expect(page.getByRole('textbox', { name: 'Licence line' })).toHaveCount(0);
    await page.getByText('Storage', { exact: true }).click();
    await page.getByRole('textbox', { name: 'Sample rate' }).fill('8000');
    await expect(page.getByText(/52 49 46 46/)).toBeVisible();
    const [sound] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Download fog_signal_tone.wav' }).click(),
    ]);
    const bytes = await readFile(await sound.path());
    expect(bytes.subarray(0, 4).toString('latin1')).toBe('RIFF');
    expect(bytes.readUInt32LE(24)).toBe(8000);
    await page.getByRole('combobox', { name: 'Target' }).selectOption('avr');
    await expect(page.getByRole('combobox', { name: 'Unrolled' })).toBeVisible();
    await expect(page.getByRole('textbox', { name: 'Ramp words' })).toHaveCount(0);
    await page.getByRole('combobox', { name: 'Playback' }).selectOption('once');
    await expect(page.getByRole('combobox', { name: 'Unrolled' })).toHaveCount(0);
    await page.getByRole('textbox', { name: 'Ramp words' }).fill('5000');
    await expect.poll(() => saidBeside(page, 'Ramp words')).toContain('"5000" is not allowed');
    await page.getByRole('textbox', { name: 'Ramp words' }).fill('5');
    await page.getByText(/^Proven: \d+ cases/).click();
    await expect(page.getByRole('region', { name: 'Proofs' }).getByRole('row')).not.toHaveCount(0);
    await expect(page.getByRole('cell', { name: '7 cycles a word' }).first()).toBeVisible();
  });

  test('refuses an array name that C does not take, beside the field', async ({ page }) => {
    await page.goto('/?open=export');
    await page.getByRole('textbox', { name: 'Array name', exact: true }).fill('2nd-tone');
    await expect.poll(() => saidBeside(page, 'Array name')).toContain('"2nd-tone" is not allowed');
    await page.getByRole('textbox', { name: 'Array name', exact: true }).fill('volatile');
    await expect.poll(() => saidBeside(page, 'Array name')).toContain('"volatile" is not allowed');
    await page.getByRole('textbox', { name: 'Array name', exact: true }).fill('');
    await expect(page.getByRole('tab', { name: 'fog_signal_tone.c' })).toBeVisible();
  });
});
