import { expect, test, type Page } from '@playwright/test';
import { heardOf, openListening, overhear, play, stop } from '../support/listening.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);

const strongestLines = (page: Page) => page.getByRole('table', { name: /Strongest lines/ });

/** Sets the five partials of the fog-signal tone that stands on the bench at the first visit. */
async function shapeFivePartials(
  page: Page,
  partials: readonly (readonly [number, number])[],
): Promise<void> {
  for (const [row, [harmonic, amplitude]] of partials.entries()) {
    await page
      .getByRole('textbox', { name: `Harmonic of partial ${row + 1}`, exact: true })
      .fill(String(harmonic));
    await page.getByRole('textbox', { name: `Amplitude of partial ${row + 1},` }).fill(String(amplitude));
  }
}

async function readLines(page: Page): Promise<{ hz: number; db: number }[]> {
  return strongestLines(page)
    .locator('tbody tr')
    .evaluateAll((rows) =>
      rows.map((row) => {
        const [frequency, level] = [...row.querySelectorAll('td')].map((cell) =>
          (cell.textContent ?? '').replace('−', '-'),
        );
        return { hz: parseFloat(frequency) * (frequency.includes('kHz') ? 1000 : 1), db: parseFloat(level) };
      }),
    );
}

/** Peaks of successive blocks of 5 ms. */
function envelopeOf(frames: readonly number[], block = 240): number[] {
  const envelope: number[] = [];
  for (let first = 0; first + block <= frames.length; first += block) {
    envelope.push(Math.max(...frames.slice(first, first + block).map(Math.abs)));
  }
  return envelope;
}

const largestStep = (frames: readonly number[]) =>
  frames.reduce((step, value, i) => (i === 0 ? 0 : Math.max(step, Math.abs(value - frames[i - 1]))), 0);

