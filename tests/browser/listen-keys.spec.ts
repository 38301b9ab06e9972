import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { heardOf, overhear } from '../support/listening.ts';

const keys = (page: Page) => page.getByRole('group', { name: 'Keys and notes' });
const stone = (page: Page, name: string) =>
  keys(page).getByRole('button', { name: new RegExp(`^${name}, [\\d.]+ k?Hz$`) });
const fact = (page: Page, name: string) =>
  keys(page)
    .getByLabel('The note at hand')
    .locator('div')
    .filter({ has: page.locator('dt', { hasText: name }) })
    .locator('dd');

/** With the fog-signal tone that stands on the bench at the first visit: five partials, the first of them there. */
async function openKeys(page: Page): Promise<void> {
  await page.goto('/?open=output&more=keys');
  await expect(stone(page, 'A4')).toBeVisible();
}

interface Heard {
  readonly frames: readonly number[];
  readonly rateHz: number;
}

/** What the test's ear takes down at once: within a block no frame is missing, however busy the machine is. */
const blockFrames = 4096;

/** How many cents the line near a frequency lies from there: the median of all blocks. */
function centsFrom({ frames, rateHz }: Heard, hz: number) {
  const blocks: number[] = [];
  for (let first = 0; first + blockFrames <= frames.length; first += blockFrames) {
    blocks.push(peakNear(frames.slice(first, first + blockFrames), rateHz, hz));
  }
  const found = blocks.sort((a, b) => a - b)[Math.floor(blocks.length / 2)];
  return 1200 * Math.log2(found / hz);
}

/** Where the spectrum under a squared Hann window, of side lobes too low to matter, has its peak within a semitone. */
function peakNear(frames: readonly number[], rateHz: number, hz: number): number {
  const { length } = frames;
  const windowed = frames.map((value, i) => value * (0.5 - 0.5 * Math.cos((2 * Math.PI * i) / length)) ** 2);
  const power = (f: number) => {
    const w = (2 * Math.PI * f) / rateHz;
    let [re, im] = [0, 0];
    for (let i = 0; i < length; i += 1) {
      re += windowed[i] * Math.cos(w * i);
      im += windowed[i] * Math.sin(w * i);
    }
    return re * re + im * im;
  };
  let [low, high] = [hz / 2 ** (1 / 12), hz * 2 ** (1 / 12)];
  while (high - low > 1e-4) {
    const [a, b] = [low + (high - low) / 3, high - (high - low) / 3];
    if (power(a) > power(b)) high = b;
    else low = a;
  }
  return (low + high) / 2;
}

/** What sounds for so long from a moment on at which the ramps are over. */
async function listen(page: Page, seconds: number): Promise<Heard> {
  await page.waitForTimeout(250);
  await heardOf(page).forget();
  await page.waitForTimeout(1000 * seconds + 150);
  const [rateHz] = await heardOf(page).rates();
  return { frames: (await heardOf(page).frames()).slice(0, rateHz * seconds), rateHz };
}

const peak = ({ frames }: Heard) => frames.reduce((most, each) => Math.max(most, Math.abs(each)), 0);

/** Parts of a sound that are not silence, first to last frame. */
function soundingPart({ frames, rateHz }: Heard): Heard {
  const isHeard = (value: number) => Math.abs(value) > 1e-3;
  return { frames: frames.slice(frames.findIndex(isHeard), frames.findLastIndex(isHeard)), rateHz };
}

const part = ({ frames, rateHz }: Heard, fromSeconds: number, seconds: number): Heard => ({
  frames: frames.slice(Math.round(rateHz * fromSeconds), Math.round(rateHz * (fromSeconds + seconds))),
  rateHz,
});

