import AxeBuilder from '@axe-core/playwright';
import { readFile } from 'node:fs/promises';
import { expect, test, type Page } from '@playwright/test';
import { readWav } from '../../shared/imports/index.ts';
import { deviceKinds, gainOf, type ResponsePoint } from '../../shared/listening/index.ts';
import { test as quietTest } from '../support/bench-page.ts';
import { heardOf, overhear, play } from '../support/listening.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);
const toneHz = 250;
const harmonics = [1, 2, 3, 5, 8] as const;

/** Full scale of a table at the volume that it starts with. */
const startDbfs = -18;

/** Frames that come to the test in one piece; a busy machine loses a piece here and there. */
const piece = 4_096;

/** Level of a sine in dBFS: the middle one of all pieces, each under a Blackman–Harris window. */
function levelOf(frames: ArrayLike<number>, hz: number, rateHz: number): number {
  const length = piece;
  const levels: number[] = [];
  for (let first = 0; first + length <= frames.length; first += length) {
    let [re, im, sum] = [0, 0, 0];
    for (let i = 0; i < length; i += 1) {
      const turn = (2 * Math.PI * i) / length;
      const window =
        0.35875 - 0.48829 * Math.cos(turn) + 0.14128 * Math.cos(2 * turn) - 0.01168 * Math.cos(3 * turn);
      re += window * frames[first + i] * Math.cos((2 * Math.PI * hz * i) / rateHz);
      im += window * frames[first + i] * Math.sin((2 * Math.PI * hz * i) / rateHz);
      sum += window;
    }
    levels.push(dB((2 * Math.hypot(re, im)) / sum));
  }
  return levels.sort((a, b) => a - b)[Math.floor(levels.length / 2)];
}

const levelsOf = (frames: ArrayLike<number>, rateHz: number) =>
  harmonics.map((n) => levelOf(frames, n * toneHz, rateHz));

async function openParts(page: Page): Promise<void> {
  await page.goto('/?open=output&more=device,keep-sound');
  await expect(through(page)).toBeVisible({ timeout: 15_000 });
}

const through = (page: Page) => page.getByRole('combobox', { name: 'Heard through' });
const textbox = (page: Page, name: string) => page.getByRole('textbox', { name, exact: true });

/** What the page sends to its loudspeaker, once it has been the same twice: a machine that lags behind leaves gaps. */
async function heardLevels(page: Page): Promise<number[]> {
  const [rateHz] = await heardOf(page).rates();
  const listen = async () => {
    await heardOf(page).forget();
    await page.waitForTimeout(600);
    return levelsOf(await heardOf(page).frames(), rateHz);
  };
  let levels = await listen();
  await expect(async () => {
    const before = levels;
    levels = await listen();
    expectWithin(levels, before, 0.02, 'the same twice');
  }).toPass({ timeout: 15_000 });
  return levels;
}

/** Waits until what is heard has come to these levels, and gives what they are. */
async function hears(
  page: Page,
  wanted: readonly number[],
  tolerance: number,
  what: string,
): Promise<number[]> {
  let levels: number[] = [];
  await expect(async () => {
    levels = await heardLevels(page);
    expectWithin(levels, wanted, tolerance, what);
  }).toPass({ timeout: 25_000 });
  return levels;
}

const gains = (points: readonly ResponsePoint[]) => harmonics.map((n) => dB(gainOf(points)(n * toneHz)));

function expectWithin(levels: readonly number[], wanted: readonly number[], tolerance: number, what: string) {
  levels.forEach((level, k) =>
    expect(Math.abs(level - wanted[k]), `${what}, ${harmonics[k] * toneHz} Hz`).toBeLessThan(tolerance),
  );
}

test('a device changes each line as its curve says, and the kept file holds what is heard', async ({
  page,
}) => {
  await overhear(page);
  await openParts(page);
  await textbox(page, 'Tone').fill(String(toneHz));
  await play(page).click();
  await expect(page.getByText(/^Playing the quantised table/)).toBeVisible();
  const straight = await heardLevels(page);

  const [, handset] = deviceKinds;
  await through(page).selectOption({ label: handset.name });
  const expected = gains(handset.points).map((gain, k) => straight[k] + gain);
  const throughHandset = await hears(page, expected, 0.25, 'handset');

  // The file, at another rate and depth, against what the page plays.
  const keep = page.getByRole('group', { name: 'Keep a sound' });
  await keep.getByRole('radio', { name: '24', exact: true }).check();
  await page.getByRole('combobox', { name: 'Rate of the file' }).selectOption({ label: '96 kHz' });
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Save as WAV' }).click(),
  ]);
  expect(download.suggestedFilename()).toBe('fog_signal_tone_250hz_96000hz_24bit.wav');
  const kept = page.getByText(`Saved ${download.suggestedFilename()}`);
  const said = (await kept.innerText()).replaceAll('\u00a0', ' ');
  expect(said).toContain('2 s, 576,044 bytes. Peak −1.00 dBFS');
  const gainDb = Number(/full scale is (−?[\d.]+)/.exec(said)?.[1].replace('−', '-'));
  const whole = readWav(await readFile(await download.path()));
  expect(whole).toMatchObject({ sampleRateHz: 96_000, header: { sampleBits: 24, channels: 1 } });
  const asPlayed = levelsOf(whole.samples, 96_000).map((level) => level - gainDb + startDbfs);
  expectWithin(asPlayed, throughHandset, 0.1, 'file through the handset');

  // An edited point is heard and kept; then the file without the device, whose peak would be beyond full scale.
  await textbox(page, 'Level of point 3').fill('-30');
  const points = handset.points.map((point, k) => (k === 2 ? { ...point, db: -30 } : point));
  const edited = gains(points).map((gain, k) => straight[k] + gain);
  expect(Math.abs(edited[0] - expected[0])).toBeGreaterThan(5);
  await hears(page, edited, 0.25, 'edited handset');
  await page.getByRole('switch', { name: 'Through “Handset receiver”' }).press('Space');
  await keep.getByRole('radio', { name: 'As the table’s' }).check();
  await page.getByRole('button', { name: 'Save as WAV' }).click();
  await expect(page.getByText(/Nothing was saved: .* it peaks at 0\.01\sdBFS/)).toBeVisible();
  const [other] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Keep it as 32-bit float' }).click(),
  ]);
  const float = readWav(await readFile(await other.path()));
  expect(float.header).toMatchObject({ isFloat: true, sampleBits: 32 });
  const straightFile = levelsOf(float.samples, 96_000).map((level) => level + startDbfs);
  expectWithin(straightFile, straight, 0.1, 'file, straight');

  // The browser remembers the curves, but plays straight until one is chosen.
  await page.reload();
  await expect(through(page)).toHaveValue('straight');
  await through(page).selectOption({ label: handset.name });
  await expect(textbox(page, 'Level of point 3')).toHaveValue('-30');
  await page.getByRole('button', { name: 'Back to the curve it came with' }).click();
  await expect(textbox(page, 'Level of point 3')).toHaveValue('-10');
});

