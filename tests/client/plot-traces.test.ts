import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { drawColumns } from '../../src/plots/stems.ts';
import { PlotArea } from '../../src/plots/plot-area.ts';
import { SvgPen } from '../../src/plots/svg-pen.ts';
import { binaryTicks, decimalTicks, logTicks, wholeTicks } from '../../src/plots/ticks.ts';
import { traceLine, traceStairs } from '../../src/plots/traces.ts';

/** A pen that keeps the corners of the path. */
class Recorder extends SvgPen {
  readonly corners: [number, number][] = [];

  constructor() {
    super({ text: 'serif', figures: 'monospace' });
  }

  override move(x: number, y: number) {
    this.corners.push([x, y]);
  }

  override line(x: number, y: number) {
    this.corners.push([x, y]);
  }
}

function areaOf(length: number, width: number, height = 200): PlotArea {
  const area = new PlotArea();
  area.place(10, 20, width, height, 1);
  area.scale(0, length, -1, 1);
  return area;
}

const signal = (minLength: number, maxLength: number) =>
  fc
    .array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength, maxLength })
    .map((values) => Float64Array.from(values));

/** How low and how high (as heights on the screen) a path goes in each column of pixels. */
function reachOfColumns(corners: readonly [number, number][], area: PlotArea) {
  const reach = Array.from({ length: area.width }, () => ({ lowest: -Infinity, highest: Infinity }));
  const take = (column: number, y: number) => {
    if (column < 0 || column >= reach.length) return;
    reach[column].lowest = Math.max(reach[column].lowest, y);
    reach[column].highest = Math.min(reach[column].highest, y);
  };
  for (let index = 1; index < corners.length; index += 1) {
    const [[x1, y1], [x2, y2]] = [corners[index - 1], corners[index]];
    const [from, to] = [Math.floor(x1 - area.left), Math.floor(x2 - area.left)];
    take(from, y1);
    take(to, y2);
    // Where it goes on from one column into the next.
    for (let edge = from + 1; edge <= to; edge += 1) {
      const y = y1 + ((area.left + edge - x1) / (x2 - x1)) * (y2 - y1);
      take(edge - 1, y);
      take(edge, y);
    }
  }
  return reach;
}

describe('a staircase', () => {
  it('has a tread from every entry to the next, on whole pixels', () => {
    fc.assert(
      fc.property(signal(2, 60), (values) => {
        const area = areaOf(values.length, 600);
        const pen = new Recorder();
        traceStairs(pen, area, values, 0);
        values.forEach((value, k) => {
          const [left, right, y] = [area.x(k), area.x(k + 1), area.y(value)].map(Math.round);
          const isCovered = pen.corners.some(([x1, y1], index) => {
            const [x2, y2] = pen.corners[index + 1] ?? [NaN, NaN];
            return y1 === y && y2 === y && x1 <= left && x2 >= right;
          });
          expect(isCovered, `entry ${k} of ${[...values].join(' ')}`).toBe(true);
        });
      }),
      { seed: 11, numRuns: 200 },
    );
  });

  it('closes on its floor where it is to be filled', () => {
    const pen = new Recorder();
    traceStairs(pen, areaOf(4, 400), Float64Array.of(0, 0.5, 0.5, -1), 0, 220);
    expect(pen.corners[0]).toEqual([10, 220]);
    expect(pen.corners.at(-1)).toEqual([410, 220]);
  });
});