/** Two inputs as the Web MIDI API has them; the page knows no better. */
async function plugMidiIn(page: Page): Promise<void> {
  await page.addInitScript(() => {
    const input = (id: string, name: string) => ({
      id,
      name,
      state: 'connected',
      onmidimessage: null as ((event: { data: Uint8Array }) => void) | null,
      close: () => Promise.resolve(),
    });
    const inputs = new Map([['one', input('one', 'First keyboard')]]);
    const access = { inputs, onstatechange: null as (() => void) | null };
    let isAllowed = false;
    Object.assign(window, {
      midi: {
        allow: () => (isAllowed = true),
        send: (id: string, ...bytes: number[]) =>
          inputs.get(id)?.onmidimessage?.({ data: Uint8Array.from(bytes) }),
        plug: (id: string, name: string) => {
          inputs.set(id, input(id, name));
          access.onstatechange?.();
        },
        unplug: (id: string) => {
          inputs.delete(id);
          access.onstatechange?.();
        },
      },
    });
    navigator.requestMIDIAccess = (() =>
      isAllowed
        ? Promise.resolve(access)
        : Promise.reject(
            new DOMException('no', 'NotAllowedError'),
          )) as unknown as typeof navigator.requestMIDIAccess;
  });
}

interface FakeMidi {
  allow: () => void;
  send: (id: string, ...bytes: number[]) => void;
  plug: (id: string, name: string) => void;
  unplug: (id: string) => void;
}
const midiOf = (page: Page) => ({
  allow: () => page.evaluate(() => (window as unknown as { midi: FakeMidi }).midi.allow()),
  send: (...message: [string, ...number[]]) =>
    page.evaluate((args) => (window as unknown as { midi: FakeMidi }).midi.send(...args), message),
  plug: (id: string, name: string) =>
    page.evaluate((args) => (window as unknown as { midi: FakeMidi }).midi.plug(...args), [
      id,
      name,
    ] as const),
  unplug: (id: string) =>
    page.evaluate((one) => (window as unknown as { midi: FakeMidi }).midi.unplug(one), id),
});

test.beforeEach(({ page }) => overhear(page));

test('a note is heard at its pitch while it is held, and the pointer slides to the next', async ({
  page,
}) => {
  await openKeys(page);
  await stone(page, 'A4').hover();
  expect(await heardOf(page).contexts()).toEqual([]);
  await page.mouse.down();
  await expect(stone(page, 'A4')).toHaveAttribute('aria-pressed', 'true');
  await expect(keys(page).getByText('A4 sounds.')).toBeVisible();
  const a4 = await listen(page, 0.6);
  expect(Math.abs(centsFrom(a4, 440))).toBeLessThan(0.1);
  expect(20 * Math.log10(peak(a4))).toBeLessThan(-17.9);
  await expect(fact(page, 'Wanted')).toHaveText(/^440.Hz$/);
  await expect(fact(page, 'Error')).toHaveText('0 cents');

  await stone(page, 'C5').hover();
  await expect(stone(page, 'C5')).toHaveAttribute('aria-pressed', 'true');
  await expect(stone(page, 'A4')).toHaveAttribute('aria-pressed', 'false');
  expect(Math.abs(centsFrom(await listen(page, 0.6), 440 * 2 ** (3 / 12)))).toBeLessThan(0.1);

  await page.mouse.up();
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
  expect(peak(await listen(page, 0.3))).toBeLessThan(1e-4);
  await keys(page).getByRole('button', { name: 'Stop the notes' }).click();
  await expect(keys(page).getByRole('button', { name: 'Get ready' })).toBeVisible();
  await expect.poll(() => heardOf(page).contexts()).toEqual(['suspended']);
});

