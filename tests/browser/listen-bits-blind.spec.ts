import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { tabulate } from '../../shared/build-table.ts';
import { codesWithBitsOff, levelsOfTable, lowestBits, staircaseLines } from '../../shared/listening/index.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { beginWithTeam, isKnown, saveTable } from '../support/library-page.ts';
import { heardOf, openListening, overhear, play } from '../support/listening.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);
const recess = (page: Page, title: string) => page.locator('summary').filter({ hasText: title });
const fogSignal = tabulate(examples[0].work.definition);
const toneHz = 220;

/** What was heard in a stretch, and the rate of its frames. */
interface Stretch {
  readonly frames: readonly number[];
  readonly rateHz: number;
}

const rateOf = (page: Page) =>
  page.evaluate(
    () => (window as unknown as { heard: { contexts: AudioContext[] } }).heard.contexts[0].sampleRate,
  );

/** 11 periods of the tone, a whole number of frames at the usual rates. */
const repeatSeconds = 0.05;
const stretchSeconds = 0.25;

/** A quarter of a second in which each frame comes again a little later; null until what is heard has settled. */
function wholeStretch(frames: readonly number[], rateHz: number): Stretch | null {
  const period = rateHz * repeatSeconds;
  const peak = frames.reduce((most, frame) => Math.max(most, Math.abs(frame)), 0);
  let from = 0;
  for (let n = period; n < frames.length; n += 1) {
    if (Math.abs(frames[n] - frames[n - period]) > 1e-3 * peak) from = n;
    else if (n - from >= rateHz * stretchSeconds) return { frames: frames.slice(from, n), rateHz };
  }
  return null;
}

const largestStep = (frames: readonly number[]) =>
  frames.reduce((step, value, i) => (i === 0 ? 0 : Math.max(step, Math.abs(value - frames[i - 1]))), 0);

/** What is heard by now. */
async function hearOn(page: Page): Promise<Stretch> {
  const rateHz = await rateOf(page);
  await page.waitForTimeout(250);
  for (let attempt = 0; attempt < 20; attempt += 1) {
    await heardOf(page).forget();
    await page.waitForTimeout(800);
    const stretch = wholeStretch(await heardOf(page).frames(), rateHz);
    if (stretch !== null) return stretch;
  }
  throw new Error('What is heard never came through whole.');
}

/** Amplitude at a frequency in Hz, under a Hann window. */
function amplitudeAt({ frames, rateHz }: Stretch, hz: number): number {
  let [re, im, weight] = [0, 0, 0];
  frames.forEach((frame, n) => {
    const window = 1 - Math.cos((2 * Math.PI * n) / frames.length);
    re += window * frame * Math.cos((2 * Math.PI * hz * n) / rateHz);
    im += window * frame * Math.sin((2 * Math.PI * hz * n) / rateHz);
    weight += window;
  });
  return (2 * Math.hypot(re, im)) / weight;
}

/** RMS under a Hann window: the ends of the stretch do not count. */
function rmsOf({ frames }: Stretch): number {
  let [power, weight] = [0, 0];
  frames.forEach((frame, n) => {
    const window = 1 - Math.cos((2 * Math.PI * n) / frames.length);
    power += window * frame * frame;
    weight += window;
  });
  return Math.sqrt(power / weight);
}

