import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { linesOf } from '../../shared/dft/index.ts';
import {
  parseDefinition,
  type DefinitionInput,
  type Point,
  type PointsSource,
} from '../../shared/contract/index.ts';
import { closedCurve, phasesOf, synthesise } from '../../shared/waveform/index.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;
type Interpolation = PointsSource['interpolation'];

const points: fc.Arbitrary<Point[]> = fc
  .uniqueArray(fc.integer({ min: 0, max: 999 }), { minLength: 3, maxLength: 20 })
  .chain((places) =>
    fc
      .array(fc.double({ min: -1, max: 1, noNaN: true }), {
        minLength: places.length,
        maxLength: places.length,
      })
      .map((ys) => [...places].sort((a, b) => a - b).map((place, i) => ({ x: place / 1000, y: ys[i] }))),
  );

const curveOf = (interpolation: Interpolation, list: Point[]) => closedCurve({ interpolation, points: list });

/** Value and derivatives on both sides of x₀ = points[at].x, by differences. */
function sidesAt(
  curve: (t: number) => number,
  x: number,
  h: number,
): { slopes: [number, number]; bends: [number, number] } {
  const f = (t: number) => curve((((x + t) % 1) + 1) % 1);
  // Differences of third order, exact for a cubic: one piece on each side.
  const slope = (s: number) => (-11 * f(0) + 18 * f(s) - 9 * f(2 * s) + 2 * f(3 * s)) / (6 * s);
  const bend = (s: number) => (2 * f(0) - 5 * f(s) + 4 * f(2 * s) - f(3 * s)) / (s * s);
  return { slopes: [slope(-h), slope(h)], bends: [bend(-h), bend(h)] };
}

describe('a curve through points', () => {
  it.each<Interpolation>(['step', 'linear', 'monotone', 'spline'])(
    '%s reaches each of them',
    (interpolation) => {
      holds(
        fc.property(points, (list) => {
          const curve = curveOf(interpolation, list);
          for (const { x, y } of list) expect(curve(x) - y).toBe(0);
        }),
      );
    },
  );

  it('step holds a value until the next point, the last over the seam', () => {
    const curve = curveOf('step', [
      { x: 0.25, y: 1 },
      { x: 0.5, y: 2 },
      { x: 0.75, y: 3 },
    ]);
    expect([0, 0.2499, 0.25, 0.4999, 0.5, 0.7499, 0.75, 0.9999].map(curve)).toEqual([3, 3, 1, 1, 2, 2, 3, 3]);
  });

  it('linear joins neighbours, the last to the first over the seam', () => {
    const curve = curveOf('linear', [
      { x: 0.25, y: 1 },
      { x: 0.75, y: 3 },
    ]);
    [0.25, 0.5, 0.75, 0.875, 0, 0.125].forEach((t, i) =>
      expect(curve(t)).toBeCloseTo([1, 2, 3, 2.5, 2, 1.5][i], 14),
    );
  });

  it('monotone stays between its neighbours and is flat where they turn', () => {
    holds(
      fc.property(points, (list) => {
        const curve = curveOf('monotone', list);
        list.forEach(({ x, y }, i) => {
          const next = list[(i + 1) % list.length];
          const width = i + 1 < list.length ? next.x - x : next.x + 1 - x;
          const [low, high] = [Math.min(y, next.y) - 1e-12, Math.max(y, next.y) + 1e-12];
          for (let s = 0; s <= 1; s += 1 / 64) {
            const value = curve((x + s * width) % 1);
            expect(value >= low && value <= high).toBe(true);
          }
        });
      }),
    );
  });

  it('monotone does not depend on the size of the signal', () => {
    const list = [0, 1, 2, 0.5].map((y, i) => ({ x: i / 5, y }));
    for (const size of [2 ** -600, 2 ** 600]) {
      const small = curveOf(
        'monotone',
        list.map(({ x, y }) => ({ x, y: y * size })),
      );
      for (let t = 0; t < 1; t += 1 / 64) expect(small(t) / size).toBe(curveOf('monotone', list)(t));
    }
  });

  it("monotone has the weighted harmonic mean of its neighbours' rises for a slope (Fritsch & Butland 1984)", () => {
    const curve = curveOf('monotone', [
      { x: 0, y: 0 },
      { x: 0.1, y: 0.4 },
      { x: 0.4, y: 0.7 },
      { x: 0.7, y: -1 },
    ]);
    // Rises 4 over 0.1 and 1 over 0.3: (0.7 + 0.5)/(0.7/4 + 0.5/1).
    const { slopes } = sidesAt(curve, 0.1, 1 / 4000);
    for (const slope of slopes) expect(slope).toBeCloseTo(1.2 / (0.7 / 4 + 0.5 / 1), 6);
  });

  it('spline keeps slope and bend at every point, the seam too', () => {
    holds(
      fc.property(points, (list) => {
        const curve = curveOf('spline', list);
        for (const { x } of list) {
          const { slopes, bends } = sidesAt(curve, x, 1 / 4000);
          const size = Math.max(
            ...list.map((_, i) => Math.abs(sidesAt(curve, list[i].x, 1 / 4000).bends[0])),
            1,
          );
          expect(Math.abs(slopes[0] - slopes[1])).toBeLessThan(1e-6 * size);
          expect(Math.abs(bends[0] - bends[1])).toBeLessThan(1e-5 * size);
        }
      }),
      40,
    );
  });

  it('a spline of a sine at 64 points is the sine to its fourth order', () => {
    const list = Array.from({ length: 64 }, (_, i) => ({ x: i / 64, y: Math.sin((2 * Math.PI * i) / 64) }));
    const curve = curveOf('spline', list);
    // Error of cubic spline interpolation: 5/384·h⁴·max|f⁗| (C. A. Hall & W. W. Meyer, J. Approx. Theory 16, 1976).
    const bound = (5 / 384) * (2 * Math.PI) ** 4 * 64 ** -4;
    for (let t = 0; t < 1; t += 1 / 1000)
      expect(Math.abs(curve(t) - Math.sin(2 * Math.PI * t))).toBeLessThan(bound);
  });

  it('is taken at the phases of the table', () => {
    holds(
      fc.property(
        points,
        fc.constantFrom<Interpolation>('step', 'linear', 'monotone', 'spline'),
        fc.integer({ min: 5, max: 300 }),
        (list, interpolation, length) => {
          const table: Table = { length, cycles: 2, startPhaseDeg: 33.3, sampleAt: 'centre' };
          const definition = parseDefinition(
            waveOf({ source: { kind: 'points', interpolation, points: list }, table }),
          );
          const curve = curveOf(interpolation, list);
          expect(synthesise(definition).cycle).toEqual(phasesOf(definition.table).map(curve));
        },
      ),
    );
  });
});

