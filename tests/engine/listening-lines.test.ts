import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  curveLines,
  gridSizeFor,
  readRound,
  rmsOfLines,
  roundOnGrid,
  staircaseLines,
  stageResponse,
  throughResponse,
  type RoundLines,
} from '../../shared/listening/index.ts';
import { outputLines, stageGain, type StageParts } from '../../shared/output-stage/index.ts';
import { added, furthest, meanOf, decibels } from './support/listening.ts';
import { holds, noise } from './support/seeded.ts';

const lengths = fc.integer({ min: 2, max: 300 });
const seeds = fc.integer({ min: 1, max: 1e6 });
describe('lines of a curve', () => {
  it('with every one kept pass through the entries, less their mean', () => {
    holds(
      fc.property(lengths, seeds, (length, seed) => {
        const values = noise(length, seed);
        const mean = meanOf(values);
        const lines = curveLines(values, length);
        expect(lines.re.length - 1).toBe(Math.floor(length / 2));
        for (let k = 0; k < length; k += 1) {
          expect(Math.abs(added(lines, k / length) - (values[k] - mean))).toBeLessThan(1e-12);
        }
      }),
      40,
    );
  });
});

describe('lines of a staircase', () => {
  /** `2·∫ staircase·e^(−2πimφ) dφ`, tread by tread. */
  function byTreads(values: Float64Array, highest: number): RoundLines {
    const size = values.length;
    const lines = { re: new Float64Array(highest + 1), im: new Float64Array(highest + 1) };
    for (let m = 1; m <= highest; m += 1) {
      for (let k = 0; k < size; k += 1) {
        const from = (2 * Math.PI * ((m * k) % size)) / size;
        const to = (2 * Math.PI * ((m * (k + 1)) % size)) / size;
        lines.re[m] += (values[k] * (Math.sin(to) - Math.sin(from))) / (Math.PI * m);
        lines.im[m] += (values[k] * (Math.cos(to) - Math.cos(from))) / (Math.PI * m);
      }
    }
    return lines;
  }

  it('are the Fourier integral of its treads, images, N/2 and phases included', () => {
    holds(
      fc.property(lengths, seeds, (length, seed) => {
        const values = noise(length, seed);
        expect(
          furthest(staircaseLines(values, 3 * length + 1), byTreads(values, 3 * length + 1)),
        ).toBeLessThan(1e-13);
      }),
      40,
    );
  });

  it('have the amplitudes of the output stage’s lines, and none at the sample rate', () => {
    for (const length of [2, 3, 8, 255, 256]) {
      const values = noise(length, length);
      const { re, im } = staircaseLines(values, 4 * length);
      outputLines(values, 1000, 4 * length).forEach(({ multiple, heldAmplitude }) => {
        expect(Math.hypot(re[multiple], im[multiple])).toBeCloseTo(heldAmplitude, 13);
      });
      expect([re[length], im[length], re[2 * length], im[2 * length]]).toEqual([0, 0, 0, 0]);
    }
  });

  it('hold all of its power (Parseval)', () => {
    holds(
      fc.property(lengths, seeds, (length, seed) => {
        const values = noise(length, seed);
        const variance = values.reduce((sum, value) => sum + (value - meanOf(values)) ** 2, 0) / length;
        const rms = rmsOfLines(staircaseLines(values, 2000 * length));
        // Beyond H each line is at most 1/(πm) of all steps together: 1/(2000·π²) of the power at most for the worst.
        expect(rms ** 2 / variance).toBeGreaterThan(1 - 3e-4);
        expect(rms ** 2 / variance).toBeLessThan(1 + 1e-12);
      }),
      10,
    );
  });

  it('are linear, and entries one place later turn line m by m/N', () => {
    holds(
      fc.property(lengths, seeds, fc.double({ min: -2, max: 2, noNaN: true }), (length, seed, factor) => {
        const a = noise(length, seed);
        const b = noise(length, seed + 1);
        const highest = 2 * length + 1;
        const [linesA, linesB] = [staircaseLines(a, highest), staircaseLines(b, highest)];
        const sum = {
          re: linesA.re.map((value, m) => value + factor * linesB.re[m]),
          im: linesA.im.map((value, m) => value + factor * linesB.im[m]),
        };
        expect(
          furthest(
            staircaseLines(
              a.map((value, k) => value + factor * b[k]),
              highest,
            ),
            sum,
          ),
        ).toBeLessThan(1e-13);
        const later = staircaseLines(
          a.map((_, k) => a[(k + length - 1) % length]),
          highest,
        );
        const delay = (m: number, out: Float64Array) => {
          out[0] = Math.cos((2 * Math.PI * m) / length);
          out[1] = -Math.sin((2 * Math.PI * m) / length);
        };
        expect(furthest(later, throughResponse(linesA, 1, delay))).toBeLessThan(1e-13);
      }),
      40,
    );
  });
});