test('bits are switched off while it plays, and what is heard is the table without them', async ({
  page,
}) => {
  test.slow();
  await overhear(page);
  await openListening(page);
  await recess(page, 'Bits by ear').click();
  const bits = page.getByRole('group', { name: 'Bits, most significant first' });
  await expect(bits.getByRole('button')).toHaveCount(8);
  const figures = page.getByRole('region', { name: 'Figures with these bits off' });
  const sinad = figures.getByRole('group', { name: 'SINAD left' }).locator('output');
  const added = figures.getByRole('group', { name: 'Strongest line added' }).locator('output');
  // With all bits on it is the report's own.
  await expect(sinad).toHaveText((fogSignal.report.sinadDb ?? NaN).toFixed(1));
  await play(page).click();
  const whole = await hearOn(page);

  await heardOf(page).forget();
  const bottom = page.getByRole('slider', { name: 'Off from the bottom up' });
  await bottom.focus();
  for (let count = 0; count < 4; count += 1) await page.keyboard.press('ArrowRight');
  await expect(page.getByText('Heard: the quantised table with bits 0 to 3 off.')).toBeVisible();
  await page.waitForTimeout(300);
  const change = await heardOf(page).frames();
  const cut = await hearOn(page);
  // No gap and no click: it steps no more than either sound does by itself.
  expect(largestStep(change)).toBeLessThan(
    1.1 * Math.max(largestStep(whole.frames), largestStep(cut.frames)),
  );
  const levels = levelsOfTable(fogSignal.definition.table);
  const left = Float64Array.from(codesWithBitsOff(fogSignal.codes, lowestBits(4)), (code) => levels[code]);
  const [expected, before] = [staircaseLines(left, 40), staircaseLines(fogSignal.values, 40)];
  const amplitude = ({ re, im }: typeof expected, m: number) => Math.hypot(re[m], im[m]);
  const scale = amplitudeAt(whole, toneHz) / amplitude(before, 1);
  for (let m = 1; m <= 40; m += 1) {
    const line = amplitude(expected, m);
    if (dB(line) < -50) continue;
    expect(Math.abs(dB(amplitudeAt(cut, m * toneHz) / (scale * line))), `line ${m}`).toBeLessThan(0.1);
  }

  // Bit 4 is off too, and the lowest is back.
  await page.getByRole('button', { name: 'Bit 4' }).click();
  await page.getByRole('button', { name: 'Bit 0, least significant' }).click();
  await expect(page.getByRole('button', { name: 'Bit 0, least significant' })).toHaveAttribute(
    'aria-pressed',
    'true',
  );
  await expect(page.getByText('Heard: the quantised table with bits 1, 2, 3 and 4 off.')).toBeVisible();
  await expect(added).not.toHaveText('…');
  const { violations } = await new AxeBuilder({ page }).include('.listen').analyze();
  expect(violations).toEqual([]);

  await page.getByRole('button', { name: 'All bits on' }).click();
  await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
  await expect(sinad).toHaveText((fogSignal.report.sinadDb ?? NaN).toFixed(1));
});

/** The browser's coin falls as the test wants it. */
async function stubCoin(page: Page, falls: readonly number[]): Promise<void> {
  await page.addInitScript((bytes) => {
    const real = crypto.getRandomValues.bind(crypto);
    let thrown = 0;
    crypto.getRandomValues = (<View extends ArrayBufferView>(view: View) => {
      if (!(view instanceof Uint8Array) || view.length !== 1) return real(view as never);
      view[0] = bytes[thrown % bytes.length];
      thrown += 1;
      return view;
    }) as typeof crypto.getRandomValues;
  }, falls);
}

const [heads, tails] = [0, 255];

/** Ids that React gives out by the order in which parts load, named by the order in which they stand. */
function inOrder(html: string): string {
  const ids = new Map<string, string>();
  return html.replace(/_r_\w+?_/g, (id) => {
    const name = ids.get(id) ?? `id-${ids.size}`;
    ids.set(id, name);
    return name;
  });
}

async function openBlind(page: Page): Promise<void> {
  await overhear(page);
  await openListening(page);
  await recess(page, 'Blind test').click();
  await page.getByRole('combobox', { name: 'What B is' }).selectOption('fewer');
  await page.getByRole('textbox', { name: 'Bits', exact: true }).fill('2');
  await page.getByRole('textbox', { name: 'Trials' }).fill('5');
  await expect(page.getByText('Equal loudness. B is turned down by')).toBeVisible();
}

test('nothing on the page tells what X is, and both are equally loud', async ({ browser }) => {
  test.slow();
  const seen: string[][] = [];
  const sounded: number[][] = [];
  for (const coin of [heads, tails]) {
    const page = await browser.newPage();
    await stubCoin(page, [coin]);
    await openBlind(page);
    await page.getByRole('button', { name: 'Begin 5 trials' }).click();
    const look = async () => inOrder(await page.locator('main').evaluate((main) => main.outerHTML));
    const looks = [await look()];
    const levels = [];
    for (const key of ['1', '2', '3']) {
      await page.getByRole('button', { name: 'Hear A' }).focus();
      await page.keyboard.press(key);
      await expect(page.getByRole('button', { name: `Hear ${'ABX'[Number(key) - 1]}` })).toHaveAttribute(
        'aria-pressed',
        'true',
      );
      const heard = await hearOn(page);
      levels.push(rmsOf(heard), amplitudeAt(heard, 7 * toneHz));
      looks.push(await look());
    }
    seen.push(looks);
    sounded.push(levels);
    await page.close();
  }
  expect(seen[1]).toEqual(seen[0]);
  const [[rmsA, a7, rmsB, b7, , x7], [, , , , , y7]] = sounded;
  expect(rmsA).toBeGreaterThan(0.01);
  expect(Math.abs(dB(rmsA / rmsB))).toBeLessThan(0.1);
  // By ear it can be told: the seventh harmonic is not in the wave, only in what 2 bits make of it.
  expect(dB(b7 / a7)).toBeGreaterThan(20);
  expect(dB(b7 / x7)).toBeGreaterThan(20);
  expect(Math.abs(dB(y7 / b7))).toBeLessThan(0.1);
});