describe('bandlimited points', () => {
  const bandlimited = (list: Point[], table: Table, interpolation: Interpolation = 'step') =>
    synthesise(
      parseDefinition(
        waveOf({ source: { kind: 'points', interpolation, points: list, bandlimit: true }, table }),
      ),
    ).cycle;
  const halves = [
    { x: 0, y: 1 },
    { x: 0.5, y: -1 },
  ];

  it('keep the lines of 16·N points below N/(2K), and nothing else', () => {
    for (const [length, cycles] of [
      [48, 1],
      [50, 1],
      [60, 3],
      [61, 1],
      [97, 4],
    ] as const) {
      const curve = curveOf('step', halves);
      const dense = linesOf(Float64Array.from({ length: 16 * length }, (_, j) => curve(j / (16 * length))));
      const lines = linesOf(bandlimited(halves, { length, cycles }));
      for (let m = 0; m < lines.re.length; m += 1) {
        const harmonic = m / cycles;
        const stays = Number.isInteger(harmonic) && 2 * harmonic * cycles < length;
        expect(lines.re[m] / length).toBeCloseTo(stays ? dense.re[harmonic] / (16 * length) : 0, 12);
        expect(lines.im[m] / length).toBeCloseTo(stays ? dense.im[harmonic] / (16 * length) : 0, 12);
      }
    }
  });

  it('at a low limit is a curve the table already holds', () => {
    const list = Array.from({ length: 128 }, (_, i) => ({
      x: i / 128,
      y: Math.sin((2 * Math.PI * i) / 128),
    }));
    const cycle = bandlimited(list, { length: 64 }, 'spline');
    cycle.forEach((value, k) => expect(value).toBeCloseTo(Math.sin((2 * Math.PI * k) / 64), 7));
  });

  it.each([65_536, 65_521])('of %i entries are built in a moment', { timeout: 5_000 }, (length) => {
    const source = {
      kind: 'points' as const,
      interpolation: 'linear' as const,
      bandlimit: true,
      points: [
        { x: 0, y: -1 },
        { x: 0.5, y: 1 },
      ],
    };
    const { report } = buildTable(waveOf({ source, table: { length, bits: 16 } }));
    expect(report.minCode).toBe(0);
    expect(report.maxCode).toBe(65_535);
  });
});