describe('a stage', () => {
  const stages: StageParts[] = [
    { outputOhms: 0, capacitanceF: 0, filter: { kind: 'none' } },
    { outputOhms: 10_000, capacitanceF: 1e-9, filter: { kind: 'none' } },
    {
      outputOhms: 10_000,
      capacitanceF: 100e-12,
      opAmp: { slewRateVPerS: 0.5e6, gainBandwidthHz: 1e6 },
      filter: { kind: 'rc', cutoffHz: 3400 },
    },
    { outputOhms: 2200, capacitanceF: 0, filter: { kind: 'butterworth', cutoffHz: 8000 } },
  ];

  it('has the magnitude that the output stage tells, and turns as it must', () => {
    const out = new Float64Array(2);
    for (const stage of stages) {
      const response = stageResponse(stage);
      for (const hz of [0, 0.1, 50, 3400, 8000, 19_999, 1e6]) {
        response(hz, out);
        const gain = stageGain(stage, hz);
        expect(Math.abs(Math.hypot(out[0], out[1]) / gain - 1)).toBeLessThan(1e-12);
      }
    }
    // An RC turns by 45° at its cut-off, a second-order Butterworth by 90°.
    stageResponse({ outputOhms: 0, capacitanceF: 0, filter: { kind: 'rc', cutoffHz: 1000 } })(1000, out);
    expect((Math.atan2(out[1], out[0]) * 180) / Math.PI).toBeCloseTo(-45, 10);
    stageResponse({ outputOhms: 0, capacitanceF: 0, filter: { kind: 'butterworth', cutoffHz: 1000 } })(
      1000,
      out,
    );
    expect((Math.atan2(out[1], out[0]) * 180) / Math.PI).toBeCloseTo(-90, 10);
  });

  it('of an RC does to a staircase what charging does from tread to tread', () => {
    // Exact between edges: v moves to the entry by e^(−t/RC); in a loop it begins where it ends.
    const values = noise(9, 5);
    const roundHz = 100;
    const ohms = 10_000;
    const farads = 47e-9;
    const stage: StageParts = { outputOhms: ohms, capacitanceF: farads, filter: { kind: 'none' } };
    const highest = 20_000;
    const lines = throughResponse(staircaseLines(values, highest), roundHz, stageResponse(stage));
    const left = Math.exp(-1 / (values.length * roundHz * ohms * farads));
    let level = 0;
    for (let turn = 0; turn < 50; turn += 1)
      for (const value of values) level = value + (level - value) * left;
    const mean = meanOf(values);
    for (let k = 0; k < values.length; k += 1) {
      // In the middle of a tread, where the series is at its best: at an edge it goes as 1/m².
      const middle = values[k] + (level - values[k]) * Math.sqrt(left);
      expect(added(lines, (k + 0.5) / values.length)).toBeCloseTo(middle - mean, 7);
      level = values[k] + (level - values[k]) * left;
    }
  });
});

describe('a round on a grid', () => {
  it('is the sum of its partials, −120 dB beside the strongest, wherever it is read', () => {
    for (const [length, highest] of [
      [2, 24],
      [7, 100],
      [64, 54],
      [256, 511],
    ]) {
      const lines = staircaseLines(noise(length, length), highest);
      const { grid, size } = roundOnGrid(lines);
      expect(size).toBe(gridSizeFor(highest));
      let worst = 0;
      const places = noise(400, 3);
      for (const place of places) {
        const phase = (place + 1) / 2;
        worst = Math.max(worst, Math.abs(readRound(grid, size, phase) - added(lines, phase)));
      }
      const strongest = Math.max(...lines.re.map((re, m) => Math.hypot(re, lines.im[m])));
      expect(decibels(worst / strongest), `${length} entries`).toBeLessThan(-120);
    }
  });

  it('of the highest line alone is off by −120 dB at most', () => {
    for (const highest of [4, 30, 256]) {
      const lines = { re: new Float64Array(highest + 1), im: new Float64Array(highest + 1) };
      lines.re[highest] = 0.6;
      lines.im[highest] = 0.8;
      const { grid, size } = roundOnGrid(lines);
      let worst = 0;
      for (let i = 0; i < 5000; i += 1) {
        const phase = (i * 0.618_033_988_7) % 1;
        worst = Math.max(worst, Math.abs(readRound(grid, size, phase) - added(lines, phase)));
      }
      expect(decibels(worst)).toBeLessThan(-120);
    }
  });
});
