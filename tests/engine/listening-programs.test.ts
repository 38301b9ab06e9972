import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  curveLines,
  driveAtTone,
  heardLines,
  highestBelow,
  pinDelayFrames,
  predictedLines,
  programOf,
  rmsOfLines,
  rmsOfVoice,
  roundHzOf,
  RoundReader,
  staircaseLines,
  toneHzOf,
  wayOf,
  type Drive,
  type Voice,
} from '../../shared/listening/index.ts';
import { added, furthest, meanOf } from './support/listening.ts';
import { holds, noise } from './support/seeded.ts';

const seeds = fc.integer({ min: 1, max: 1e6 });

describe('a reader of rounds', () => {
  const voice: Voice = { values: noise(32, 9), cycles: 1, form: 'staircase' };
  const roundOf = (hz: number, form: Voice['form'] = 'staircase') => {
    const program = programOf({ ...voice, form }, { kind: 'loop', sampleRateHz: 32 * hz }, 48_000);
    if (program.kind !== 'round') throw new Error(program.kind);
    return program;
  };

  it('gives the round at its pitch, as late as a player of pins', () => {
    const reader = new RoundReader(48_000);
    reader.load(roundOf(440.7));
    const out = new Float64Array(1000);
    reader.process(out, 0, 300);
    reader.process(out, 300, 1000);
    const lines = staircaseLines(voice.values, highestBelow(48_000, 440.7));
    for (let i = 0; i < 1000; i += 1) {
      const wanted = i < pinDelayFrames ? 0 : added(lines, (((i - pinDelayFrames) * 440.7) / 48_000) % 1);
      expect(Math.abs(out[i] - wanted)).toBeLessThan(2e-6);
    }
  });

  it('goes on from its phase through a change of wave and of pitch, and through being skipped', () => {
    const reader = new RoundReader(48_000);
    reader.load(roundOf(100));
    const out = new Float64Array(4000);
    reader.process(out, 0, 1000);
    reader.load(roundOf(250, 'curve'));
    expect(reader.phase).toBeCloseTo((1000 * 100) / 48_000 - 2, 12);
    reader.process(out, 1000, 2000);
    reader.skip(500);
    reader.process(out, 2000, 3000);
    reader.setRoundHz(125);
    reader.process(out, 3000, 4000);
    const phase = (1000 * 100 + 2500 * 250 + 1000 * 125) / 48_000;
    expect(reader.phase).toBeCloseTo(phase % 1, 11);
    // The first frame after the skip is the one that was due.
    const curve = curveLines(voice.values, 16);
    const due = (1000 * 100 + (1500 - pinDelayFrames) * 250) / 48_000;
    expect(Math.abs(out[2000] - added(curve, due % 1))).toBeLessThan(2e-6);
  });
});

describe('how a voice is played', () => {
  const stairs: Voice = { values: noise(1024, 4), cycles: 1, form: 'staircase' };
  const curve: Voice = { ...stairs, form: 'curve' };
  const accumulator: Drive = {
    kind: 'accumulator',
    sampleRateHz: 31_250,
    accumulatorBits: 24,
    stepWord: 70_000,
  };

  it('goes by form, drive and the length of a round', () => {
    const loop = (hz: number): Drive => ({ kind: 'loop', sampleRateHz: 1024 * hz });
    expect(wayOf(stairs, loop(100), 48_000)).toBe('round');
    expect(wayOf(stairs, loop(3), 48_000)).toBe('round');
    expect(wayOf(stairs, loop(2), 48_000)).toBe('pin');
    expect(wayOf(curve, loop(0.01), 48_000)).toBe('round');
    expect(wayOf(stairs, accumulator, 48_000)).toBe('pin');
    expect(wayOf(curve, accumulator, 48_000)).toBe('round');
    expect(wayOf(stairs, { kind: 'once', sampleRateHz: 8000 }, 48_000)).toBe('pin');
    expect(wayOf(curve, { kind: 'once', sampleRateHz: 8000 }, 48_000)).toBe('pass');
  });

  it('takes the voice’s own drive before the sound’s', () => {
    const program = programOf({ ...stairs, drive: accumulator }, { kind: 'loop', sampleRateHz: 1 }, 48_000);
    expect(program).toMatchObject({ kind: 'pin', drive: accumulator });
  });

  it('has its tone from the drive, and the drive from its tone', () => {
    expect(roundHzOf({ kind: 'loop', sampleRateHz: 32_000 }, 256)).toBe(125);
    expect(toneHzOf({ kind: 'loop', sampleRateHz: 32_000 }, 256, 3)).toBe(375);
    expect(toneHzOf(accumulator, 256, 2)).toBe((2 * 70_000 * 31_250) / 2 ** 24);
    expect(driveAtTone({ kind: 'once', sampleRateHz: 1 }, 256, 2, 500)).toEqual({
      kind: 'once',
      sampleRateHz: 64_000,
    });
    const tuned = driveAtTone(accumulator, 256, 2, 440);
    expect(Math.abs(toneHzOf(tuned, 256, 2) - 440)).toBeLessThanOrEqual((31_250 / 2 ** 24) * 2 * 0.5);
  });

  it('has no mean, and the gain that was asked for', () => {
    const lifted = stairs.values.map((value) => value + 0.7);
    const lines = heardLines({ ...stairs, values: lifted, gain: 0.25 }, accumulator, 48_000);
    const plain = heardLines(stairs, accumulator, 48_000);
    expect(
      furthest(lines, { re: plain.re.map((re) => re / 4), im: plain.im.map((im) => im / 4) }),
    ).toBeLessThan(1e-14);
    const pin = programOf({ ...stairs, values: lifted, gain: 0.25 }, accumulator, 48_000);
    if (pin.kind !== 'pin') throw new Error(pin.kind);
    expect(Math.abs(meanOf(pin.values))).toBeLessThan(1e-14);
    expect(pin.values[3] - pin.values[2]).toBeCloseTo((stairs.values[3] - stairs.values[2]) / 4, 14);
  });
});

