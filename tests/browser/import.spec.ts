import { execFileSync } from 'node:child_process';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { figure } from '../support/bench-page.ts';
import { beginWithTeam, read, readTable, test } from '../support/library-page.ts';

const dialog = (page: Page) => page.getByRole('dialog', { name: 'Bring in' });
const press = (page: Page, name: string | RegExp) => dialog(page).getByRole('button', { name }).click();

async function openBringIn(page: Page): Promise<void> {
  await page.goto('/?open=shape');
  await page.getByRole('button', { name: 'Bring in …' }).click();
  await expect(dialog(page)).toBeVisible();
}

const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
async function expectAccessible(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect(
      (await new AxeBuilder({ page }).include('dialog[open]').withTags(tags).analyze()).violations,
    ).toEqual([]);
  }
}

/** A sawtooth of known pitch under noise, by another program. */
function soundFile(path: string, toneHz: number, seconds = 1.5): string {
  execFileSync('sox', [
    ...['-R', '-n', '-r', '48000', '-b', '16', '-c', '2', path],
    ...[
      'synth',
      String(seconds),
      'sawtooth',
      String(toneHz),
      'sine',
      '100',
      'fade',
      '0.1',
      '0',
      '0.1',
      'gain',
      '-6',
    ],
  ]);
  return path;
}

test('a recording becomes a saved table in six steps, with its file beside it', async ({ page }, info) => {
  const { team } = await beginWithTeam(page);
  const file = soundFile(info.outputPath('fog horn.wav'), 219.7);

  await openBringIn(page);
  await dialog(page).getByLabel('Files to bring in').setInputFiles(file);
  await expect(dialog(page).getByText('219.7 Hz')).toBeVisible();
  await press(page, 'Put the cycle on the bench');
  await expect(page.getByText('fog horn is on the bench.')).toBeVisible();
  await expect(figure(page, 'SNR')).toBeVisible();
  // The file outlives a reload, as the wave does.
  await page.reload();
  await expect(figure(page, 'SNR')).toBeVisible();
  await page.keyboard.press('Control+s');
  await page.getByRole('dialog', { name: /^Save/ }).getByRole('button', { name: 'Save' }).click();
  await expect(page.getByText('This is revision 1 of fog horn')).toBeVisible();

  const { revisions } = await readTable(page.request, team, 'fog-horn');
  expect(revisions).toHaveLength(1);
  const path = `/teams/${team}/tables/fog-horn/revisions/1`;
  const { playback } = await read<{ playback: { toneHz: number } }>(page.request, path);
  expect(playback.toneHz).toBeCloseTo(219.7, 1);
  await expect
    .poll(async () => (await read<{ items: object[] }>(page.request, `${path}/originals`)).items)
    .toMatchObject([{ name: 'fog horn.wav', kind: 'recording', bytes: readFileSync(file).length }]);

  await page.goto(`/teams/${team}/tables/fog-horn`);
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'fog horn.wav' }).click(),
  ]);
  expect(readFileSync(await download.path()).equals(readFileSync(file))).toBe(true);
  await page.getByRole('button', { name: 'Remove the file fog horn.wav' }).click();
  await expect(page.getByRole('link', { name: 'fog horn.wav' })).toHaveCount(0);
});

test('the bounds of a cycle move by keys and by dragging, and the seam tells how well it closes', async ({
  page,
}, info) => {
  await openBringIn(page);
  const speech = info.outputPath('voice.wav');
  execFileSync('espeak-ng', ['-w', speech, '-p', '40', 'aaaaaaaaaaaa']);
  await dialog(page).getByLabel('Files to bring in').setInputFiles(speech);
  await expect(dialog(page).getByText(/One cycle of [\d.]+.samples/)).toBeVisible();
  await press(page, 'Choose something else');

  await dialog(page)
    .getByLabel('Files to bring in')
    .setInputFiles(soundFile(info.outputPath('horn.wav'), 220));
  const seam = dialog(page).getByRole('group', { name: 'Step at the seam' });
  await expect(seam).toContainText('no larger than the steps within');
  await dialog(page).getByRole('combobox', { name: 'Channel' }).selectOption('2');
  await expect(dialog(page).getByText('100 Hz')).toBeVisible();

  await dialog(page).getByRole('radio', { name: 'As cut' }).check();
  const end = dialog(page).getByRole('slider', { name: 'End of the cycle' });
  const before = Number(await end.getAttribute('aria-valuenow'));
  await end.focus();
  for (let i = 0; i < 6; i += 1) await page.keyboard.press('Shift+ArrowRight');
  await expect(end).toHaveAttribute('aria-valuenow', String(before + 60));
  await expect(seam).toContainText('larger than any step within');
  const place = await end.boundingBox();
  if (place === null) throw new Error('The bound is not on the drawing.');
  await page.mouse.move(place.x + place.width / 2, place.y + place.height / 2);
  await page.mouse.down();
  await page.mouse.move(place.x + place.width / 2 + 30, place.y + place.height / 2, { steps: 3 });
  await page.mouse.up();
  expect(Number(await end.getAttribute('aria-valuenow'))).toBeGreaterThan(before + 61);

  await dialog(page).getByRole('radio', { name: 'Harmonics' }).check();
  await expect(seam).toContainText('no larger than the steps within');
  await press(page, 'Find the period here');
  await expect(dialog(page).getByText('100 Hz')).toBeVisible();
  await expectAccessible(page);
  await press(page, 'Put the cycle on the bench');
  await expect(page.getByRole('radio', { name: 'Harmonics', exact: true })).toBeChecked();
});

