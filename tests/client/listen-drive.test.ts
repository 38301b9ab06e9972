import { describe, expect, it } from 'vitest';
import { outputHz } from '../../shared/playback/index.ts';
import { driveOf, toneOfDrive, whyNoAccumulator } from '../../src/features/bench/listen/drive.ts';
import { playbackSettingsSchema } from '../../shared/contract/index.ts';
import { playbackSchema, type Playback } from '../../src/features/bench/state/wave.ts';

const byAccumulator: Playback = {
  mode: 'accumulator',
  by: 'sampleRate',
  toneHz: 440,
  sampleRateHz: 32_000,
  accumulator: { accumulatorBits: 24, stepWord: 230_687 },
};

describe('how a playback drives a table', () => {
  it('is a loop or one pass at the sample rate, whichever way that is set', () => {
    const playback: Playback = { mode: 'loop', by: 'tone', toneHz: 440, sampleRateHz: 1 };
    expect(driveOf(playback, { length: 100, cycles: 4 })).toEqual({ kind: 'loop', sampleRateHz: 11_000 });
    expect(driveOf({ ...playback, mode: 'once' }, { length: 100, cycles: 4 }).kind).toBe('once');
  });

  it('is by the accumulator where there is one and the length is a power of two; a loop where not', () => {
    expect(driveOf(byAccumulator, { length: 256, cycles: 1 })).toEqual({
      kind: 'accumulator',
      sampleRateHz: 32_000,
      accumulatorBits: 24,
      stepWord: 230_687,
    });
    const cases = [
      [byAccumulator, 100, 'the table length must be a power of two, and 100 is none'],
      [{ ...byAccumulator, accumulator: undefined }, 256, 'no accumulator is chosen'],
      [{ ...byAccumulator, accumulator: { accumulatorBits: 7, stepWord: 1 } }, 256, 'the accumulator must have 8 to 48 bits'],
      [{ ...byAccumulator, accumulator: { accumulatorBits: 8, stepWord: 256 } }, 256, 'the step word must be a whole number from 1 to 255'],
    ] as const; // prettier-ignore
    for (const [playback, length, why] of cases) {
      expect(whyNoAccumulator(playback, length)).toBe(why);
      expect(driveOf(playback, { length, cycles: 1 })).toEqual({ kind: 'loop', sampleRateHz: 32_000 });
    }
  });

  it('tells the tone, folded below half of the sample rate', () => {
    const drive = driveOf(byAccumulator, { length: 256, cycles: 1 });
    const tone = outputHz({ accumulatorBits: 24, stepWord: 230_687 }, 32_000);
    expect(toneOfDrive(drive, { length: 256, cycles: 1 })).toBeCloseTo(tone, 9);
    expect(toneOfDrive(drive, { length: 256, cycles: 3 })).toBeCloseTo(3 * tone, 9);
    const high = { ...byAccumulator, accumulator: { accumulatorBits: 24, stepWord: 2 ** 24 - 230_687 } };
    expect(toneOfDrive(driveOf(high, { length: 256, cycles: 1 }), { length: 256, cycles: 1 })).toBeCloseTo(
      tone,
      9,
    );
  });

  it('is kept with the wave as it was chosen', () => {
    expect(playbackSchema.parse(byAccumulator)).toEqual(byAccumulator);
    expect(playbackSettingsSchema.parse(byAccumulator)).toEqual(byAccumulator);
  });
});
