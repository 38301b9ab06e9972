import { describe, expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import {
  answerTrial,
  beginRun,
  equallyLoud,
  giveUp,
  guessingChance,
  rightNeeded,
  scoreOf,
  trialLimits,
  type BlindRun,
  type Drive,
  type Voice,
} from '../../shared/listening/index.ts';

/** A coin that lies as it is told, and says how often it was thrown. */
function coinOf(throws: readonly boolean[]) {
  let thrown = 0;
  return { coin: () => throws[thrown++], thrown: () => thrown };
}

describe('a run of trials', () => {
  test('draws X once a trial and notes what it was taken for', () => {
    const { coin, thrown } = coinOf([true, false, false, true, false, true]);
    let run = beginRun(5, coin);
    expect(run).toEqual({ trials: 5, answered: [], x: 'b', end: 'open' });
    for (const said of ['b', 'a', 'b', 'b', 'a'] as const) run = answerTrial(run, said, coin);
    expect(run.answered).toEqual([
      { x: 'b', said: 'b' },
      { x: 'a', said: 'a' },
      { x: 'a', said: 'b' },
      { x: 'b', said: 'b' },
      { x: 'a', said: 'a' },
    ]);
    expect(run).toMatchObject({ end: 'complete', x: null });
    expect(thrown()).toBe(5);
    expect(scoreOf(run)).toEqual({ right: 4, of: 5, byGuessing: 6 / 32 });
    expect(answerTrial(run, 'a', coin)).toBe(run);
    expect(giveUp(run)).toBe(run);
  });

  test('that is given up keeps its answers and takes no more', () => {
    const { coin } = coinOf([false, true, false]);
    const ended = giveUp(answerTrial(beginRun(16, coin), 'a', coin));
    expect(ended).toMatchObject({ end: 'given-up', x: null, trials: 16 });
    expect(scoreOf(ended)).toEqual({ right: 1, of: 1, byGuessing: 0.5 });
    expect(answerTrial(ended, 'a', coin)).toBe(ended);
  });

  test('refuses a number of trials that says nothing', () => {
    const coin = () => true;
    for (const trials of [trialLimits.min - 1, trialLimits.max + 1, 7.5, NaN]) {
      expect(() => beginRun(trials, coin)).toThrow(/allowed: a whole number from 5 to 100/);
    }
  });

  test('does not change the run it goes on from', () => {
    const { coin } = coinOf([false, true]);
    const first: BlindRun = Object.freeze(beginRun(5, coin));
    answerTrial(first, 'a', coin);
    expect(first.answered).toEqual([]);
  });
});

describe('the probability to do as well by guessing', () => {
  // By Python: from fractions import Fraction as F; from math import comb
  // [float(sum(F(comb(m, k), 2**m) for k in range(n, m + 1))) for n, m in …]
  test.each([
    [12, 16, 0.0384063720703125],
    [16, 16, 1.52587890625e-5],
    [0, 16, 1],
    [8, 16, 0.5981903076171875],
    [5, 5, 0.03125],
    [9, 10, 0.0107421875],
    [60, 100, 0.028443966820490395],
    [100, 100, 7.888609052210118e-31],
    [13, 20, 0.13158798217773438],
    [0, 0, 1],
  ])('%i of %i: %d', (right, of, exact) => {
    expect(guessingChance(right, of)).toBe(exact);
  });

  test('falls with each right one, by the weight of that score', () => {
    // Pascal's triangle in doubles, another way to the same weights.
    for (let of = 1; of <= 60; of += 1) {
      let row = [1];
      for (let m = 0; m < of; m += 1) row = [1, ...row.slice(1).map((ways, k) => ways + row[k]), 1];
      for (let right = 0; right < of; right += 1) {
        const weight = guessingChance(right, of) - guessingChance(right + 1, of);
        expect(Math.abs(weight - row[right] / 2 ** of)).toBeLessThan(1e-15);
      }
    }
  });

  test('tells how many right of so many are rarely guessed', () => {
    expect(rightNeeded(16)).toBe(12);
    expect(rightNeeded(5)).toBe(5);
    expect(rightNeeded(10)).toBe(9);
    expect(rightNeeded(4)).toBeNull();
    for (let of = 5; of <= 100; of += 1) {
      const needed = rightNeeded(of) ?? 0;
      expect(guessingChance(needed, of)).toBeLessThanOrEqual(0.05);
      expect(guessingChance(needed - 1, of)).toBeGreaterThan(0.05);
    }
  });
});

describe('equal loudness', () => {
  const contextRateHz = 48_000;
  const partials = [
    { harmonic: 1, amplitude: 1, phaseDeg: 0 },
    { harmonic: 3, amplitude: 0.6, phaseDeg: 40 },
  ];
  const voiceOf = (table: DefinitionInput['table'], form: Voice['form'], level = 1): Voice => {
    const made = buildTable({
      schema: 1,
      name: 'Tone',
      source: { kind: 'harmonics', partials },
      level: { level },
      table,
    });
    return {
      values: form === 'curve' ? made.cycle : made.values,
      cycles: made.definition.table.cycles,
      form,
    };
  };

  /**
   * RMS of a staircase below a frequency, from the staircase alone: integrals over its treads, line by line as Fourier
   * has it, without the engine's transform or its sinc.
   */
  function staircaseRms(values: Float64Array, roundHz: number, belowHz: number): number {
    const size = values.length;
    let power = 0;
    for (let m = 1; m * roundHz < belowHz; m += 1) {
      let re = 0;
      let im = 0;
      for (let k = 0; k < size; k += 1) {
        const [from, to] = [(2 * Math.PI * m * k) / size, (2 * Math.PI * m * (k + 1)) / size];
        re += (values[k] * (Math.sin(to) - Math.sin(from))) / (2 * Math.PI * m);
        im += (values[k] * (Math.cos(to) - Math.cos(from))) / (2 * Math.PI * m);
      }
      power += 2 * (re * re + im * im);
    }
    return Math.sqrt(power);
  }

  test('two staircases of other lengths and levels come to one RMS, the stronger turned down', () => {
    const drive: Drive = { kind: 'loop', sampleRateHz: 440 * 32 };
    const a = voiceOf({ length: 32, bits: 5 }, 'staircase');
    const other: Drive = { kind: 'loop', sampleRateHz: 440 * 20 };
    const b = { ...voiceOf({ length: 20, bits: 8 }, 'staircase', 0.4), drive: other };
    const matched = equallyLoud(a, b, drive, contextRateHz);
    if (matched.kind !== 'matched') throw new Error('not matched');
    const rms = [matched.a, matched.b].map(
      ({ values, gain = 1 }) => gain * staircaseRms(values, 440, contextRateHz / 2),
    );
    expect(Math.abs(20 * Math.log10(rms[0] / rms[1]))).toBeLessThan(0.001);
    expect(matched.b.gain).toBe(1);
    expect(matched.a.gain).toBeLessThan(0.5);
    expect(matched.turnedDownDb.b).toBe(0);
    expect(matched.turnedDownDb.a).toBeCloseTo(-20 * Math.log10(matched.a.gain ?? 1), 9);
  });

  test('images count: a coarse staircase against its own curve', () => {
    // 4 entries at 3 kHz: images at 3, 5, 7 … times the tone stand below 24 kHz.
    const quarter = buildTable({
      schema: 1,
      name: 'Tone',
      source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 45 }] },
      table: { length: 4, bits: 12 },
    });
    const drive: Drive = { kind: 'loop', sampleRateHz: 12_000 };
    const curve: Voice = { values: quarter.values, cycles: 1, form: 'curve' };
    const pin: Voice = { values: quarter.values, cycles: 1, form: 'staircase' };
    const matched = equallyLoud(curve, pin, drive, contextRateHz);
    if (matched.kind !== 'matched') throw new Error('not matched');
    const ofCurve = Math.sqrt(quarter.values.reduce((sum, value) => sum + value * value, 0) / 4);
    const ofPin = staircaseRms(quarter.values, 3000, 24_000);
    const expected = 20 * Math.log10(ofCurve / ofPin);
    expect(matched.turnedDownDb.a - matched.turnedDownDb.b).toBeCloseTo(expected, 6);
    expect(Math.abs(expected)).toBeGreaterThan(0.1);
  });

  test('through a place where it is heard the lines count as they arrive', () => {
    const drive: Drive = { kind: 'loop', sampleRateHz: 440 * 256 };
    const plain = voiceOf({ length: 256, bits: 12 }, 'staircase');
    const single = buildTable({
      schema: 1,
      name: 'Tone',
      source: { kind: 'harmonics', partials: partials.slice(1) },
      table: { length: 256, bits: 12 },
    });
    const b: Voice = { values: single.values, cycles: 1, form: 'staircase' };
    // Nothing below 1 kHz arrives: of the first, only its third partial is left.
    const matched = equallyLoud(plain, b, drive, contextRateHz, (hz) => (hz < 1000 ? 0 : 1));
    if (matched.kind !== 'matched') throw new Error('not matched');
    const third = (values: Float64Array) =>
      staircaseRms(values, 440, 1e4) ** 2 - staircaseRms(values, 440, 1e3) ** 2;
    const expected = 10 * Math.log10(third(b.values) / third(plain.values));
    expect(matched.turnedDownDb.b).toBeCloseTo(expected, 2);
  });

  test('a voice without a swing cannot be matched', () => {
    const drive: Drive = { kind: 'loop', sampleRateHz: 440 * 256 };
    const still: Voice = { values: new Float64Array(256).fill(0.3), cycles: 1, form: 'staircase' };
    const swings = voiceOf({ length: 256, bits: 8 }, 'staircase');
    expect(equallyLoud(swings, still, drive, contextRateHz)).toEqual({ kind: 'silent', which: 'b' });
    expect(equallyLoud(still, still, drive, contextRateHz)).toEqual({ kind: 'silent', which: 'both' });
    // Nothing of it lies below 24 kHz.
    const high: Voice = { ...swings, drive: { kind: 'loop', sampleRateHz: 30_000 * 256 } };
    expect(equallyLoud(high, swings, drive, contextRateHz)).toEqual({ kind: 'silent', which: 'a' });
  });
});
