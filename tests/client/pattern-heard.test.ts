import { describe, expect, it } from 'vitest';
import type { PulsePattern } from '../../shared/contract/index.ts';
import { patternScore } from '../../shared/listening/pattern-score.ts';
import { ScoreCursor } from '../../src/audio/worklet/score-cursor.ts';
import { axisTimes, blocksOf, stepMarks } from '../../src/features/bench/listen/pattern/drawn.ts';
import { presets } from '../../src/features/bench/listen/pattern/presets.ts';
import { sayPattern } from '../../src/features/bench/listen/pattern/words.ts';

const step = (onMs: number, offMs: number, repeats = 1) => ({ onMs, offMs, repeats });
const pairs: PulsePattern = { steps: [step(83, 117), step(83, 917)], endless: true };

describe('a pattern in the player', () => {
  it.each([44_100, 48_000])('has each edge on its nearest frame at %i Hz, an hour later too', (rateHz) => {
    const cursor = new ScoreCursor(rateHz);
    cursor.begin(patternScore(pairs), 12_345);
    for (let round = 0; round < 3_000; round += 1) {
      for (const [k, ms] of [0, 83, 200, 283].entries()) {
        expect(cursor.nextFrame).toBe(12_345 + Math.round(((round * 1200 + ms) * rateHz) / 1000));
        expect(cursor.take().gate).toBe(k % 2 === 0);
      }
    }
  });

  it('ends closed where it plays once', () => {
    const cursor = new ScoreCursor(48_000);
    cursor.begin(patternScore({ ...pairs, endless: false }), 0);
    const gates = [0, 1, 2, 3].map(() => cursor.take().gate);
    expect([gates, cursor.nextFrame]).toEqual([[true, false, true, false], Infinity]);
  });
});

describe('the drawing of a pattern', () => {
  it('has a block for each pulse, to scale', () => {
    expect(blocksOf({ steps: [step(100, 300, 2), step(200, 0)], endless: false }, 100)).toEqual([
      { from: 0, to: 10, isDense: false },
      { from: 40, to: 50, isDense: false },
      { from: 80, to: 100, isDense: false },
    ]);
  });

  it('draws pulses that cannot be told apart as one that says so, and runs pulses without a pause together', () => {
    const [dense, ...others] = blocksOf({ steps: [step(1, 1, 255)], endless: false }, 255);
    expect([dense.from, dense.isDense, others]).toEqual([0, true, []]);
    expect(dense.to).toBeCloseTo(254.5, 9);
    expect(blocksOf({ steps: [step(5, 0, 4)], endless: false }, 100)).toEqual([
      { from: 0, to: 100, isDense: false },
    ]);
  });

  it('numbers the steps that have room', () => {
    const steps = [step(10, 0), step(10, 0), step(980, 0)];
    expect(stepMarks({ steps, endless: false }, 300, 5)).toEqual([
      { step: 1, at: 0 },
      { step: 3, at: 6 },
    ]);
  });

  it.each([
    [1, [0, 1]],
    [1200, [0, 500, 1000]],
    [28_200, [0, 10_000, 20_000]],
    [9, [0, 2, 4, 6, 8]],
  ])('has round times on the axis of %i ms', (whole, times) => {
    expect(axisTimes(whole, 5)).toEqual(times);
  });

  it('says a pattern in words', () => {
    expect(sayPattern(pairs)).toBe(
      '2 steps, 2 pulses: of 1,200 ms it sounds 166 ms, 14 %. Then from the beginning, for ever.',
    );
    expect(new Set(presets.map(({ name }) => name)).size).toBe(presets.length);
  });
});