test('a whole run by keyboard, with its key and its probability at the end', async ({ page, context }) => {
  await context.grantPermissions(['clipboard-read', 'clipboard-write']);
  await stubCoin(page, [heads, tails, tails, heads, tails]);
  await openBlind(page);
  const begin = page.getByRole('button', { name: 'Begin 5 trials' });
  await begin.focus();
  await page.keyboard.press('Enter');
  const trial = page.getByRole('group', { name: 'Trial' });
  await expect(trial).toContainText('Trial 1 of 5');
  // The focus has not been lost with the button that began it.
  await page.keyboard.press('x');
  await expect(page.getByRole('button', { name: 'Hear X' })).toHaveAttribute('aria-pressed', 'true');
  await expect(page.getByRole('button', { name: 'Stop', exact: true }).first()).toBeVisible();
  const { violations } = await new AxeBuilder({ page }).include('.listen').analyze();
  expect(violations).toEqual([]);

  for (const [index, said] of ['A', 'B', 'B', 'B', 'B'].entries()) {
    await expect(trial).toContainText(`Trial ${index + 1} of 5`);
    const answer = page.getByRole('button', { name: `X is ${said}` });
    if (index > 0) {
      await expect(page.getByRole('button', { name: 'Hear A' })).toHaveAttribute('aria-pressed', 'true');
      await page.keyboard.press('Enter');
      await expect(answer, 'X was not heard yet').toHaveAttribute('aria-disabled', 'true');
    }
    await page.keyboard.press('3');
    await answer.focus();
    await expect(page.getByRole('article'), 'no key before the end').toHaveCount(0);
    await page.keyboard.press('Enter');
  }
  const run = page.getByRole('article', { name: 'Run 1' });
  await expect(run).toContainText('4 of 5 right');
  await expect(run).toContainText('18.8 %');
  await run.getByText('The key').click();
  await expect(run.getByRole('row')).toHaveCount(6);
  await expect(run.getByRole('row').nth(4)).toHaveText(/4\s*A\s*B\s*wrong/);
  await run.getByRole('button', { name: 'Copy as text' }).click();
  const text = await page.evaluate(() => navigator.clipboard.readText());
  expect(text).toContain('4 of 5 right; 5 trials were chosen beforehand');
  expect(text).toContain('by guessing: 0.188');
  expect(text).toContain('4\tA\tB\twrong');

  // Another run is ended early, after a question.
  await begin.click();
  await page.getByRole('button', { name: 'End the run…' }).click();
  await page.getByRole('button', { name: 'Go on with the trials' }).click();
  await expect(trial).toContainText('Trial 1 of 5');
  await page.getByRole('button', { name: 'End the run…' }).click();
  await page.getByRole('button', { name: 'End it and show the key' }).click();
  await expect(page.getByRole('article', { name: 'Run 2' })).toContainText('0 of 0 right');
});

test('a revision of the library is heard against the bench, at the bench’s tone', async ({ page }) => {
  test.slow();
  await overhear(page);
  const { person, team } = await beginWithTeam(page);
  await saveTable(page.request, team, 'Self-test', { length: 100, bits: 10 });
  await openListening(page);
  await isKnown(page, person);
  await recess(page, 'Blind test').click();
  await page.getByRole('combobox', { name: 'What B is' }).selectOption('revision');
  const side = page.getByRole('group', { name: 'B', exact: true });
  await expect(side).toContainText('Choose a table and one of its revisions.');
  await side.getByRole('combobox', { name: 'Table' }).selectOption('Self-test');
  await expect(side).toContainText('Played at the bench’s tone, 220 Hz.');
  await page.getByRole('button', { name: 'Begin 16 trials' }).click();
  await expect(page.getByRole('button', { name: 'Hear B' })).toContainText('Self-test, revision 1');
  await page.getByRole('button', { name: 'Hear A' }).click();
  const a = await hearOn(page);
  await page.getByRole('button', { name: 'Hear B' }).click();
  const b = await hearOn(page);
  expect(Math.abs(dB(rmsOf(a) / rmsOf(b)))).toBeLessThan(0.1);
  // A single sine in 100 entries: the fog signal's second partial is not in it.
  expect(dB(amplitudeAt(b, 2 * toneHz) / amplitudeAt(b, toneHz))).toBeLessThan(-55);
  expect(dB(amplitudeAt(a, 2 * toneHz) / amplitudeAt(a, toneHz))).toBeGreaterThan(-6);
});
