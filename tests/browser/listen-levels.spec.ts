import { expect, test, type Page } from '@playwright/test';
import { equallyLoud } from '../../shared/listening/equal-loudness.ts';
import { pinDelayFrames, type Drive, type Sound, type Voice } from '../../shared/listening/index.ts';
import { askPython } from '../outside/numpy/python.ts';
import {
  fullScale,
  loop,
  sawtooth,
  shortAccumulator,
  sine,
  stage,
  stageAsked,
  staircase,
} from '../support/listening-sounds.ts';
import { serveOfflinePage, type OfflinePage } from '../support/offline-page.ts';
import type { OfflineOrder } from './listen-offline-page.ts';

/** The volume that the player starts with. */
const startDb = -6;

interface Case {
  title: string;
  voice: Voice;
  drive: Drive;
  rateHz?: number;
  /** What the NumPy program is told besides. */
  ask?: { strongest?: number; limitHz?: number };
  within: number;
  strayBelow?: number;
}

interface Answer {
  lines: number;
  highestHz: number;
  worstDb: number;
  worstHz: number;
  meanDbfs: number;
  strayDbfs: number;
  rmsDbfs: number;
  peakDbfs: number;
  waveErrorDbfs?: number;
}

/** An accumulator's pin is flat to 20/48 of the context's rate. */
const flatToHz = (rateHz: number) => Math.min(20_000, (rateHz * 20) / 48);

// Source of what is wanted: tests/outside/numpy/heard.py, which follows engine specification §5.
const cases: Case[] = [
  ...[44_100, 48_000, 96_000].flatMap((rateHz): Case[] => [
    {
      title: `staircase of 128 entries at 110 Hz, context ${rateHz} Hz`,
      voice: staircase(sawtooth.values),
      drive: loop(110 * 128),
      rateHz,
      within: 0.05,
      strayBelow: -90,
    },
    {
      title: `its smooth curve, context ${rateHz} Hz`,
      voice: { ...staircase(sawtooth.cycle), form: 'curve' },
      drive: loop(110 * 128),
      rateHz,
      within: 0.05,
      strayBelow: -90,
    },
    {
      title: `accumulator of 10 bits at 20480 Hz, images in the band, context ${rateHz} Hz`,
      voice: staircase(sine(64, 8)),
      drive: shortAccumulator,
      rateHz,
      ask: { limitHz: flatToHz(rateHz) },
      within: 0.05,
      strayBelow: -90,
    },
  ]),
  {
    title: 'a rate far from the context’s and a pitch of no whole hertz',
    voice: staircase(sine(100, 6)),
    drive: loop(31_250),
    within: 0.05,
    strayBelow: -90,
  },
  {
    title: 'a staircase whose steps are slower than hearing: lines of images alone',
    voice: staircase(sine(16, 12)),
    drive: loop(1_600),
    within: 0.05,
    strayBelow: -90,
  },
  {
    title: 'accumulator of 32 bits at 62.5 kHz: its carrier and strongest spurs',
    voice: staircase(sine(256, 8)),
    drive: { kind: 'accumulator', sampleRateHz: 62_500, accumulatorBits: 32, stepWord: 30_236_569 },
    ask: { strongest: 24 },
    within: 0.5,
  },
  {
    title: 'accumulator without truncation: the entries it visits',
    voice: staircase(sine(1024, 4)),
    drive: { kind: 'accumulator', sampleRateHz: 51_200, accumulatorBits: 16, stepWord: 5 * 256 },
    within: 0.05,
    strayBelow: -90,
  },
  {
    title: 'loop behind a stage',
    voice: staircase(sawtooth.values, { stage }),
    drive: loop(110 * 128),
    within: 0.1,
    strayBelow: -90,
  },
  {
    title: 'accumulator behind a stage',
    voice: staircase(sine(64, 8), { stage }),
    drive: shortAccumulator,
    within: 0.1,
    strayBelow: -90,
  },
];