describe('a table with more entries than columns of pixels', () => {
  it('loses no extreme: in every column the path reaches its lowest and its highest value to a quarter of a pixel', () => {
    fc.assert(
      fc.property(signal(200, 1500), fc.integer({ min: 40, max: 190 }), (values, width) => {
        const area = areaOf(values.length, width);
        for (const trace of [traceLine, traceStairs]) {
          const pen = new Recorder();
          trace(pen, area, values, 0);
          const reach = reachOfColumns(pen.corners, area);
          values.forEach((value, k) => {
            const column = Math.min(width - 1, Math.floor((k / values.length) * width));
            expect(reach[column].lowest).toBeGreaterThanOrEqual(area.y(value) - 0.2501);
            expect(reach[column].highest).toBeLessThanOrEqual(area.y(value) + 0.2501);
          });
        }
      }),
      { seed: 12, numRuns: 60 },
    );
  });

  it('is washed from the floor to the nearer end of each column, however it goes up and down', () => {
    fc.assert(
      fc.property(signal(200, 1500), fc.integer({ min: 40, max: 190 }), (values, width) => {
        const area = areaOf(values.length, width);
        const floor = area.y(0);
        const pen = new Recorder();
        traceStairs(pen, area, values, 0, floor);
        expect(pen.corners[0][1]).toBe(floor);
        expect(pen.corners.at(-1)?.[1]).toBe(floor);
        const columns = Array.from({ length: width }, () => [] as number[]);
        // An entry on the edge between two columns may stand in either.
        const unsure = new Set<number>();
        values.forEach((value, k) => {
          const place = (k / values.length) * width;
          const [before, after] = [place - 1e-9, place + 1e-9].map(Math.floor);
          if (before === after) columns[after].push(area.y(value));
          else unsure.add(before).add(after);
        });
        for (const [x, y] of pen.corners.slice(1, -1)) {
          const column = Math.floor(x - area.left);
          if (unsure.has(column)) continue;
          const [top, bottom] = [Math.min(...columns[column]), Math.max(...columns[column])];
          expect(y).toBeCloseTo(Math.min(bottom, Math.max(top, floor)), 9);
        }
      }),
      { seed: 15, numRuns: 60 },
    );
  });

  it('draws no more corners than two a column, and fewer where it is level', () => {
    const values = Float64Array.from({ length: 65_536 }, (_, k) => Math.sin(k * 0.37));
    const pen = new Recorder();
    traceStairs(pen, areaOf(values.length, 800), values, 0);
    expect(pen.corners.length).toBeLessThanOrEqual(2 * 800 + 1);
    const level = new Recorder();
    traceStairs(
      level,
      areaOf(values.length, 800),
      values.map((_, k) => (k < 30_000 ? -1 : 1)),
      0,
    );
    expect(level.corners.length).toBeLessThan(8);
  });
});

describe('a spectrum with more lines than columns of pixels', () => {
  it('reaches to the strongest line of every column', () => {
    const scale = {
      heightOf: (amplitude: number) => amplitude,
      placeOf: (bin: number) => bin,
      binAt: (x: number) => x,
    };
    const style = { color: 'red', width: 1, head: 'diamond', radius: 3 } as const;
    const strength = fc.double({ min: 0.001, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.array(strength, { minLength: 300, maxLength: 2000 }), (lines) => {
        const area = new PlotArea();
        area.place(0, 0, 100, 200, 1);
        area.scale(0, lines.length, 0, 1);
        const pen = new Recorder();
        drawColumns(pen, area, scale, Float64Array.from(lines), 0, style);
        const tops = new Map<number, number>();
        for (const [x, y] of pen.corners)
          tops.set(Math.floor(x), Math.min(tops.get(Math.floor(x)) ?? Infinity, y));
        lines.forEach((line, bin) => {
          // A bin on the edge between two columns may stand in either.
          const place = (bin / lines.length) * 100;
          const top = Math.min(
            ...[place - 1e-9, place + 1e-9].map((x) => tops.get(Math.floor(x)) ?? Infinity),
          );
          expect(top).toBeLessThanOrEqual(area.y(line) + 1e-9);
        });
      }),
      { seed: 14, numRuns: 60 },
    );
  });
});

describe('ticks', () => {
  it.each([
    [decimalTicks(-1, 1, 4), [-1, -0.5, 0, 0.5, 1]],
    [decimalTicks(0, 0.3, 3), [0, 0.1, 0.2, 0.3]],
    [decimalTicks(-120, 0, 6), [-120, -100, -80, -60, -40, -20, 0]],
    [wholeTicks(0, 3, 12), [0, 1, 2, 3]],
    [binaryTicks(0, 256, 8), [0, 32, 64, 96, 128, 160, 192, 224, 256]],
    [binaryTicks(0, 3, 20), [0, 1, 2, 3]],
    [logTicks(0, 4, 4).map((x) => Math.round(10 ** x)), [1, 10, 100, 1000, 10_000]],
    [logTicks(0, 1, 8).map((x) => Math.round(10 ** x)), [1, 2, 5, 10]],
  ])('%j', (ticks, expected) => {
    expect(ticks).toEqual(expected);
  });

  it('stay within the range and about as many as asked for', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        fc.integer({ min: 2, max: 12 }),
        (min, span, target) => {
          const ticks = decimalTicks(min, min + span, target);
          expect(ticks.length).toBeLessThanOrEqual(target + 1);
          for (const tick of ticks) {
            expect(tick).toBeGreaterThanOrEqual(min - span * 1e-3);
            expect(tick).toBeLessThanOrEqual(min + span * 1.001);
          }
        },
      ),
      { seed: 13, numRuns: 500 },
    );
  });
});

describe('an SVG file', () => {
  it('escapes its words, so that a title cannot end an element', () => {
    const pen = new SvgPen({ text: '"a" & <b>', figures: 'mono' });
    pen.text('</text><script>', 0, 0, { color: 'red' });
    const file = pen.document(10, 10, 'A & B', '<desc>');
    expect(file).not.toContain('<script>');
    expect(file).toContain('A &amp; B');
    expect(file).toContain('font-family="&quot;a&quot; &amp; &lt;b&gt;"');
  });
});
