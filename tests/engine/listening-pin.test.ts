import { describe, expect, it } from 'vitest';
import {
  pinDelayFrames,
  programOf,
  roundHzOf,
  PinPlayer,
  pinRateHzAtMost,
  stepKernel,
  type Drive,
  type Voice,
} from '../../shared/listening/index.ts';
import type { StageParts } from '../../shared/output-stage/index.ts';
import { filtered, framesOf, furthestApart, pinOf, playerOf, slow, staircase } from './support/listening.ts';
import { noise } from './support/seeded.ts';

describe('an accumulator played entry by entry', () => {
  /** At 100 Hz each entry lasts 480 frames: its level stands in the middle. */
  const entryFrames = 480;
  const heardEntries = (player: PinPlayer, count: number): number[] => {
    const frames = framesOf(player, count * entryFrames, pinDelayFrames);
    return Array.from({ length: count }, (_, n) => frames[n * entryFrames + entryFrames / 2]);
  };
  const values = Float64Array.from({ length: 256 }, (_, k) => (2 * k) / 255 - 1);
  const driveOf = (accumulatorBits: number, stepWord: number): Drive => ({
    kind: 'accumulator',
    sampleRateHz: 100,
    accumulatorBits,
    stepWord,
  });

  it('takes the entries that whole numbers say, to the last of 48 bits', () => {
    for (const [bits, word] of [
      [8, 77],
      [24, 12_345_679],
      [47, 2 ** 46 + 1],
      [48, 2 ** 48 - 1],
      [48, 123_456_789_012_345],
    ]) {
      const found = heardEntries(playerOf(staircase(values), driveOf(bits, word)), 40);
      found.forEach((value, n) => {
        const index = ((BigInt(n) * BigInt(word)) % (1n << BigInt(bits))) >> BigInt(bits - 8);
        expect(value, `${bits} bits, entry ${n}`).toBeCloseTo(values[Number(index)], 9);
      });
    }
  });

  it('goes on from where it is with another step word', () => {
    const [word, other] = [1_000_003, 3_000_001];
    const player = playerOf(staircase(values), driveOf(24, word));
    const before = heardEntries(player, 5);
    before.forEach((value, n) => expect(value).toBeCloseTo(values[(n * word) >> 16], 9));
    // Entry 5 has come and the word has been added for entry 6: that one is the first to which the other is added.
    player.setStepWord(other);
    const after = framesOf(player, 6 * entryFrames);
    for (let i = 0; i < 6; i += 1) {
      const acc = (i === 0 ? 5 * word : 6 * word + (i - 1) * other) % 2 ** 24;
      expect(after[i * entryFrames + entryFrames / 2]).toBeCloseTo(values[acc >> 16], 9);
    }
  });

  it('goes on from within an entry with another sample rate', () => {
    const player = playerOf(staircase(values), driveOf(24, 2 ** 20));
    framesOf(player, 3.5 * entryFrames);
    player.setSampleRate(25);
    // Of entry 3 one half is left, four times as long; then entry 4 comes.
    const after = framesOf(player, 3 * entryFrames, pinDelayFrames);
    const edge = 2 * entryFrames;
    expect(after[edge - 60]).toBeCloseTo(values[3 * 16], 9);
    expect(after[edge]).toBeCloseTo((values[3 * 16] + values[4 * 16]) / 2, 2);
    expect(after[edge + 60]).toBeCloseTo(values[4 * 16], 9);
  });

  it('with no more samples a round than entries is a loop of what it visits, frame by frame', () => {
    for (const [word, period] of [
      [16, 64],
      [80, 64],
      [192, 16],
      [512, 2],
    ]) {
      const accumulator: Drive = {
        kind: 'accumulator',
        sampleRateHz: 31_250,
        accumulatorBits: 10,
        stepWord: word,
      };
      const table = noise(256, word);
      const mean = table.reduce((sum, value) => sum + value, 0) / 256;
      const visited = Float64Array.from({ length: period }, (_, n) => table[((n * word) % 1024) >> 2] - mean);
      const loop = new PinPlayer(48_000);
      loop.load({
        values: visited,
        drive: { kind: 'loop', sampleRateHz: 31_250 },
        kernel: stepKernel(48_000),
      });
      const wanted = framesOf(loop, 2000);
      const found = framesOf(playerOf(staircase(table), accumulator), 2000);
      expect(furthestApart(found, wanted)).toBeLessThan(1e-14);
    }
  });
});