test('by keyboard alone: arrows walk, Space holds, letters play by their place and are no shortcuts then', async ({
  page,
}) => {
  await openKeys(page);
  await page.getByRole('button', { name: 'An octave up' }).focus();
  await page.keyboard.press('Tab');
  await expect(stone(page, 'A4')).toBeFocused();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('ArrowUp');
  await expect(stone(page, 'A#5')).toBeFocused();
  await expect(fact(page, 'Note')).toHaveText('A#5, number 82');
  expect(await heardOf(page).contexts()).toEqual([]);
  await page.keyboard.down('Space');
  await expect(stone(page, 'A#5')).toHaveAttribute('aria-pressed', 'true');
  await page.keyboard.press('ArrowLeft');
  await expect(stone(page, 'A5')).toHaveAttribute('aria-pressed', 'true');
  await page.keyboard.up('Space');
  await expect(stone(page, 'A5')).toHaveAttribute('aria-pressed', 'false');

  // P is A5 here, the tenth key of its row, and does not stop the sound. The last key pressed sounds.
  await page.keyboard.down('KeyS');
  await expect(stone(page, 'C#4')).toHaveAttribute('aria-pressed', 'true');
  await page.keyboard.down('KeyP');
  await page.keyboard.down('KeyP');
  await expect(stone(page, 'A5')).toHaveAttribute('aria-pressed', 'true');
  await page.keyboard.up('KeyP');
  await expect(stone(page, 'C#4')).toHaveAttribute('aria-pressed', 'true');
  await expect(keys(page).getByText('C#4 sounds.')).toBeVisible();
  // Whatever takes the keyboard away lets go.
  await page.evaluate(() => dispatchEvent(new Event('blur')));
  await expect(stone(page, 'C#4')).toHaveAttribute('aria-pressed', 'false');
  await page.keyboard.up('KeyS');

  // With the focus elsewhere letters are shortcuts, unless the switch is on.
  await page.getByRole('switch', { name: 'Play with the letter keys' }).focus();
  await page.keyboard.press('KeyP');
  await expect(keys(page).getByRole('button', { name: 'Get ready' })).toBeVisible();
  await page.keyboard.press('Space');
  await page.keyboard.down('KeyP');
  await expect(stone(page, 'A5')).toHaveAttribute('aria-pressed', 'true');
  await page.keyboard.up('KeyP');
  await expect(keys(page).getByRole('button', { name: 'Stop the notes' })).toBeVisible();
  // Text stays text.
  await keys(page).getByRole('textbox', { name: 'From', exact: true }).fill('');
  await page.keyboard.type('A3');
  await expect(keys(page).getByRole('textbox', { name: 'From', exact: true })).toHaveValue('A3');
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
});

test('MIDI is asked for by a press, starts no sound, and plays notes, bends and what is plugged in', async ({
  page,
}) => {
  await plugMidiIn(page);
  const midi = midiOf(page);
  await openKeys(page);
  await keys(page).getByRole('button', { name: 'Listen to MIDI inputs' }).click();
  await expect(keys(page).getByText('The browser has refused MIDI to this page.')).toBeVisible();
  await midi.allow();
  await keys(page).getByRole('button', { name: 'Listen to MIDI inputs' }).click();
  const chosen = keys(page).getByRole('combobox', { name: 'MIDI input' });
  await expect(chosen.locator('option')).toHaveText(['Every input', 'First keyboard']);
  await midi.send('one', 0x90, 60, 100);
  await expect(fact(page, 'Note')).toHaveText('C4, number 60');
  expect(await heardOf(page).contexts()).toEqual([]);
  await midi.send('one', 0x90, 60, 0);

  await keys(page).getByRole('button', { name: 'Get ready' }).click();
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
  expect(peak(await listen(page, 0.2))).toBeLessThan(1e-4);
  await midi.send('one', 0x90, 57, 100);
  await expect(keys(page).getByText('A3 sounds.')).toBeVisible();
  expect(Math.abs(centsFrom(await listen(page, 0.6), 220))).toBeLessThan(0.1);
  // The whole wheel up: two semitones.
  await midi.send('one', 0xe0, 127, 127);
  await expect(fact(page, 'Note')).toHaveText('A3, number 57, bent by +200.0 cents');
  expect(Math.abs(centsFrom(await listen(page, 0.6), 220 * 2 ** (2 / 12)))).toBeLessThan(0.1);
  await midi.send('one', 0xe0, 0, 64, 0x90, 57, 0);
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();

  await midi.plug('two', 'Second keyboard');
  await expect(chosen.locator('option')).toHaveText(['All 2 inputs', 'First keyboard', 'Second keyboard']);
  await chosen.selectOption('Second keyboard');
  await midi.send('one', 0x90, 64, 100);
  await midi.send('two', 0x90, 72, 100);
  await expect(keys(page).getByText('C5 sounds.')).toBeVisible();
  await midi.unplug('two');
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
  await keys(page).getByRole('button', { name: 'Let MIDI go' }).click();
  await midi.send('one', 0x90, 64, 100);
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
});

