import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import type { Report } from '../../shared/contract/index.ts';
import { valuesOf, waveOf } from './support/waves.ts';

// Figures of signals whose lines are known, in codes fine enough to hold them.

const length = 64;
/** Mid-tread codes of 16 bits hold any multiple of 2⁻¹⁵ without an error. */
const exactly = { bits: 16, scale: 'mid-tread' as const };

function sinesAt(lines: readonly (readonly [bin: number, amplitude: number])[], size = length): Report {
  const values = Float64Array.from({ length: size }, (_, k) =>
    lines.reduce((sum, [bin, a]) => sum + a * Math.cos((2 * Math.PI * ((bin * k) % size)) / size), 0),
  );
  return buildTable(valuesOf(values, exactly)).report;
}

describe('SINAD, ENOB, THD and SFDR', () => {
  // 16-bit rounding leaves about −95 dB beside lines of −20 to −50 dB: four digits of each figure stand.
  it('set the strongest line against the others', () => {
    const report = sinesAt([
      [3, 0.8],
      [6, 0.008],
      [9, 0.004],
      [11, 0.02],
    ]);
    const rest = 0.008 ** 2 + 0.004 ** 2 + 0.02 ** 2;
    const sinadDb = 10 * Math.log10(0.8 ** 2 / rest);
    expect(report.sinadDb).toBeCloseTo(sinadDb, 2);
    expect(report.enobBits).toBeCloseTo((sinadDb - 1.76 - 20 * Math.log10(0.8)) / 6.02, 3);
    expect(report.thdPercent).toBeCloseTo((100 * Math.hypot(0.008, 0.004)) / 0.8, 2);
    expect(report.thdDb).toBeCloseTo(20 * Math.log10(Math.hypot(0.008, 0.004) / 0.8), 2);
    expect(report.sfdrDb).toBeCloseTo(20 * Math.log10(0.8 / 0.02), 2);
  });

  it('count harmonics 2…10 below N/2 only', () => {
    // Carrier 3: harmonic 10 is bin 30, 11 is bin 33, beyond N/2 = 32; carrier 1 has its tenth at 10, the eleventh at 11.
    expect(
      sinesAt([
        [3, 0.8],
        [30, 0.01],
      ]).thdPercent,
    ).toBeCloseTo(1.25, 2);
    expect(
      sinesAt([
        [1, 0.8],
        [10, 0.01],
      ]).thdPercent,
    ).toBeCloseTo(1.25, 2);
    expect(
      sinesAt([
        [1, 0.8],
        [11, 0.01],
      ]).thdPercent,
    ).toBeLessThan(0.05);
    // Carrier 16: its second harmonic is N/2 itself, which is not below.
    expect(
      sinesAt([
        [16, 0.8],
        [32, 0.01],
      ]).thdDb,
    ).toBeNull();
  });

  it('give the line at N/2 its whole power', () => {
    expect(
      sinesAt([
        [5, 0.5],
        [32, 0.05],
      ]).sinadDb,
    ).toBeCloseTo(10 * Math.log10(0.5 ** 2 / 2 / 0.05 ** 2), 2);
  });

  it('leave DC out', () => {
    const report = sinesAt([
      [0, 0.4],
      [5, 0.5],
      [7, 0.01],
    ]);
    expect(report.sinadDb).toBeCloseTo(20 * Math.log10(50), 2);
    expect(report.sfdrDb).toBeCloseTo(20 * Math.log10(50), 2);
  });

  it('a carrier at N/2 has no SINAD, but the rest below it is told', () => {
    const report = sinesAt([
      [32, 0.5],
      [5, 0.05],
    ]);
    expect(report).toMatchObject({ sinadDb: null, enobBits: null, thdDb: null, thdPercent: null });
    expect(report.sfdrDb).toBeCloseTo(20, 2);
  });

  it('of equal lines the lowest is the carrier', () => {
    // An impulse train of period 4: bins 16 and (at N/2) 32; of period 8: bins 8, 16, 24 alike, and 32.
    const train = buildTable(
      valuesOf(
        Array.from({ length }, (_, k) => (k % 8 === 0 ? 1 : 0)),
        { ...exactly, length },
      ),
    );
    expect(train.spectrum.amplitudes[8]).toBeCloseTo(0.25, 4);
    // Harmonics 2 and 3 of bin 8 (bin 32 is N/2): √2 of the carrier; of bin 16 there would be none.
    expect(train.report.thdPercent).toBeCloseTo(100 * Math.SQRT2, 1);
  });

  it('ENOB is set against half the span where the range is unipolar', () => {
    const values = Array.from({ length }, (_, k) => 0.5 + 0.5 * Math.sin((2 * Math.PI * k) / length));
    const { report, spectrum } = buildTable(valuesOf(values, { range: 'unipolar', bits: 8 }));
    const belowFullDb = 20 * Math.log10(0.5 / spectrum.amplitudes[1]);
    expect(report.enobBits).toBeCloseTo((Number(report.sinadDb) - 1.76 + belowFullDb) / 6.02, 9);
    expect(Math.abs(belowFullDb)).toBeLessThan(0.01);
  });

  it('do not exist where there is no line, or no other', () => {
    const nothing = { sinadDb: null, enobBits: null, thdDb: null, thdPercent: null, sfdrDb: null };
    expect(sinesAt([[0, 0.5]])).toMatchObject({ ...nothing, snrDb: null, unwantedDb: null, exact: true });
    // ±½ in turns of four is a pure line: cos at 45°.
    expect(sinesAt([[16, 0.5]])).toMatchObject({ ...nothing, exact: true });
    expect(buildTable(valuesOf([1, -1])).report).toMatchObject(nothing);
  });

  it('a bin without a line is no carrier, however faint the lines are', () => {
    // Two steps of one code in 65,536 entries: lines of 9·10⁻¹⁰ at even bins, nothing at odd ones.
    const values = Array.from({ length: 65_536 }, (_, k) => (k % 32_768 === 0 ? 1 / 65_535 : 0));
    const { report, spectrum } = buildTable(valuesOf(values, { bits: 16, range: 'unipolar' }));
    expect(spectrum.amplitudes[1]).toBeLessThan(1e-15);
    expect(spectrum.amplitudes[2]).toBeGreaterThan(9e-10);
    // One line of 16,383 alike, and the line at N/2 of half the amplitude and so half a bin's power.
    expect(report.sinadDb).toBeCloseTo(-10 * Math.log10(16_382.5), 3);
    expect(report.sfdrDb).toBeCloseTo(0, 6);
  });
});

describe('SNR', () => {
  it('does not exist where the cycle has no variance that a double can hold', () => {
    const source = {
      kind: 'harmonics' as const,
      partials: [{ harmonic: 1, amplitude: 1e-200, phaseDeg: 0 }],
    };
    const { report } = buildTable(waveOf({ source, level: { normalise: 'none' }, table: { shaping: 1 } }));
    expect(report).toMatchObject({ snrDb: null, unwantedDb: null, exact: false });
    expect(report.usedCodes).toBe(2);
  });

  it('is the ratio of the variances, means removed', () => {
    const { cycle, values, report } = buildTable(
      waveOf({ level: { level: 0.37 }, table: { bits: 5, length: 77, rounding: 'down' } }),
    );
    const variance = (x: Float64Array) => {
      const mean = x.reduce((sum, value) => sum + value, 0) / x.length;
      return x.reduce((sum, value) => sum + (value - mean) ** 2, 0) / x.length;
    };
    const error = values.map((q, k) => q - cycle[k]);
    expect(report.snrDb).toBeCloseTo(10 * Math.log10(variance(cycle) / variance(error)), 9);
    expect(report.meanErrorLsb).toBeLessThan(-0.3);
  });
});
