import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  heardLines,
  predictedLines,
  rmsOfVoice,
  roundOnGrid,
  RoundReader,
  bandGain,
  type Drive,
} from '../../shared/listening/index.ts';
import type { StageParts } from '../../shared/output-stage/index.ts';
import {
  playerOf,
  framesOf,
  amplitudesOf,
  decibels,
  staircase,
  filtered,
  slow,
} from './support/listening.ts';
import { examplesOf, noise } from './support/seeded.ts';

describe('a loop played entry by entry', () => {
  // Rounds that come out even over `frames`, so that every bin of the difference can be looked at, spurious ones too.
  const cases: [entries: number, rounds: number, frames: number, rate: number, stage?: StageParts][] = [
    [2, 11, 1200, 48_000],
    [64, 11, 1200, 48_000],
    [64, 13, 1470, 44_100],
    [100, 7, 1600, 96_000],
    // At the context's own rate, and just beside it.
    [48, 1, 48, 48_000],
    [49, 32, 1536, 48_000],
    // 1 MHz, and 8 Hz a round.
    [250, 100, 1200, 48_000],
    [512, 1, 6000, 48_000],
    [64, 11, 1200, 48_000, filtered],
    [250, 100, 1200, 48_000, filtered],
    [31, 13, 1470, 44_100, slow],
  ];

  it.each(cases)(
    'of %i entries, %i rounds in %i frames at %i Hz is the round of its lines: −100 dB up to 20/48 of the rate',
    (entries, rounds, frames, rate, stage) => {
      const voice = staircase(noise(entries, entries), stage);
      const roundHz = (rounds * rate) / frames;
      const drive: Drive = { kind: 'loop', sampleRateHz: roundHz * entries };
      const reader = new RoundReader(rate);
      reader.load({ ...roundOnGrid(heardLines(voice, drive, rate)), roundHz });
      // A slow filter needs a while before it comes round.
      const before = frames * Math.ceil((stage === undefined ? 200 : 8000) / frames);
      const found = framesOf(playerOf(voice, drive, rate), frames, before);
      const wanted = framesOf(reader, frames, before);
      const off = amplitudesOf(found.map((value, i) => value - wanted[i]));
      const top = Math.floor((frames * 20) / 48);
      expect(decibels(Math.max(...off.subarray(0, top + 1)))).toBeLessThan(-100);
    },
  );

  it('lets nothing fold: what an accumulator of any rate gives is what was predicted, and no more', () => {
    const cases = examplesOf(
      fc.record({
        // The rate is a context's times or by a power of two, so that whole rounds are whole frames.
        factor: fc.constantFrom(-3, -1, 0, 1, 4),
        width: fc.integer({ min: 6, max: 11 }),
        step: fc.integer({ min: 1, max: 2 ** 30 }),
        indexBits: fc.integer({ min: 1, max: 6 }),
      }),
      24,
    );
    for (const each of cases) {
      const { factor, width, indexBits } = each;
      const drive: Drive = {
        kind: 'accumulator',
        sampleRateHz: 48_000 * 2 ** factor,
        accumulatorBits: width,
        stepWord: (2 * each.step + 1) % 2 ** width,
      };
      const voice = staircase(noise(2 ** indexBits, indexBits));
      const frames = Math.max(64, 2 ** (width - factor));
      const amplitudes = amplitudesOf(
        framesOf(playerOf(voice, drive), frames, frames * Math.ceil(200 / frames)),
      );
      amplitudes[0] = 0;
      for (const { hz, amplitude } of predictedLines(voice, drive, 48_000, 4096)) {
        const bin = (hz * frames) / 48_000;
        expect(Math.abs(bin - Math.round(bin)), JSON.stringify(each)).toBeLessThan(1e-6);
        amplitudes[Math.round(bin)] -= amplitude;
      }
      const left = Math.max(...amplitudes.map(Math.abs));
      expect(decibels(left), JSON.stringify(each)).toBeLessThan(-90);
    }
  });

  it('is at the predicted RMS, at any rate and of any table', () => {
    for (const [entries, sampleRateHz, bits] of [
      [256, 8000, 16],
      [256, 1e6, 32],
      [8, 31_250, 24],
      [4, 48_000, 3],
    ]) {
      const sine = Float64Array.from({ length: entries }, (_, k) => Math.sin((2 * Math.PI * k) / entries));
      for (const voice of [staircase(noise(entries, 7)), staircase(sine), staircase(sine, filtered)]) {
        const stepWord = Math.max(1, Math.round((440.3 / sampleRateHz) * 2 ** bits));
        const drive: Drive = { kind: 'accumulator', sampleRateHz, accumulatorBits: bits, stepWord };
        const frames = framesOf(playerOf(voice, drive), 48_000, 2000);
        const mean = frames.reduce((sum, value) => sum + value, 0) / frames.length;
        const power = frames.reduce((sum, value) => sum + (value - mean) ** 2, 0) / frames.length;
        const off = decibels(Math.sqrt(power) / rmsOfVoice(voice, drive, 48_000));
        expect(Math.abs(off), JSON.stringify(drive)).toBeLessThan(0.05);
      }
    }
  });
});

describe('the low-pass under the edges', () => {
  it('is flat up to 20 kHz and closed from 24 kHz on', () => {
    expect(bandGain(20_000, 48_000)).toBe(1);
    expect(Math.abs(decibels(bandGain(20_001, 48_000)))).toBeLessThan(0.001);
    expect(decibels(bandGain(22_000, 48_000))).toBeCloseTo(-6.02, 2);
    expect(decibels(bandGain(23_990, 48_000))).toBeLessThan(-90);
    expect(bandGain(24_000, 48_000)).toBe(0);
  });
});