describe('a player of pins', () => {
  const table = noise(50, 3);
  const loop: Drive = { kind: 'loop', sampleRateHz: 11_000 };

  it('plays a pass once and stays on its last entry', () => {
    const player = playerOf(staircase(table), { kind: 'once', sampleRateHz: 8000 });
    const mean = table.reduce((sum, value) => sum + value, 0) / 50;
    const seconds = 50 / 8000;
    framesOf(player, Math.floor(seconds * 48_000));
    expect(player.hasEnded).toBe(false);
    const rest = framesOf(player, 400);
    expect(player.hasEnded).toBe(true);
    expect(rest[399]).toBeCloseTo(table[49] - mean, 12);
    expect(rest[200]).toBeCloseTo(table[49] - mean, 12);
    player.seek(0);
    expect(player.hasEnded).toBe(false);
    expect(framesOf(player, 300)[299]).not.toBeCloseTo(table[49] - mean, 3);
  });

  it('has no drift: a million edges later it stands where it must', () => {
    const player = new PinPlayer(48_000);
    const values = noise(2 ** 20, 11);
    player.load({ values, drive: { kind: 'once', sampleRateHz: 4e6 }, kernel: stepKernel(48_000, filtered) });
    const frames = framesOf(player, 16_000);
    expect(frames[15_999]).toBeCloseTo(values[2 ** 20 - 1], 10);
  });

  it('goes on from its place with another wave, length and kind of drive', () => {
    const player = playerOf(staircase(table), loop);
    framesOf(player, 1111);
    const phase = ((1111 / 48_000) * 11_000) / 50;
    expect(player.phase).toBeCloseTo(phase % 1, 11);
    player.load(pinOf(staircase(noise(100, 4)), { kind: 'loop', sampleRateHz: 22_000 }, 48_000));
    // To the entry: of two that lie within one of the old ones, the place of the next is what is kept.
    expect(Math.abs(player.phase - (phase % 1))).toBeLessThan(1 / 50);
    player.load(
      pinOf(
        staircase(noise(64, 4)),
        { kind: 'accumulator', sampleRateHz: 22_000, accumulatorBits: 32, stepWord: 1e7 },
        48_000,
      ),
    );
    expect(Math.abs(player.phase - (phase % 1))).toBeLessThan(2 / 50);
  });

  it('makes no step at a change that is larger than that of the levels', () => {
    const player = playerOf(staircase(table), loop);
    const before = framesOf(player, 777);
    player.load(pinOf(staircase(table), loop, 48_000));
    player.setSampleRate(11_000);
    const after = framesOf(player, 777);
    const wanted = framesOf(playerOf(staircase(table), loop), 1554);
    expect(furthestApart([...before, ...after], wanted)).toBeLessThan(1e-12);
  });

  it('goes over to another stage without an outburst, however slow that is', () => {
    const rc = (cutoffHz: number): StageParts => ({ ...slow, filter: { kind: 'rc', cutoffHz } });
    const pair = (cutoffHz: number): StageParts => ({ ...slow, filter: { kind: 'butterworth', cutoffHz } });
    // All poles at the least that a board may say, and next to none.
    const stuck: StageParts = {
      outputOhms: 1e12,
      capacitanceF: 1,
      opAmp: { slewRateVPerS: 1, gainBandwidthHz: 1e-3 },
      filter: { kind: 'butterworth', cutoffHz: 1e-3 },
    };
    const player = playerOf(staircase(table), loop);
    framesOf(player, 1000);
    for (const stage of [pair(20), rc(20), filtered, pair(0.001), stuck, undefined, stuck, pair(9000)]) {
      player.load(pinOf(staircase(table, stage), loop, 48_000));
      expect(Math.max(...framesOf(player, 3000).map(Math.abs))).toBeLessThan(1.6);
    }
    // And comes to what the last one gives from the start.
    const wanted = playerOf(staircase(table, pair(9000)), loop);
    wanted.process(new Float64Array(25_000), 0, 25_000);
    const found = framesOf(player, 1000);
    expect(furthestApart(framesOf(wanted, 1000), found)).toBeLessThan(1e-9);
  });

  it('that was skipped is what it would have been, and another can follow it', () => {
    for (const [voice, tolerance, from] of [
      [staircase(table), 1e-12, 0],
      [staircase(table, filtered), 1e-9, 400],
    ] as const) {
      const drive: Drive = {
        kind: 'accumulator',
        sampleRateHz: 29_999,
        accumulatorBits: 40,
        stepWord: 2 ** 31 + 7,
      };
      const power = { ...voice, values: noise(64, 8) };
      const wanted = framesOf(playerOf(power, drive), 4000);
      const player = playerOf(power, drive);
      framesOf(player, 1000);
      player.skip(1300);
      const found = framesOf(player, 40);
      player.skip(60);
      const later = framesOf(player, 1600);
      if (from === 0) expect(furthestApart(found, wanted.subarray(2300))).toBeLessThan(tolerance);
      expect(furthestApart(later.subarray(from), wanted.subarray(2400 + from))).toBeLessThan(tolerance);
      const follower = playerOf(power, drive);
      follower.follow(player);
      const own = framesOf(player, 1000).subarray(600);
      expect(furthestApart(framesOf(follower, 1000).subarray(600), own)).toBeLessThan(tolerance);
    }
  });

  it('refuses rates beyond what it is for, by what is allowed', () => {
    const player = new PinPlayer(48_000);
    for (const hz of [0, -1, NaN, pinRateHzAtMost * 1.001]) {
      expect(() => player.load(pinOf(staircase(table), { kind: 'loop', sampleRateHz: hz }, 48_000))).toThrow(
        `Sample rate ${hz} Hz: above 0 and at most 4 MHz.`,
      );
    }
    player.load(
      pinOf(
        staircase(noise(4)),
        { kind: 'accumulator', sampleRateHz: 1, accumulatorBits: 4, stepWord: 3 },
        48_000,
      ),
    );
    expect(() => player.setStepWord(16)).toThrow('Step word 16: a whole number from 1 to 15.');
  });
});

describe('one pass along a curve', () => {
  it('goes through its entries, at the same time as a pin', () => {
    const voice: Voice = { values: noise(200, 2), cycles: 1, form: 'curve' };
    const mean = voice.values.reduce((sum, value) => sum + value, 0) / 200;
    const pass = programOf(voice, { kind: 'once', sampleRateHz: 8000 }, 48_000);
    if (pass.kind !== 'pass') throw new Error(pass.kind);
    for (let k = 0; k < 200; k += 1) {
      expect(pass.frames[pass.firstEntryFrame + 6 * k]).toBeCloseTo(voice.values[k] - mean, 5);
    }
    expect(roundHzOf({ kind: 'once', sampleRateHz: 8000 }, 200)).toBe(40);
  });
});
