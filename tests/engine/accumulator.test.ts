import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { transformOf } from '../../shared/dft/index.ts';
import {
  accumulatorProblems,
  analyseAccumulator,
  outputHz,
  resolutionHz,
  strongestByColumn,
  strongestLines,
  type Accumulator,
} from '../../shared/playback/index.ts';
import { holds, noise } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

/** The samples of one round as §5 has them, `index acc >> (M−p)`, until the accumulator is back at 0. */
function runOnce(values: Float64Array, { accumulatorBits, stepWord }: Accumulator): number[] {
  const shift = accumulatorBits - Math.log2(values.length);
  const output: number[] = [];
  let phase = 0;
  do {
    output.push(values[phase >> shift]);
    phase = (phase + stepWord) & (2 ** accumulatorBits - 1);
  } while (phase !== 0);
  return output;
}

/** One-sided amplitudes of one round, from the samples as they come out. */
function amplitudesByRunning(values: Float64Array, accumulator: Accumulator): Float64Array {
  const output = runOnce(values, accumulator);
  const period = output.length;
  const data = new Float64Array(2 * period);
  const out = new Float64Array(2 * period);
  for (let n = 0; n < period; n += 1) data[2 * n] = output[n];
  transformOf(period).forward(out, data);
  return Float64Array.from({ length: period / 2 + 1 }, (_, k) => {
    const size = Math.hypot(out[2 * k], out[2 * k + 1]) / period;
    return k === 0 || 2 * k === period ? size : 2 * size;
  });
}

const sineValues = (length: number, bits = 16) => buildTable(waveOf({ table: { length, bits } })).values;