describe('predicted lines', () => {
  it('of a loop are the staircase’s below half of the rate, the strongest of them in rising order', () => {
    const voice: Voice = { values: noise(20, 6), cycles: 1, form: 'staircase' };
    const drive: Drive = { kind: 'loop', sampleRateHz: 8000 };
    const all = predictedLines(voice, drive, 48_000);
    expect(all.map(({ hz }) => hz)).toEqual(
      Array.from({ length: 59 }, (_, i) => (i + 1) * 400).filter((hz) => hz % 8000 !== 0),
    );
    const few = predictedLines(voice, drive, 48_000, 7);
    const strongest = all.sort((a, b) => b.amplitude - a.amplitude).slice(0, 7);
    expect(few).toEqual(strongest.sort((a, b) => a.hz - b.hz));
    expect(predictedLines(voice, { kind: 'once', sampleRateHz: 8000 }, 48_000)).toEqual([]);
  });

  it('of an accumulator that comes round within the table are those of a loop of what it visits', () => {
    holds(
      fc.property(fc.integer({ min: 1, max: 6 }), fc.nat({ max: 62 }), seeds, (visitedBits, step, seed) => {
        const values = noise(64, seed);
        const period = 2 ** visitedBits;
        const stepWord = ((2 * step + 1) % period) * 2 ** (10 - visitedBits);
        const drive: Drive = { kind: 'accumulator', sampleRateHz: 16_000, accumulatorBits: 10, stepWord };
        const visited = Float64Array.from({ length: period }, (_, n) => values[((n * stepWord) % 1024) >> 4]);
        const wanted = predictedLines(
          { values: visited, cycles: 1, form: 'staircase' },
          { kind: 'loop', sampleRateHz: 16_000 },
          40_000,
        );
        const found = predictedLines({ values, cycles: 1, form: 'staircase' }, drive, 48_000);
        for (const { hz, amplitude } of wanted) {
          if (amplitude < 1e-9) continue;
          const line = found.find((each) => Math.abs(each.hz - hz) < 1e-6);
          expect(line?.amplitude, `${hz} Hz`).toBeCloseTo(amplitude, 12);
        }
      }),
      60,
    );
  });

  it('of a curve are those of its round, whatever drives it', () => {
    const voice: Voice = { values: noise(64, 2), cycles: 1, form: 'curve' };
    const drive: Drive = { kind: 'accumulator', sampleRateHz: 1e6, accumulatorBits: 32, stepWord: 1_234_567 };
    const lines = predictedLines(voice, drive, 48_000);
    expect(lines[0].hz).toBeCloseTo(roundHzOf(drive, 64), 9);
    expect(lines).toHaveLength(32);
    expect(rmsOfVoice(voice, drive, 48_000)).toBeCloseTo(rmsOfLines(curveLines(voice.values, 32)), 14);
  });
});
