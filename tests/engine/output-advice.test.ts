import { describe, expect, it } from 'vitest';
import { parseDefinition, parseTrialSettings } from '../../shared/contract/index.ts';
import {
  ladderValues,
  markedTolerances,
  partsOf,
  sinadAgainstBits,
  standardValues,
  toleranceForYield,
  Trials,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from './support/ladders.ts';
import { waveOf } from './support/waves.ts';

describe('standard values', () => {
  it('cover decades in rising order, as the doubles of their names', () => {
    expect(standardValues('E12', 4.7, 100)).toEqual([
      4.7, 5.6, 6.8, 8.2, 10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82, 100,
    ]);
    expect(standardValues('E96', 10_000, 10_499)).toEqual([10_000, 10_200]);
  });

  it('make R and 2R: exact ways first, nearest to the wanted R first among them', () => {
    const ways = ladderValues('E24', 10_000);
    expect(ways[0]).toMatchObject({ R: 10_000, twoR: 20_000, ratioError: 0 });
    for (const { from, values, R, twoR, ratioError } of ways) {
      expect(twoR / R / 2 - 1).toBeCloseTo(ratioError, 12);
      if (from === 'pair') expect(values).toEqual([R, twoR]);
      if (from === 'series') expect([values[0], 2 * values[0]]).toEqual([R, twoR]);
      if (from === 'parallel') expect([values[0] / 2, values[0]]).toEqual([R, twoR]);
    }
    const pairs = ways.filter(({ from, ratioError }) => from === 'pair' && ratioError === 0);
    expect(pairs.map(({ R }) => R)).toContain(10_000);
    expect(pairs.map(({ R }) => R)).toContain(15_000);
    // E12 has no pair near 1:2; 33 and 68 come nearest, 3 % off.
    expect(ladderValues('E12', 10_000).some(({ from }) => from === 'pair')).toBe(false);
    const [nearest] = ladderValues('E12', 10_000, 0.05).filter(({ from }) => from === 'pair');
    expect(nearest).toMatchObject({ R: 3300, twoR: 6800 });
    expect(nearest.ratioError).toBeCloseTo(0.0303, 4);
  });

  it('take as many parts as the ladder has places', () => {
    expect(partsOf({ from: 'pair' }, 8)).toBe(16);
    expect(partsOf({ from: 'series' }, 8)).toBe(2 * 9 + 7);
    expect(partsOf({ from: 'parallel' }, 8)).toBe(9 + 2 * 7);
  });
});

describe('the tolerance that a yield needs', () => {
  const yieldAt = (bits: number, tolerancePercent: number) => {
    const trials = new Trials(
      ladderWith({ bits }),
      parseTrialSettings({ trials: 500, seed: 4, tolerancePercent }),
    );
    trials.run(500);
    return trials.summary().monotonicShare as number;
  };

  it('keeps it, and a little more does not', () => {
    for (const bits of [4, 8]) {
      const found = toleranceForYield(ladderWith({ bits }), 0.9, {
        trials: 500,
        seed: 4,
        distribution: 'uniform',
      });
      const percent = found.tolerancePercent as number;
      expect(yieldAt(bits, percent)).toBeGreaterThanOrEqual(0.9);
      expect(yieldAt(bits, 1.1 * percent)).toBeLessThan(0.9);
      const wider = markedTolerances
        .filter((tolerance) => tolerance > (found.markedPercent as number))
        .at(-1);
      expect(found.markedPercent).toBeLessThanOrEqual(percent);
      expect(yieldAt(bits, wider as number)).toBeLessThan(0.9);
    }
  });

  it('is narrower for more bits and for a higher yield', () => {
    const at = (bits: number, share: number) =>
      toleranceForYield(ladderWith({ bits }), share, { trials: 300, seed: 1, distribution: 'normal' })
        .tolerancePercent as number;
    expect(at(10, 0.9)).toBeLessThan(at(8, 0.9));
    expect(at(8, 0.9)).toBeLessThan(at(6, 0.9));
    expect(at(8, 0.99)).toBeLessThan(at(8, 0.9));
  });

  it('does not exist where the ladder itself does not rise', () => {
    const rungs = [2e4, 2e4, 2e4, 4e4];
    const ladder = ladderWith({ bits: 4, rungs });
    expect(toleranceForYield(ladder, 0.9, { trials: 50, seed: 1, distribution: 'uniform' })).toEqual({
      tolerancePercent: null,
      markedPercent: null,
    });
  });
});

describe('how many bits matter', () => {
  const definition = parseDefinition(waveOf({ table: { length: 101 } }));
  const settings = (tolerancePercent: number) => parseTrialSettings({ trials: 20, tolerancePercent });
  const behind = { filter: { kind: 'none' }, sampleRateHz: 1e6 } as const;

  it('all of them in an ideal ladder: 6 dB a bit', () => {
    const { byBits } = sinadAgainstBits(definition, ladderWith(), settings(0), behind);
    expect(byBits.map(({ bits }) => bits)).toEqual(Array.from({ length: 16 }, (_, i) => i + 1));
    const first = byBits[5].outputDb as number;
    const last = byBits[15].outputDb as number;
    expect((last - first) / 10).toBeGreaterThan(5.7);
    expect((last - first) / 10).toBeLessThan(6.3);
  });

  it('few of them where resistors are wide', () => {
    const wide = sinadAgainstBits(definition, ladderWith(), settings(5), behind);
    const narrow = sinadAgainstBits(definition, ladderWith(), settings(0.1), behind);
    expect(wide.enough as number).toBeLessThan(narrow.enough as number);
    expect(wide.enough as number).toBeLessThan(11);
    const best = Math.max(...wide.byBits.map(({ outputDb }) => outputDb as number));
    const { outputDb } = wide.byBits[(wide.enough as number) - 1];
    expect(outputDb as number).toBeGreaterThanOrEqual(best - 1);
  });

  it('a filter takes harmonics off, the codes’ own SINAD stays', () => {
    const open = sinadAgainstBits(definition, ladderWith(), settings(1), behind).byBits[3];
    const filtered = sinadAgainstBits(definition, ladderWith(), settings(1), {
      filter: { kind: 'butterworth', cutoffHz: 15_000 },
      sampleRateHz: 1e6,
    }).byBits[3];
    expect(filtered.codesDb).toBe(open.codesDb);
    expect(filtered.outputDb as number).toBeGreaterThan((open.outputDb as number) + 3);
  });
});