describe('lines of a phase accumulator', () => {
  /** Every step word of these widths, and sampled ones of wider accumulators. */
  const cases = [
    [2, 4, 1],
    [4, 6, 1],
    [8, 7, 1],
    [64, 6, 1],
    [16, 10, 37],
    [256, 12, 211],
  ] as const;

  it.each(cases)(
    'of %i entries and %i bits are those of the samples it puts out',
    (length, width, stride) => {
      const values = noise(length, length);
      for (let stepWord = 1; stepWord < 2 ** width; stepWord += stride) {
        const accumulator = { accumulatorBits: width, stepWord };
        const wanted = amplitudesByRunning(values, accumulator);
        const { period, bins, amplitudes, unlistedAmplitude } = strongestLines(values, accumulator, 65_536);
        expect({ period, listed: bins.length, unlistedAmplitude }).toEqual({
          period: 2 * (wanted.length - 1),
          listed: wanted.length - 1,
          unlistedAmplitude: 0,
        });
        const off = amplitudes.findIndex((amplitude, i) => Math.abs(amplitude - wanted[bins[i]]) > 1e-12);
        expect(off, `step word ${stepWord}`).toBe(-1);
        expect(Array.from(bins)).toEqual(Array.from({ length: bins.length }, (_, i) => i + 1));
      }
    },
  );

  it('are figured as §5 says: carrier, worst other and SNR', () => {
    holds(
      fc.property(
        fc.integer({ min: 1, max: 7 }),
        fc.integer({ min: 0, max: 6 }),
        fc.nat(),
        fc.nat(1000),
        (indexBits, moreBits, step, seed) => {
          const accumulatorBits = indexBits + moreBits;
          const accumulator = { accumulatorBits, stepWord: 1 + (step % (2 ** accumulatorBits - 1)) };
          const values = noise(2 ** indexBits, seed);
          const figures = analyseAccumulator(values, accumulator);
          const amplitudes = amplitudesByRunning(values, accumulator);
          const power = (k: number) => amplitudes[k] ** 2 / (k === amplitudes.length - 1 ? 1 : 2);
          const byStrength = Array.from(amplitudes.keys())
            .slice(1)
            .sort((a, b) => amplitudes[b] - amplitudes[a]);
          const [carrier, other] = byStrength;
          const rest = byStrength.slice(1).reduce((sum, k) => sum + power(k), 0);
          expect(figures.period).toBe(2 * (amplitudes.length - 1));
          expect(figures.carrierBin).toBe(carrier);
          expect(figures.carrierAmplitude).toBeCloseTo(amplitudes[carrier], 12);
          if (rest <= 1e-20) return;
          expect(figures.worstOtherBin).toBe(other);
          expect(figures.worstOtherDbc).toBeCloseTo(
            20 * Math.log10(amplitudes[other] / amplitudes[carrier]),
            9,
          );
          expect(figures.snrDb).toBeCloseTo(10 * Math.log10(power(carrier) / rest), 9);
        },
      ),
      300,
    );
  });

  it('are the strongest ones where there are too many to list, and none stronger is left out', () => {
    const values = sineValues(64, 8);
    for (const [accumulatorBits, stepWord] of [
      [14, 1],
      [14, 129],
      [15, 8191],
    ]) {
      const accumulator = { accumulatorBits, stepWord };
      const wanted = amplitudesByRunning(values, accumulator);
      for (const limit of [1, 10, 500]) {
        const { bins, amplitudes, unlistedAmplitude } = strongestLines(values, accumulator, limit);
        expect(bins.length).toBeGreaterThan(0.5 * limit);
        expect(bins.length).toBeLessThanOrEqual(limit);
        amplitudes.forEach((amplitude, i) => expect(amplitude).toBeCloseTo(wanted[bins[i]], 12));
        const listed = new Set(bins);
        const left = wanted.filter((_, k) => k > 0 && !listed.has(k));
        expect(Math.max(...left)).toBeLessThanOrEqual(unlistedAmplitude + 1e-15);
        expect(Math.min(...amplitudes)).toBeGreaterThanOrEqual(unlistedAmplitude - 1e-15);
      }
    }
  });

  it('stand in the column of their bin for a plot', () => {
    const lines = strongestLines(sineValues(16), { accumulatorBits: 8, stepWord: 5 }, 1000);
    const columns = strongestByColumn(lines, 10);
    const wanted = new Float64Array(10).fill(NaN);
    lines.bins.forEach((bin, i) => {
      const column = Math.min(9, Math.floor((bin / 128) * 10));
      wanted[column] = Math.max(Number.isNaN(wanted[column]) ? 0 : wanted[column], lines.amplitudes[i]);
    });
    expect(columns).toEqual(wanted);
  });
});

