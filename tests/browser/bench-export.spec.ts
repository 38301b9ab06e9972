import { execFile } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import AxeBuilder from '@axe-core/playwright';
import { expect } from '@playwright/test';
import { projectFolder } from '../../server/project-folder.ts';
import { figure, flight, saidBeside, test, textOf } from '../support/bench-page.ts';
import { beginWithTeam, post } from '../support/library-page.ts';

const stepwell = `${process.execPath} ${join(projectFolder, 'server/setup/stepwell.mjs')}`;

/** Runs the command line that a page shows, in a folder that holds the definition. */
function runShown(command: string, folder: string) {
  expect(command).toContain('npm run --silent stepwell -- ');
  return promisify(execFile)('sh', ['-c', command.replace('npm run --silent stepwell --', stepwell)], {
    cwd: folder,
  });
}

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
        await runShown(await page.locator('.command-line').innerText(), folder);
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

  test('takes clock and pins from the chosen board, under what is set by hand', async ({ page }) => {
    const { team } = await beginWithTeam(page);
    const ladder = (name: string, hz: number, places: string) => ({
      schema: 1,
      name,
      clock: { hz },
      output: {
        kind: 'ladder',
        bits: places.split(' ').length,
        R: 10_000,
        portMap: {
          bits: places.split(' ').map(([port, pin]) => ({ port, pin: Number(pin) })),
          ports: ['B', 'D'].map((port) => ({ name: port, reserved: [{ pin: 7, rest: 'high' }] })),
        },
      },
    });
    const boards = {
      buoy: ladder('Buoy', 16_000_000, 'B0 B1 B3 B4 D3 D2 D1 D0'),
      lamp: ladder('Lamp', 8_000_000, 'D0 D1 D2 D3 B0 B1 B2 B3'),
      long: ladder('Long', 8_000_000, 'B0 B1 B2 B3 B4 D0 D1 D2 D3 D4'),
      chip: { schema: 1, name: 'Chip', clock: { hz: 4_000_000 }, output: { kind: 'on-chip', bits: 8 } },
    };
    for (const board of Object.values(boards)) await post(page.request, `/teams/${team}/boards`, { board });

    const clock = page.getByRole('textbox', { name: 'Clock', exact: true });
    const map = page.getByRole('textbox', { name: 'Port map' });
    const board = page.getByRole('combobox', { name: 'Board', exact: true });
    const of = (name: string) => page.getByRole('region', { name: `From the board ${name}` });
    await page.goto(`/?open=output,export&more=stage&board=${team}/buoy`);
    await page.getByRole('combobox', { name: 'Target' }).selectOption('avr');
    await page.getByRole('combobox', { name: 'Playback' }).selectOption('timer');
    await expect(of('Buoy')).toContainText('From the board Buoy: clock and pins.');
    await expect(map).toHaveValue('B.0 B.1 B.3 B.4 D.3 D.2 D.1 D.0');
    await expect(map).toHaveAccessibleDescription(/^From the board Buoy\./);
    await clock.fill('');
    await clock.pressSequentially('1000000');
    await expect(clock).toHaveAccessibleDescription(/^Set by hand; the board Buoy has 16000000\./);

    // By hand stays by hand on another board; what is not goes with the board.
    await board.selectOption({ label: 'Lamp' });
    await expect(map).toHaveValue('D.0 D.1 D.2 D.3 B.0 B.1 B.2 B.3');
    await expect(clock).toHaveValue('1000000');
    await expect(of('Lamp')).toContainText('pins. Set by hand: clock');
    await page.getByRole('button', { name: 'Take the board’s' }).click();
    await expect(clock).toHaveValue('8000000');
    await page.keyboard.press('Control+z');
    await expect(clock).toHaveValue('1000000');

    // Shown, from the command line as shown, and from the board's file: the same bytes, the pins in them.
    const folder = await mkdtemp(join(tmpdir(), 'stepwell-export-'));
    try {
      const [definition] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: 'Download fog_signal_tone.json' }).click(),
      ]);
      await definition.saveAs(join(folder, definition.suggestedFilename()));
      const [header] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: 'Download fog_signal_tone.h' }).click(),
      ]);
      const shown = await textOf(header);
      expect(shown).toContain(
        'Port map    D.0 D.1 D.2 D.3 B.0 B.1 B.2 B.3\n *   Reserved    D.7=high B.7=high, baked',
      );
      const command = await page.locator('.command-line').innerText();
      await writeFile(join(folder, 'lamp.json'), JSON.stringify(boards.lamp));
      const byBoard = `npm run --silent stepwell -- render fog_signal_tone.json --target avr --playback timer`;
      for (const line of [command, `${byBoard} --board lamp.json --clock-hz 1000000 --out .`]) {
        await runShown(line, folder);
        expect(await readFile(join(folder, 'fog_signal_tone.h'), 'utf8')).toBe(shown);
        const main = await readFile(join(folder, 'fog_signal_tone_main.c'), 'utf8');
        expect(main).toContain('1000000 Hz / 500 is the sample rate');
      }
    } finally {
      await rm(folder, { recursive: true });
    }

    // What does not go says so in place, with a way on.
    await board.selectOption({ label: 'Long' });
    await expect(of('Long')).toContainText('The pins of Long do not go with this table and these options');
    await expect.poll(() => saidBeside(page, 'Port map')).toContain('one place for each of the 8 bits');
    await page.getByRole('button', { name: 'Go without its pins' }).click();
    await expect(page.getByRole('tab', { name: 'fog_signal_tone.h' })).toBeVisible();
    await expect(map).toHaveAccessibleDescription(/^Set by hand; the board Long has B\.0/);
    await board.selectOption({ label: 'Chip' });
    await expect(of('Chip')).toContainText(
      '✗ Not taken: its converter on the chip, 8 bits in a register of 16, right-aligned; what plays writes the words to port pins.',
    );
    const { violations } = await new AxeBuilder({ page })
      .include('.board-share')
      .include('.option-group')
      .analyze();
    expect(violations).toEqual([]);
  });
});