test('a pasted array shows what is wrong with it and a better table beside it', async ({ page }) => {
  await openBringIn(page);
  const text = dialog(page).getByRole('textbox', { name: 'Or paste text' });
  await text.fill('const uint8_t sine[256] = { 1, 2,\n 3 4 };');
  await press(page, 'Read the text');
  await expect(dialog(page).getByRole('alert')).toContainText('Line 2, column 4: "4" is not allowed');
  await expect(text).toHaveValue(/sine/);

  // Made over 255 entries, around 100, from 40 to 160: as tables are found.
  const codes = Array.from({ length: 256 }, (_, k) =>
    Math.round(100 + 60 * Math.sin((2 * Math.PI * k) / 255)),
  );
  await text.fill(`#define N 256\nconst uint8_t sine[N] PROGMEM = {\n${codes.join(', ')}\n};\n`);
  await press(page, 'Read the text');
  const row = (name: string) => dialog(page).getByRole('row').filter({ hasText: name });
  await expect(row('Bits really used')).toContainText('8 of 8');
  await expect(row('Lost codes')).toContainText('135 of 256');
  await expect(row('Lost codes')).toContainText('0 of 256');
  await expect(row('Last entry repeats the first')).toContainText('yes');
  await expect(row('Last entry repeats the first')).toContainText('no');
  await expect(row('DC')).toContainText('−27.');
  await expectAccessible(page);
  await press(page, 'Put the better table on the bench');
  await expect(page.getByRole('textbox', { name: 'Name of the wave' })).toHaveValue('sine');
  await expect(figure(page, 'SNR')).toContainText(/4[89]|5\d/);

  await page.getByRole('button', { name: 'Undo', exact: true }).first().click();
  await page.getByRole('button', { name: 'Bring in …' }).click();
  await dialog(page)
    .getByRole('textbox', { name: 'Or paste text' })
    .fill('volts;lux\n1,500;2\n2,250;3\n1,750;1\n');
  await press(page, 'Read the text');
  await press(page, /^volts/);
  await press(page, '1,500 is 1.5');
  await press(page, 'Put 3 numbers on the bench');
  await expect(page.getByRole('radio', { name: 'Samples' })).toBeChecked();
});

test('a folder of thirty files becomes drafts; two are refused by name', async ({ page }, info) => {
  const { team } = await beginWithTeam(page);
  const folder = info.outputPath('old');
  mkdirSync(folder);
  for (let k = 0; k < 26; k += 1) {
    const codes = Array.from({ length: 64 }, (_, i) =>
      Math.round(127.5 + 127.5 * Math.sin((2 * Math.PI * i) / 64 + k)),
    );
    writeFileSync(`${folder}/tone${k}.c`, `const uint8_t tone_${k}[] = { ${codes.join(', ')} };\n`);
  }
  writeFileSync(`${folder}/ramp.csv`, 'volts\n0\n0.5\n1\n');
  soundFile(`${folder}/horn.wav`, 330, 0.5);
  writeFileSync(`${folder}/cut.wav`, readFileSync(`${folder}/horn.wav`).subarray(0, 1000));
  writeFileSync(`${folder}/open.c`, 'uint8_t a[] = { 1, 2');

  await page.goto(`/teams/${team}/tables`);
  await page.getByRole('link', { name: 'Bring in what exists' }).click();
  await dialog(page).getByLabel('Folder to bring in').setInputFiles(folder);
  await expect(dialog(page).getByText('28 drafts found, 2 files refused.')).toBeVisible();
  const refused = dialog(page).getByRole('region', { name: 'Refused files' });
  await expect(refused).toContainText('old/cut.wav: File: a header that claims');
  await expect(refused).toContainText('old/open.c: Line 1, column 15: "{" that is never closed');
  await expectAccessible(page);
  await press(page, /^Save 28 drafts in/);
  await expect(dialog(page).getByRole('listitem').filter({ hasText: ': saved' })).toHaveCount(28, {
    timeout: 30_000,
  });
  const { items } = await read<{ items: { slug: string }[] }>(
    page.request,
    `/teams/${team}/tables?limit=100`,
  );
  expect(items).toHaveLength(28);
  const originals = await read<{ items: { name: string }[] }>(
    page.request,
    `/teams/${team}/tables/horn/revisions/1/originals`,
  );
  expect(originals.items.map(({ name }) => name)).toEqual(['horn.wav']);
});