test.describe('what the player renders, beside NumPy', () => {
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
      seconds: 2,
      volumeDb: startDb,
      ...over,
    } as OfflineOrder);

  const asked = (frames: Float32Array, voice: Voice, drive: Drive, rateHz: number, more: object = {}) => ({
    values: Array.from(voice.values),
    form: voice.form,
    sampleRateHz: drive.sampleRateHz,
    ...(drive.kind === 'accumulator' && {
      accumulatorBits: drive.accumulatorBits,
      stepWord: drive.stepWord,
    }),
    stage: voice.stage === undefined ? null : stageAsked,
    gain: fullScale,
    delayFrames: pinDelayFrames,
    rateHz,
    frames: Buffer.from(frames.buffer, frames.byteOffset, frames.byteLength).toString('base64'),
    ...more,
  });

  test('lines of loops, curves, accumulators and stages', async ({ page }) => {
    const questions = [];
    for (const { voice, drive, rateHz = 48_000, ask } of cases) {
      const frames = await render(page, { sound: { voices: { it: voice }, drive }, contextRateHz: rateHz });
      questions.push(asked(frames, voice, drive, rateHz, ask));
    }
    const answers = askPython<Answer[]>('heard.py', questions);
    cases.forEach(({ title, within, strayBelow }, i) => {
      const answer = answers[i];
      const { lines, highestHz, worstDb, worstHz, strayDbfs, waveErrorDbfs } = answer;
      console.log(
        `${title}: ${lines} lines to ${Math.round(highestHz)} Hz, worst ${worstDb.toFixed(4)} dB at ${Math.round(worstHz)} Hz, else ${strayDbfs.toFixed(1)} dBFS` +
          (waveErrorDbfs === undefined ? '' : `, wave within ${waveErrorDbfs.toFixed(1)} dBFS`),
      );
      expect(Math.abs(worstDb), title).toBeLessThan(within);
      expect(lines, title).toBeGreaterThan(10);
      if (strayBelow !== undefined) expect(strayDbfs, title).toBeLessThan(strayBelow);
      if (waveErrorDbfs !== undefined) expect(waveErrorDbfs, title).toBeLessThan(-90);
    });
  });

  test('two voices at one loudness, a full-scale curve at −18 dBFS, and the cap', async ({ page }) => {
    // Another length, level, range and rate; one behind a stage, one through an accumulator.
    const pairs: { a: Voice; b: Voice; drive: Drive }[] = [
      {
        a: staircase(sawtooth.values, { drive: loop(220 * 128) }),
        b: staircase(
          sine(100, 4).map((value) => value / 3),
          { drive: loop(220 * 100) },
        ),
        drive: loop(220 * 128),
      },
      {
        a: staircase(sine(64, 3), { drive: shortAccumulator }),
        b: staircase(sawtooth.values, { stage, drive: loop(540 * 128) }),
        drive: shortAccumulator,
      },
    ];
    const questions = [];
    for (const { a, b, drive } of pairs) {
      const matched = equallyLoud(a, b, drive, 48_000);
      if (matched.kind !== 'matched') throw new Error(matched.kind);
      expect(Math.max(matched.turnedDownDb.a, matched.turnedDownDb.b)).toBeGreaterThan(1);
      const sound: Sound = { voices: { a: matched.a, b: matched.b }, drive };
      for (const hearing of ['a', 'b'] as const) {
        const frames = await render(page, { sound, hearing });
        questions.push(asked(frames, matched[hearing], matched[hearing].drive ?? drive, 48_000));
      }
    }
    const curve: Voice = { ...staircase(sine(64, 16)), form: 'curve' };
    const plain = await render(page, { sound: { voices: { it: curve }, drive: loop(64_000) } });
    const wild = staircase(Float64Array.from({ length: 400 }, (_, k) => (k % 4 < 2 ? 1.8 : -1.8)));
    const loud = await render(page, { sound: { voices: { it: wild }, drive: loop(40_000) }, volumeDb: 0 });
    questions.push(asked(plain, curve, loop(64_000), 48_000));
    const answers = askPython<Answer[]>('heard.py', questions);
    for (let pair = 0; pair < pairs.length; pair += 1) {
      const [a, b] = [answers[2 * pair].rmsDbfs, answers[2 * pair + 1].rmsDbfs];
      console.log(`equal loudness: ${a.toFixed(3)} and ${b.toFixed(3)} dBFS RMS`);
      expect(Math.abs(a - b)).toBeLessThan(0.1);
    }
    expect(answers[2 * pairs.length].peakDbfs).toBeCloseTo(-18, 1);
    expect(answers[2 * pairs.length].meanDbfs).toBeLessThan(-110);
    const peak = loud.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    expect(peak).toBe(0.5);
  });
});