quietTest(
  'a curve of one’s own is refused by line, asked about, and typed, by keyboard alone',
  async ({ page }) => {
    await openParts(page);
    await through(page).focus();
    await page.keyboard.press('End');
    await expect(through(page)).toHaveValue('own');
    const text = page.getByRole('textbox', { name: 'Own curve' });
    const take = page.getByRole('button', { name: 'Take the text' });
    const fileInput = page.getByLabel('File with a response curve');
    for (const [csv, fault] of [
      ['Hz;dB\n300;-3\n3400;much\n', 'Line 3, column 6: "much" is not allowed; allowed: a number.'],
      [
        '300,-3\n200,0\n',
        'Line 2, column 1: 200 is not allowed; allowed: more than the 300 Hz of the point before it.',
      ],
      ['300\n3400\n', 'File: 1 column is not allowed; allowed: two columns'],
    ]) {
      await text.fill(csv);
      await take.focus();
      await page.keyboard.press('Enter');
      await expect(page.getByText(fault)).toBeVisible();
      await expect(text).toHaveValue(csv);
    }
    await fileInput.setInputFiles({
      name: 'Buoy horn.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from('Hz;dB\n300;91,5\n3000;94,25\n'),
    });
    await expect(page.getByText('“91,5” can be read in two ways')).toBeVisible();
    await page.getByRole('button', { name: '91,5 is 91.5' }).focus();
    await page.keyboard.press('Enter');
    await expect(textbox(page, 'Level of point 2')).toHaveValue('94.25');
    await expect(page.getByText('no device’s data')).toBeVisible();
    await expect(page.locator('.plot-response figcaption')).toContainText(
      'Buoy horn: 2 points from 300 Hz to 3 kHz',
    );

    // A point out of order stays as it was typed; the curve that was allowed goes on.
    await textbox(page, 'Frequency of point 2').fill('200');
    await expect(page.getByText('more than the 300 Hz of the point before it')).toBeVisible();
    await expect(page.getByText('keep the last curve that was allowed')).toBeVisible();
    await page.getByRole('button', { name: 'Put in order' }).press('Enter');
    await expect(textbox(page, 'Frequency of point 1')).toHaveValue('200');
    await page.getByRole('button', { name: 'Insert a point after point 1' }).press('Enter');
    await expect(textbox(page, 'Frequency of point 2')).toHaveValue('244.9');
    await page.reload();
    await through(page).selectOption({ label: 'Own curve' });
    await expect(textbox(page, 'Frequency of point 2')).toHaveValue('244.9');
  },
);

quietTest('a long file tells how far it is and can be stopped', async ({ page }) => {
  await openParts(page);
  const keep = page.getByRole('group', { name: 'Keep a sound' });
  await page.getByRole('combobox', { name: 'Rate of the file' }).selectOption({ label: '192 kHz' });
  await textbox(page, 'Length').fill('61');
  await expect(keep.getByText('61 is not allowed')).toBeVisible();
  await textbox(page, 'Length').fill('60');
  await through(page).selectOption({ label: 'Small piezo' });
  await page.getByRole('button', { name: 'Save as WAV' }).press('Enter');
  await expect(keep.getByRole('progressbar')).toBeVisible();
  await page.getByRole('button', { name: 'Stop making the file' }).press('Enter');
  await expect(keep.getByText('Stopped. Nothing was saved.')).toBeVisible();
});

for (const colorScheme of ['light', 'dark'] as const) {
  quietTest.describe(`on a phone, ${colorScheme}`, () => {
    quietTest.use({ colorScheme, viewport: { width: 390, height: 844 } });

    quietTest(
      'the curve and the file have no barrier that axe finds, nor any sideways scroll',
      async ({ page }) => {
        await openParts(page);
        await through(page).selectOption({ label: 'Small cone' });
        await textbox(page, 'Frequency of point 2').fill('20');
        await expect(page.getByText('Level of this sound through it')).toBeVisible();
        await page.getByRole('combobox', { name: 'Rate of the file' }).selectOption({ label: 'Another' });
        await textbox(page, 'Own rate').fill('7999');
        const { violations } = await new AxeBuilder({ page }).include('.listen').analyze();
        expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
        expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
      },
    );
  });
}
