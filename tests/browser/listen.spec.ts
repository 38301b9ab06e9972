import { expect, test, type Page } from '@playwright/test';

const dB = (ratio: number) => 20 * Math.log10(ratio);

/**
 * Watches from the test's side what a page sends to its loudspeaker: contexts made, and every frame that reaches one's
 * destination. The page itself knows nothing of it.
 */
async function overhear(page: Page): Promise<void> {
  await page.addInitScript(() => {
    const heard = { contexts: [] as AudioContext[], blocks: [] as Float32Array[] };
    Object.assign(window, { heard });
    const RealContext = AudioContext;
    window.AudioContext = class extends RealContext {
      constructor(options?: AudioContextOptions) {
        super(options);
        heard.contexts.push(this);
      }
    };
    const connect = AudioNode.prototype.connect;
    AudioNode.prototype.connect = function (this: AudioNode, ...to: [never]) {
      const target: unknown = to[0];
      if (target instanceof AudioDestinationNode) {
        // Deprecated, but it needs no file of its own that the content policy would have to allow.
        const tap = (this.context as AudioContext).createScriptProcessor(4096, 1, 1);
        tap.onaudioprocess = ({ inputBuffer }) => heard.blocks.push(inputBuffer.getChannelData(0).slice());
        connect.call(this, tap as never);
        connect.call(tap, target as never);
      }
      return connect.apply(this, to);
    } as typeof connect;
  });
}

interface Heard {
  contexts: AudioContext[];
  blocks: Float32Array[];
}

const heardOf = (page: Page) => ({
  contexts: () =>
    page.evaluate(() => (window as unknown as { heard: Heard }).heard.contexts.map(({ state }) => state)),
  forget: () =>
    page.evaluate(() => {
      (window as unknown as { heard: Heard }).heard.blocks.length = 0;
    }),
  frames: () =>
    page.evaluate(() => (window as unknown as { heard: Heard }).heard.blocks.flatMap((block) => [...block])),
});

async function openListening(page: Page): Promise<void> {
  await page.goto('/');
  const tread = page.locator('#output').getByRole('button').first();
  if ((await tread.getAttribute('aria-expanded')) === 'false') await tread.click();
  await expect(page.getByRole('heading', { name: 'Listen' })).toBeVisible();
}

const play = (page: Page) => page.getByRole('button', { name: 'Play', exact: true });
const stop = (page: Page) => page.locator('.listen').getByRole('button', { name: 'Stop', exact: true });
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
    const peak = Math.max(...start.map(Math.abs));
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
  });

  test('says what cannot be played and what is not', async ({ page }) => {
    await openListening(page);
    const rate = page.getByRole('textbox', { name: 'Sample rate' });
    await rate.fill('1');
    await play(page).click();
    await expect(page.getByText('One round would last 256 s; the preview plays up to 60 s.')).toBeVisible();

    await page.getByRole('textbox', { name: 'Tone' }).fill('9k');
    await expect(page.getByText(/lines? lies? above/)).toContainText('not played');

    // This browser has no loudspeaker.
    await page.getByRole('textbox', { name: 'Tone' }).fill('440');
    await play(page).click();
    await expect(page.getByText('The browser finds no output device')).toBeVisible();
  });

  test('says so where the browser keeps the sound back', async ({ playwright }, { project }) => {
    // The policy that people's browsers have: a page may sound from its visitor's first gesture on.
    const { launchOptions, baseURL } = project.use;
    const args = [...(launchOptions?.args ?? []), '--autoplay-policy=document-user-activation-required'];
    const browser = await playwright.chromium.launch({ ...launchOptions, args });
    const page = await browser.newPage({ baseURL });
    await overhear(page);
    // Clicks by a script of the page are no gesture, so the browser leaves the context suspended.
    await page.addInitScript(() => {
      const timer = setInterval(() => {
        document.querySelector<HTMLElement>('#output [aria-expanded=false]')?.click();
        const button = [...document.querySelectorAll('button')].find(
          ({ textContent }) => textContent === 'Play',
        );
        if (button === undefined) return;
        button.click();
        console.debug('pressed');
        clearInterval(timer);
      }, 100);
    });
    const pressed = page.waitForEvent('console', (message) => message.text() === 'pressed');
    await page.goto('/');
    await pressed;
    // Asking the page anything through the test's own door would count as a gesture.
    await page.waitForTimeout(3_000);
    await expect(page.getByText('The browser has not started its audio')).toBeVisible({ timeout: 6_000 });
    expect(await heardOf(page).contexts()).toEqual(['suspended']);
    await expect(play(page)).toBeVisible();
    await browser.close();
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
