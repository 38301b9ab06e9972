import { describe, expect, test } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { LimitSet, VettingLimits } from '../../shared/contract/index.ts';
import { checkLimits, limitSetsFor } from '../../shared/vetting/index.ts';

const sine = { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] };

function candidateOf(source: unknown = sine, table: object = {}, level: object = {}) {
  const { definition, report } = buildTable({
    schema: 1,
    name: 'Buoy tone',
    source,
    level,
    table: { length: 256, bits: 8, ...table },
  });
  return { length: definition.table.length, bits: definition.table.bits, report };
}

const passes = (limits: VettingLimits, candidate = candidateOf()) =>
  checkLimits([{ tag: null, limits }], candidate).map(({ passed }) => passed);

describe('limits', () => {
  test('hold a figure on the bound and fail it beyond, each on its own side', () => {
    const candidate = candidateOf();
    const { snrDb, unwantedDb, peakErrorLsb, tableBytes, mean, worstToggle } = candidate.report;
    const bounds = [
      ['minSnrDb', Number(snrDb), 1],
      ['maxUnwantedDb', Number(unwantedDb), -1],
      ['maxPeakErrorLsb', peakErrorLsb, -1],
      ['maxTableBytes', tableBytes, -1],
      ['maxMean', Math.abs(mean), -1],
      ['maxClipped', 0, -1],
      ['maxWorstToggleBits', worstToggle.bits, -1],
    ] as const;
    for (const [limit, figure, beyond] of bounds) {
      expect(passes({ [limit]: figure }, candidate), limit).toEqual([true]);
      expect(passes({ [limit]: figure + beyond }, candidate), limit).toEqual([false]);
    }
    expect(passes({ lengths: [100, 256], bits: [6, 10] }, candidate)).toEqual([true, false]);
  });

  test('count clipped samples and clipped codes together', () => {
    const loud = candidateOf(
      { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 2, phaseDeg: 0 }] },
      { scale: 'mid-tread' },
      { normalise: 'none' },
    );
    const [outcome] = checkLimits([{ tag: null, limits: { maxClipped: 0 } }], loud);
    expect(outcome?.measured).toBe(loud.report.clippedSamples + loud.report.clippedCodes);
    expect(outcome?.passed).toBe(false);
    expect(loud.report.clippedSamples).toBeGreaterThan(0);
    expect(loud.report.clippedCodes).toBeGreaterThan(0);
  });

  test('let a table without error pass limits on noise, and fail where a figure does not exist otherwise', () => {
    const exact = candidateOf({
      kind: 'points',
      interpolation: 'step',
      points: [
        { x: 0, y: 1 },
        { x: 0.5, y: -1 },
      ],
    });
    expect(exact.report).toMatchObject({ exact: true, snrDb: null });
    expect(passes({ minSnrDb: 200, maxUnwantedDb: -200 }, exact)).toEqual([true, true]);

    const { report, ...size } = candidateOf();
    const without = { ...size, report: { ...report, snrDb: null } };
    expect(passes({ minSnrDb: 0 }, without)).toEqual([false]);
  });

  test('take a tie for half an LSB, although its snap may lie a little beyond', () => {
    const { report, ...size } = candidateOf();
    const withPeak = (peakErrorLsb: number) => ({ ...size, report: { ...report, peakErrorLsb } });
    expect(passes({ maxPeakErrorLsb: 0.5 }, withPeak(0.5 + 2 ** -25))).toEqual([true]);
    expect(passes({ maxPeakErrorLsb: 0.5 }, withPeak(0.5 + 2 ** -22))).toEqual([false]);
  });

  test('of all tables come first, then those of its tags; those of other tags do not count', () => {
    const set = (id: number, tag: string | null): LimitSet => ({
      id,
      tag,
      limits: { bits: [8] },
      version: 1,
    });
    const sets = [set(1, 'lamp'), set(2, 'alarm'), set(3, null), set(4, 'test')];
    expect(limitSetsFor(sets, ['alarm', 'lamp']).map(({ id }) => id)).toEqual([3, 2, 1]);
    expect(limitSetsFor(sets, []).map(({ id }) => id)).toEqual([3]);
  });
});
