import { expect, test, type Page } from '@playwright/test';
import { pinRateHzAtMost, type Drive, type Sound } from '../../shared/listening/index.ts';
import {
  fullScale,
  largestStep,
  loop,
  sawtooth,
  sine,
  stage,
  staircase,
} from '../support/listening-sounds.ts';
import { serveOfflinePage, type OfflinePage } from '../support/offline-page.ts';
import type { OfflineOrder } from './listen-offline-page.ts';

test.describe('the player in an offline context', () => {
  let offline: OfflinePage;
  test.beforeAll(async () => {
    offline = await serveOfflinePage();
  });
  test.afterAll(() => offline.close());
  test.beforeEach(({ page }) => offline.open(page));

  const render = (page: Page, over: Partial<OfflineOrder> & Pick<OfflineOrder, 'sound'>) =>
    page.evaluate((order) => window.offline.renderOffline(order), {
      hearing: 'it',
      contextRateHz: 48_000,
      seconds: 1,
      volumeDb: -6,
      ...over,
    } as OfflineOrder);

  test('a pass begins and ends without a step, and a device’s response is what it says', async ({ page }) => {
    const chirp = Float64Array.from({ length: 4_000 }, (_, k) =>
      Math.cos(2 * Math.PI * (0.02 * k + (0.08 * k * k) / 8_000)),
    );
    const sound: Sound = {
      voices: { ideal: { ...staircase(chirp), form: 'curve' }, table: staircase(chirp) },
      drive: { kind: 'once', sampleRateHz: 8_000 },
    };
    const ideal = await render(page, { sound, hearing: 'ideal' });
    const peak = ideal.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    expect(20 * Math.log10(peak)).toBeGreaterThan(-18.5);
    expect(20 * Math.log10(peak)).toBeLessThan(-17.5);
    // The steepest that a sine of the chirp's highest frequency, a tenth of 8 kHz, can be.
    expect(largestStep(ideal)).toBeLessThan(fullScale * 1.05 * 2 * Math.PI * ((0.1 * 8_000) / 48_000));
    expect(ideal.subarray(-12_000).every((value) => value === 0)).toBe(true);
    // A held entry is centred half a period after the curve's; both begin with the same entry.
    const table = await render(page, { sound, hearing: 'table' });
    expect(lagOf(table, ideal)).toBe(3);

    const impulse = new Float32Array(64);
    impulse[5] = 0.5;
    const voices = { it: staircase(sine(64, 8)) };
    const straight = await render(page, { sound: { voices, drive: loop(64_000) } });
    const through = await render(page, { sound: { voices, drive: loop(64_000) }, impulse });
    for (let i = 30_000; i < 30_200; i += 1) expect(through[i]).toBeCloseTo(straight[i - 5] / 2, 6);
  });

  test('the audio thread keeps 80 % of a core free in the heaviest cases', async ({ page }) => {
    const busy = sine(4096, 12);
    const drive: Drive = {
      kind: 'accumulator',
      sampleRateHz: pinRateHzAtMost,
      accumulatorBits: 24,
      // Another entry at every sample.
      stepWord: 2 ** 12 * 3 + 1,
    };
    const heavy = {
      'accumulator at 4 MHz, four voices, one heard behind a stage': {
        voices: {
          output: staircase(busy, { stage }),
          ideal: { ...staircase(busy), form: 'curve' as const },
          table: staircase(busy),
          ladder: staircase(busy),
        },
        drive,
      },
      'four loops': {
        voices: Object.fromEntries(['a', 'b', 'c', 'd'].map((name) => [name, staircase(sawtooth.values)])),
        drive: loop(110 * 128),
      },
    };
    for (const [title, sound] of Object.entries(heavy)) {
      const order = {
        sound,
        hearing: Object.keys(sound.voices)[0],
        contextRateHz: 48_000,
        seconds: 2,
        volumeDb: 0,
      };
      const load = await page.evaluate((wanted) => window.offline.measureLoad(wanted, 3), order);
      console.log(`${title}: ${(100 * load).toFixed(1)} % of a core`);
      expect(load, title).toBeLessThan(0.2);
    }
  });
});

/** By how many frames the one lags behind the other, at their best likeness. */
function lagOf(frames: Float32Array, other: Float32Array): number {
  const likeness = (lag: number) => {
    let sum = 0;
    for (let i = 12_000; i < 20_000; i += 1) sum += frames[i + lag] * other[i];
    return sum;
  };
  const lags = Array.from({ length: 41 }, (_, k) => k - 20);
  return lags.reduce((best, lag) => (likeness(lag) > likeness(best) ? lag : best), 0);
}