describe('an accumulator of 48 bits', () => {
  it('has its bins in whole numbers, as exact arithmetic has them', () => {
    const values = noise(256, 3);
    holds(
      fc.property(fc.bigInt({ min: 1n, max: 2n ** 48n - 1n }), (step) => {
        const accumulator = { accumulatorBits: 48, stepWord: Number(step) };
        const { period, bins, tableLines } = strongestLines(values, accumulator, 2000);
        const g = step & -step;
        const exactPeriod = 2n ** 48n / g;
        expect(period).toBe(Number(exactPeriod));
        const off = tableLines.findIndex((k, i) => {
          const bin = (BigInt(k) * (step / g)) % exactPeriod;
          return bins[i] !== Number(bin > exactPeriod / 2n ? exactPeriod - bin : bin);
        });
        expect(off).toBe(-1);
      }),
      50,
    );
  });

  it('keeps them where a pure line has nothing but images, far beyond 2^28', () => {
    const length = 65_536;
    const values = Float64Array.from({ length }, (_, k) => Math.cos((2 * Math.PI * (k + 0.5)) / length));
    // Its own rounding noise is −300 dB: only the carrier's images are above it.
    const step = 2n ** 47n + 12_345n;
    const { bins, tableLines } = strongestLines(
      values,
      { accumulatorBits: 48, stepWord: Number(step) },
      10_000,
    );
    expect(Math.max(...tableLines)).toBeGreaterThan(2 ** 28);
    const off = tableLines.findIndex((k, i) => {
      const bin = (BigInt(k) * step) % 2n ** 48n;
      return bins[i] !== Number(bin > 2n ** 47n ? 2n ** 48n - bin : bin);
    });
    expect(off).toBe(-1);
  });

  it('gives the levels of any other long one', () => {
    const values = sineValues(256);
    const long = analyseAccumulator(values, { accumulatorBits: 48, stepWord: 2 ** 40 + 1 });
    const shorter = analyseAccumulator(values, { accumulatorBits: 30, stepWord: 2 ** 22 + 1 });
    expect(long.worstOtherDbc).toBeCloseTo(Number(shorter.worstOtherDbc), 6);
    expect(long.snrDb).toBeCloseTo(Number(shorter.snrDb), 6);
  });

  it('keeps the SNR of a long table where carrier and variance all but cancel', () => {
    // Of a pure sine held over long repeats only the hold's images are left: 1/h² − 1 with h = sin(x)/x, x = π/N.
    const length = 4096;
    const values = Float64Array.from({ length }, (_, k) => Math.sin((2 * Math.PI * k) / length));
    const { snrDb } = analyseAccumulator(values, { accumulatorBits: 48, stepWord: 1 });
    const x = Math.PI / length;
    // sin²x/x² = 1 − x²/3 + 2x⁴/45 − …
    const lost = x ** 2 / 3 - (2 * x ** 4) / 45;
    expect(snrDb).toBeCloseTo(10 * Math.log10((1 - lost) / lost), 7);
  });
});

describe('frequencies', () => {
  it('resolution and output are fs/2^M and W·fs/2^M', () => {
    expect(resolutionHz(32, 31_250)).toBe(31_250 / 2 ** 32);
    expect(outputHz({ accumulatorBits: 32, stepWord: 60_473_139 }, 31_250)).toBeCloseTo(440, 5);
  });
});

describe('a table without lines', () => {
  it('has no carrier and no figures', () => {
    const still = analyseAccumulator(new Float64Array(16).fill(0.25), { accumulatorBits: 20, stepWord: 77 });
    expect(still).toMatchObject({ period: 2 ** 20, carrierBin: null, worstOtherDbc: null, snrDb: null });
  });

  it('and a pure line that nothing cuts short has a carrier alone', () => {
    const values = Float64Array.from({ length: 16 }, (_, k) => Math.sin((2 * Math.PI * k) / 16));
    const pure = analyseAccumulator(values, { accumulatorBits: 20, stepWord: 2 ** 16 });
    expect(pure).toMatchObject({ period: 16, carrierBin: 1, worstOtherBin: null, snrDb: null });
  });
});

describe('what does not fit is refused', () => {
  it.each([
    [100, { accumulatorBits: 16, stepWord: 1 }, 'table.length', '100'],
    [256, { accumulatorBits: 7, stepWord: 1 }, 'accumulatorBits', '7'],
    [256, { accumulatorBits: 49, stepWord: 1 }, 'accumulatorBits', '49'],
    [256, { accumulatorBits: 16.5, stepWord: 1 }, 'accumulatorBits', '16.5'],
    [256, { accumulatorBits: 16, stepWord: 0 }, 'stepWord', '0'],
    [256, { accumulatorBits: 16, stepWord: 65_536 }, 'stepWord', '65536'],
    [256, { accumulatorBits: 16, stepWord: 1.5 }, 'stepWord', '1.5'],
    [256, { accumulatorBits: 16, stepWord: NaN }, 'stepWord', 'NaN'],
  ])('%i entries, %o', (length, accumulator, path, value) => {
    expect(accumulatorProblems(length, accumulator)).toMatchObject([{ path, value }]);
    expect(() => analyseAccumulator(new Float64Array(length), accumulator)).toThrow(Refusal);
    expect(() => strongestLines(new Float64Array(length), accumulator, 10)).toThrow(Refusal);
  });
});