test.describe('listening on the bench', () => {
  test.beforeEach(({ page }) => overhear(page));

  test('nothing sounds before play is pressed, and P starts and stops', async ({ page }) => {
    await openListening(page);
    const bar = page.getByRole('slider', { name: 'Harmonic 2', exact: true });
    await bar.click();
    await page.keyboard.press('ArrowUp');
    await page.getByRole('slider', { name: 'Volume' }).fill('-20');
    expect(await heardOf(page).contexts()).toEqual([]);

    await page.getByRole('heading', { name: 'Listen' }).click();
    await page.keyboard.press('p');
    await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
    expect(await heardOf(page).contexts()).toEqual(['running']);
    await page.keyboard.press('p');
    await expect(play(page)).toBeVisible();
    await expect.poll(() => heardOf(page).contexts()).toEqual(['suspended']);
  });

  test('the five strongest lines are the five partials, within 1 dB', async ({ page }) => {
    await openListening(page);
    const partials = [[1, 1], [2, 0.5], [3, 0.25], [5, 0.1], [7, 0.05]] as const; // prettier-ignore
    await shapeFivePartials(page, partials);
    await page.getByRole('textbox', { name: 'Tone' }).fill('440');
    await play(page).click();
    // Two windows of the meter after the fade.
    await page.waitForTimeout(1_000);
    expect(await heardOf(page).contexts()).toEqual(['running']);
    const lines = await readLines(page);
    expect(lines).toHaveLength(5);
    partials.forEach(([harmonic, amplitude], rank) => {
      expect(Math.abs(lines[rank].hz - 440 * harmonic), `frequency of harmonic ${harmonic}`).toBeLessThan(1);
      expect(Math.abs(lines[rank].db - dB(amplitude)), `level of harmonic ${harmonic}`).toBeLessThan(1);
    });

    await page.getByRole('radio', { name: 'Ideal curve' }).check();
    await page.waitForTimeout(1_000);
    const ideal = await readLines(page);
    ideal.forEach(({ db }, rank) => expect(Math.abs(db - dB(partials[rank][1]))).toBeLessThan(0.2));
  });

  test('it starts quietly with a fade, changes without a gap and stops with a fade', async ({ page }) => {
    const heard = heardOf(page);
    await openListening(page);
    await play(page).click();
    await page.waitForTimeout(800);
    const start = await heard.frames();
    const peak = start.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    expect(dB(peak)).toBeLessThan(-17.9);
    expect(dB(peak)).toBeGreaterThan(-18.6);
    const rise = envelopeOf(start);
    const firstHeard = rise.findIndex((level) => level > 0.01 * peak);
    const risen = rise.findIndex((level) => level > 0.9 * peak);
    expect((risen - firstHeard) * 5, 'milliseconds from 1 % to 90 %').toBeGreaterThanOrEqual(50);
    const ownStep = largestStep(start);

    await heard.forget();
    await page.getByRole('radio', { name: 'Ideal curve' }).check();
    await page.waitForTimeout(250);
    await page.getByRole('slider', { name: 'Harmonic 3', exact: true }).focus();
    for (let i = 0; i < 5; i += 1) await page.keyboard.press('ArrowUp');
    await page.waitForTimeout(300);
    await page.getByRole('radio', { name: 'Quantised table' }).check();
    await page.waitForTimeout(250);
    const changed = await heard.frames();
    // Blocks of one period of 220 Hz: a gap or a dip of phases would show in them.
    expect(Math.min(...envelopeOf(changed))).toBeGreaterThan(0.8 * peak);
    expect(largestStep(changed)).toBeLessThan(1.1 * ownStep);

    await heard.forget();
    await stop(page).click();
    await expect.poll(() => heard.contexts()).toEqual(['suspended']);
    const end = await heard.frames();
    const fall = envelopeOf(end);
    const last = fall.findIndex((level) => level < 0.01 * peak);
    const begun = fall.findIndex((level) => level < 0.9 * peak);
    expect((last - begun) * 5, 'milliseconds from 90 % to 1 %').toBeGreaterThanOrEqual(50);
    expect(end.at(-1)).toBe(0);
    expect(largestStep(end)).toBeLessThan(1.1 * ownStep);
  });

  test('tone and sample rate follow each other, once through ends by itself', async ({ page }) => {
    await openListening(page);
    const tone = page.getByRole('textbox', { name: 'Tone' });
    const rate = page.getByRole('textbox', { name: 'Sample rate' });
    await tone.fill('125');
    await expect(rate).toHaveValue(/^32(k|000)$/);
    await rate.fill('64k');
    await expect(tone).toHaveValue('250');

    await page.getByRole('radio', { name: 'Once through' }).check();
    await expect(page.getByText('One pass lasts 4 ms.')).toBeVisible();
    await rate.fill('256');
    await expect(page.getByText('One pass lasts 1 s.')).toBeVisible();
    await play(page).click();
    await expect(page.getByText('Playing the quantised table once through.')).toBeVisible();
    await expect(play(page)).toBeVisible({ timeout: 4_000 });

    // Rounds this long are made ready off the page's own thread.
    await page.getByRole('radio', { name: 'As a loop' }).check();
    await tone.fill('4');
    await heardOf(page).forget();
    await play(page).click();
    await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
    await expect
      .poll(async () => envelopeOf(await heardOf(page).frames()).some((peak) => peak > 0.1))
      .toBe(true);
  });

  test('says what cannot be played and what is not', async ({ page }) => {
    await openListening(page);
    await page.getByRole('radio', { name: 'Once through' }).check();
    await page.getByRole('textbox', { name: 'Sample rate' }).fill('1');
    await play(page).click();
    await expect(page.getByText('One pass would last 256 s; passes of up to 60 s are played.')).toBeVisible();

    await page.getByRole('radio', { name: 'As a loop' }).check();
    await page.getByRole('textbox', { name: 'Tone' }).fill('9k');
    await expect(page.getByText(/lines? lies? above/)).toContainText('not played');

    // This browser has no loudspeaker.
    await page.getByRole('textbox', { name: 'Tone' }).fill('440');
    await play(page).click();
    await expect(page.getByText('The browser finds no output device')).toBeVisible();
  });

  test('a stop stays in sight while the panel is not', async ({ page }) => {
    await openListening(page);
    await play(page).click();
    await expect(stop(page)).toBeVisible();
    await page.locator('#output').getByRole('button').first().click();
    const flag = page.getByRole('region', { name: 'Sound' });
    await flag.getByRole('button', { name: 'Stop' }).click();
    await expect(flag).toBeHidden();
    await expect.poll(() => heardOf(page).contexts()).toEqual(['suspended']);
  });
});