test('by step words a note is what the accumulator gives, and a glide is heard step by step', async ({
  page,
}) => {
  await page.goto('/?open=output&more=keys,accumulator');
  await page.getByRole('textbox', { name: 'Accumulator' }).fill('16');
  await keys(page).getByRole('radio', { name: 'Step word' }).check();
  // 220 Hz of 256 entries is 56320 samples a second: a word is 56320/2^16 Hz, C5 is the 609th.
  const wordHz = 56_320 / 65_536;
  await stone(page, 'C5').hover();
  await page.mouse.down();
  await expect(keys(page).getByText('C5 sounds.')).toBeVisible();
  await expect(fact(page, 'Step word')).toHaveText('609');
  await expect(fact(page, 'Error')).toHaveText('+0.36 cents');
  expect(Math.abs(centsFrom(await listen(page, 0.6), 609 * wordHz))).toBeLessThan(0.1);
  await page.mouse.up();
  await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();

  await keys(page).getByRole('textbox', { name: 'From', exact: true }).fill('440 Hz');
  await keys(page).getByRole('textbox', { name: 'To', exact: true }).fill('550 Hz');
  await keys(page).getByRole('textbox', { name: 'Time' }).fill('400');
  await keys(page).getByRole('textbox', { name: 'Update every' }).fill('100');
  await keys(page).getByRole('radio', { name: 'Equal hertz' }).check();
  await expect(keys(page).getByText('512 to 640')).toBeVisible();
  await page.waitForTimeout(300);
  await heardOf(page).forget();
  await keys(page).getByRole('button', { name: 'Play the glide' }).click();
  await page.waitForTimeout(1_800);
  const [rateHz] = await heardOf(page).rates();
  const glide = soundingPart({ frames: await heardOf(page).frames(), rateHz });
  expect(glide.frames.length / rateHz).toBeCloseTo(0.3 + 0.4 + 0.5, 1);
  // The first is held 0.3 s and its own 100 ms, each other 100 ms: looked at in the middle of the last of these.
  for (const [i, word] of [512, 544, 576, 608].entries()) {
    const { frames } = part(glide, 0.32 + 0.1 * i, 0.06);
    const hz = peakNear(frames, rateHz, word * wordHz);
    expect(Math.abs(1200 * Math.log2(hz / (word * wordHz))), `step word ${word}`).toBeLessThan(1);
  }
  expect(Math.abs(centsFrom(part(glide, 0.75, 0.4), 640 * wordHz))).toBeLessThan(0.1);
});

for (const [colorScheme, width] of [
  ['light', 1440],
  ['dark', 390],
] as const) {
  test.describe(`${colorScheme}, ${width} wide`, () => {
    test.use({ colorScheme, viewport: { width, height: 844 }, hasTouch: width === 390 });

    test('the keys have no barrier that axe finds, nor any sideways scroll', async ({ page }) => {
      await openKeys(page);
      if (width === 390) {
        // The first touch of all: browsers give it no sound before the finger is lifted.
        await stone(page, 'A4').tap();
        await expect(keys(page).getByText('Ready: the next note sounds at once.')).toBeVisible();
      }
      await keys(page).getByText('in figures').first().click();
      const { violations } = await new AxeBuilder({ page }).include('.recesses').analyze();
      expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
      await expect(keys(page).locator('.key-stone')).toHaveCount(width > 480 ? 24 : 12);
      const sizes = await keys(page)
        .locator('.key-stone')
        .evaluateAll((stones) => stones.map((each) => each.getBoundingClientRect().width));
      // Target size, WCAG 2.2, 2.5.8.
      expect(Math.min(...sizes)).toBeGreaterThanOrEqual(24);
    });
  });
}
