import { fileURLToPath } from 'node:url';
import { expect, test, type Page } from '@playwright/test';
import { build } from 'vite';
import { buildTable } from '../../shared/build-table.ts';
import { standardShapes } from '../../shared/waveform/index.ts';
import type { OfflineOrder } from './listen-offline-page.ts';

const dB = (ratio: number) => 20 * Math.log10(ratio);

/** Full scale at the volume that the player starts with: −18 dBFS. */
const fullScale = 10 ** (-18 / 20);

test.describe('levels in an offline context', () => {
  let script = '';
  test.beforeAll(async () => {
    const result = await build({
      configFile: false,
      logLevel: 'error',
      build: {
        write: false,
        lib: {
          entry: fileURLToPath(new URL('listen-offline-page.ts', import.meta.url)),
          formats: ['iife'],
          name: 'offline',
        },
      },
    });
    const [output] = [result].flat();
    if (!('output' in output)) throw new Error('The page’s script was not built.');
    script = output.output[0].code;
  });

  const render = async (page: Page, order: OfflineOrder) => {
    await page.goto('about:blank');
    await page.addScriptTag({ content: script });
    return page.evaluate((wanted) => window.renderOffline(wanted), order);
  };

  const order = (values: ArrayLike<number>, over: Partial<OfflineOrder>): OfflineOrder => ({
    values: Array.from(values),
    mode: 'loop',
    range: 'bipolar',
    sampleRateHz: 48_000,
    contextRateHz: 48_000,
    seconds: 2,
    volumeDb: -6,
    ...over,
  });

  test('200 partials of 100 Hz: each within 0.01 dB up to 20 kHz, nothing else above −110 dBFS', async ({
    page,
  }) => {
    const { cycle } = buildTable({
      schema: 1,
      name: 'a',
      source: standardShapes.sawtooth(200),
      level: { normalise: 'none', level: 0.5 },
      table: { length: 512, bits: 16 },
    });
    for (const contextRateHz of [44_100, 48_000, 96_000]) {
      const { lines } = await render(page, order(cycle, { sampleRateHz: 51_200, contextRateHz }));
      for (let n = 1; n <= 200; n += 1) {
        const line = lines.find(({ hz }) => hz === 100 * n);
        const wanted = (fullScale * 0.5 * 2) / (Math.PI * n);
        expect(
          Math.abs(dB((line?.amplitude ?? 0) / wanted)),
          `${100 * n} Hz at ${contextRateHz} Hz`,
        ).toBeLessThan(0.01);
      }
      const stray = lines.filter(({ hz }) => hz % 100 !== 0).map(({ amplitude }) => dB(amplitude));
      expect(Math.max(-200, ...stray)).toBeLessThan(-110);
    }
  });

  test('full scale peaks at −18 dBFS, bipolar and unipolar, without a mean', async ({ page }) => {
    const sine = Array.from({ length: 64 }, (_, k) => Math.sin((2 * Math.PI * k) / 64));
    const bipolar = await render(page, order(sine, { sampleRateHz: 64_000 }));
    expect(bipolar.lines).toHaveLength(1);
    expect(dB(bipolar.lines[0].amplitude)).toBeCloseTo(-18, 2);
    const lamp = sine.map((value) => (value + 1) / 2);
    const unipolar = await render(page, order(lamp, { sampleRateHz: 64_000, range: 'unipolar' }));
    expect(unipolar.lines).toHaveLength(1);
    expect(unipolar.lines[0].hz).toBe(1_000);
    expect(dB(unipolar.lines[0].amplitude)).toBeCloseTo(-18, 2);
  });

  test('the level cap holds every frame at the loudest, and leaves a square’s overshoot alone', async ({
    page,
  }) => {
    const alternating = Array.from({ length: 400 }, (_, k) => (k < 200 ? 1 : -1) * (k % 2 === 0 ? 1 : -1));
    const wild = await render(page, order(alternating, { sampleRateHz: 40_000, volumeDb: 0 }));
    expect(Math.max(...wild.envelope)).toBeLessThanOrEqual(0.5);
    const square = Array.from({ length: 256 }, (_, k) => (k < 128 ? 1 : -1));
    const plain = await render(page, order(square, { sampleRateHz: 25_600, volumeDb: 0 }));
    const peak = Math.max(...plain.envelope);
    // Full scale at the loudest is −12 dBFS; the band-limited edge overshoots it, below the cap at −6.
    expect(dB(peak)).toBeGreaterThan(-11.5);
    expect(dB(peak)).toBeLessThan(-9);
  });

  test('one pass begins and ends without a step', async ({ page }) => {
    const chirp = Array.from({ length: 4_000 }, (_, k) =>
      Math.cos(2 * Math.PI * (0.02 * k + (0.08 * k * k) / 8_000)),
    );
    const { envelope, largestStep: step } = await render(
      page,
      order(chirp, { mode: 'once', sampleRateHz: 8_000 }),
    );
    const peak = Math.max(...envelope);
    expect(dB(peak)).toBeGreaterThan(-18.5);
    expect(dB(peak)).toBeLessThan(-17.5);
    expect(envelope.at(-1)).toBe(0);
    // The steepest that a sine of the chirp's highest frequency, a tenth of 8 kHz, can be.
    expect(step).toBeLessThan(fullScale * 1.05 * 2 * Math.PI * ((0.1 * 8_000) / 48_000));
  });
});
