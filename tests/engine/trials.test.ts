import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { describe, expect, it } from 'vitest';
import { analyseTable } from '../../shared/analysis/index.ts';
import { buildTable } from '../../shared/build-table.ts';
import { parseTrialSettings, type Ladder, type TrialSettingsInput } from '../../shared/contract/index.ts';
import {
  drawsOf,
  histogramOf,
  linearityOf,
  nearestRank,
  Trials,
  voltsOf,
  type Resistors,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from './support/ladders.ts';
import { waveOf } from './support/waves.ts';

const settingsOf = (input: Partial<TrialSettingsInput> = {}) =>
  parseTrialSettings({ tolerancePercent: 1, trials: 200, ...input });
const built = (ladder: Ladder, { rungs, series, terminator }: Resistors): Ladder => ({
  ...ladder,
  rungs: Array.from(rungs),
  series: Array.from(series),
  terminator,
});
const ladder = ladderWith({ bits: 6, rHigh: 40, rLow: 20, vLow: -1, load: 50_000 });

describe('draws', () => {
  it('go rungs, series, terminator, one number each where uniform', () => {
    const generator = xoroshiro128plus(7);
    const factor = () => 1 + 0.05 * (2 * (((generator.next() >>> 0) + 0.5) / 2 ** 32) - 1);
    const draws = drawsOf(ladderWith({ bits: 3, R: 100 }), settingsOf({ seed: 7, tolerancePercent: 5 }));
    for (let build = 0; build < 3; build += 1) {
      const { rungs, series, terminator } = draws.next();
      for (const ohms of rungs) expect(ohms).toBe(200 * factor());
      for (const ohms of series) expect(ohms).toBe(100 * factor());
      expect(terminator).toBe(200 * factor());
    }
  });

  it('keep named resistors as their middle', () => {
    const named = { rungs: [210, 190], series: [103], terminator: 222 };
    const { rungs, series, terminator } = drawsOf(
      ladderWith({ bits: 2, R: 100, ...named }),
      settingsOf({ tolerancePercent: 0 }),
    ).next();
    expect({ rungs: Array.from(rungs), series: Array.from(series), terminator }).toEqual(named);
  });

  it.each([
    ['uniform', 1 / Math.sqrt(3)],
    ['normal', 1 / 3],
  ] as const)('%s: the deviation is %d of the tolerance', (distribution, deviation) => {
    const draws = drawsOf(ladderWith({ bits: 16, R: 1 }), settingsOf({ distribution, tolerancePercent: 10 }));
    const values = Array.from({ length: 2000 }, () =>
      Array.from(draws.next().rungs, (r) => r / 2 - 1),
    ).flat();
    const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
    const rms = Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
    // 32,000 values: five standard errors.
    expect(Math.abs(mean)).toBeLessThan((5 * 0.1 * deviation) / Math.sqrt(values.length));
    expect(rms / (0.1 * deviation)).toBeGreaterThan(0.98);
    expect(rms / (0.1 * deviation)).toBeLessThan(1.02);
    const farthest = Math.max(...values.map(Math.abs));
    if (distribution === 'uniform') expect(farthest).toBeLessThanOrEqual(0.1);
    else expect(farthest).toBeGreaterThan(0.1);
  });
});

describe('trials', () => {
  const table = buildTable(waveOf({ table: { bits: 6, length: 100 } }));
  const played = { codes: table.codes, cycle: table.cycle, range: 'bipolar' as const };

  it.each(['uniform', 'normal'] as const)('have the figures of each ladder by itself: %s', (distribution) => {
    const settings = settingsOf({ distribution, tolerancePercent: 8, trials: 61 });
    const trials = new Trials(ladder, settings, played);
    trials.run(1000);
    const { maxInl, maxDnl, monotonic, sinadDb, unwantedDb } = trials.figures();
    const draws = drawsOf(ladder, settings);
    expect(new Set(monotonic)).toEqual(new Set([0, 1]));
    for (let trial = 0; trial < 61; trial += 1) {
      const volts = voltsOf(built(ladder, draws.next()));
      const linearity = linearityOf(volts);
      const { report } = analyseTable(
        { cycle: table.cycle, clippedSamples: 0 },
        { codes: table.codes, clippedCodes: 0 },
        { ...table.definition.table, levels: Array.from(volts) },
      );
      expect(maxInl[trial]).toBeCloseTo(linearity.maxInl, 10);
      expect(maxDnl[trial]).toBeCloseTo(linearity.maxDnl, 10);
      expect(monotonic[trial]).toBe(linearity.monotonic ? 1 : 0);
      expect(sinadDb[trial]).toBeCloseTo(report.sinadDb as number, 8);
      expect(unwantedDb[trial]).toBeCloseTo(report.unwantedDb as number, 8);
    }
  });

  it('run in parts end as they do at once', () => {
    const settings = settingsOf({ trials: 101, seed: 3 });
    const atOnce = new Trials(ladder, settings, played);
    atOnce.run(101);
    const inParts = new Trials(ladder, settings, played);
    const seen = [];
    while (!inParts.isDone) seen.push(inParts.run(7));
    expect(seen[0]).toBe(8);
    expect(seen.at(-1)).toBe(101);
    expect(inParts.summary()).toEqual(atOnce.summary());
    expect(inParts.figures()).toEqual(atOnce.figures());
  });

  it('tell what is there when they are stopped', () => {
    const trials = new Trials(ladder, settingsOf());
    expect(trials.summary()).toMatchObject({ done: 0, monotonicShare: null, maxDnl: { p50: null } });
    trials.run(50);
    const { maxDnl, monotonic } = trials.figures();
    const sorted = Array.from(maxDnl).sort((a, b) => a - b);
    expect(trials.summary()).toMatchObject({
      done: 50,
      trials: 200,
      monotonicShare: monotonic.reduce((sum, is) => sum + is, 0) / 50,
      maxDnl: { p50: sorted[24], p95: sorted[47], p99: sorted[49] },
      sinadDb: { p50: null, p5: null, p1: null },
    });
  });

  it('without tolerance are the ladder itself each time', () => {
    const trials = new Trials(ladder, settingsOf({ tolerancePercent: 0, trials: 4 }));
    trials.run(4);
    const { maxDnl } = linearityOf(voltsOf(ladder));
    for (const value of trials.figures().maxDnl) expect(value).toBeCloseTo(maxDnl, 12);
  });

  it('have no unwanted line where the codes are exact', () => {
    const ramp = buildTable(
      waveOf({
        source: { kind: 'samples', resampling: 'hold', values: [0, 1, 2, 3] },
        level: { normalise: 'span' },
        table: { bits: 2, length: 4 },
      }),
    );
    const exact = { codes: ramp.codes, cycle: ramp.cycle, range: 'bipolar' as const };
    const trials = new Trials(ladderWith({ bits: 2 }), settingsOf({ tolerancePercent: 0, trials: 3 }), exact);
    trials.run(3);
    expect(ramp.report.unwantedDb).toBeNull();
    expect(Array.from(trials.figures().unwantedDb)).toEqual([NaN, NaN, NaN]);
    expect(trials.summary().unwantedDb).toEqual({ p50: null, p95: null, p99: null });
  });

  it.each([
    [{ tolerancePercent: 100 }, /^tolerancePercent: 100 is not allowed/],
    [
      { tolerancePercent: 50, distribution: 'normal' },
      /^tolerancePercent: 50 is not allowed; allowed: at most 44/,
    ],
    [{ tolerancePercent: 1, trials: 0 }, /^trials: 0 is not allowed; allowed: a whole number from 1 to/],
    [{ tolerancePercent: 1, seed: -1 }, /^seed: -1/],
  ])('refuse %j', (input, line) => {
    expect(() => parseTrialSettings(input)).toThrow(line);
  });
});

describe('percentiles by nearest rank', () => {
  it('are values of the list', () => {
    const sorted = Float64Array.from([15, 20, 35, 40, 50]);
    // A worked example of the definition: ranks ⌈0.05·5⌉ = 1, ⌈0.3·5⌉ = 2, ⌈0.4·5⌉ = 2, ⌈0.5·5⌉ = 3, 5.
    expect([0.05, 0.3, 0.4, 0.5, 1].map((share) => nearestRank(sorted, share))).toEqual([15, 20, 20, 35, 50]);
    expect(nearestRank(new Float64Array(), 0.5)).toBeNull();
  });

  it('a histogram holds every value that exists', () => {
    const values = Float64Array.from([0, 0.1, 0.5, 0.99, 1, NaN]);
    expect(histogramOf(values, 2)).toEqual({ from: 0, to: 1, counts: Uint32Array.from([2, 3]) });
    expect(histogramOf(Float64Array.from([3, 3]), 4).counts).toEqual(Uint32Array.from([2, 0, 0, 0]));
    expect(histogramOf(new Float64Array(), 2).counts).toEqual(new Uint32Array(2));
  });
});
