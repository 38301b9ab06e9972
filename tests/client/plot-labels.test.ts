import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ErrorScene } from '../../src/plots/error-scene.ts';
import { PlotArea } from '../../src/plots/plot-area.ts';
import { StemRoom } from '../../src/plots/stem-room.ts';

const scale = {
  heightOf: (amplitude: number) => amplitude,
  placeOf: (bin: number) => bin,
  binAt: (x: number) => x,
};

function areaOf(bins: number): PlotArea {
  const area = new PlotArea();
  area.place(50, 40, 800, 200, 1);
  area.scale(-0.5, bins - 0.5, 0, 1);
  return area;
}

const lines = fc
  .array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 2, maxLength: 600 })
  .map((heights) => Float64Array.from(heights));
const sizes = { width: 70, height: 13, head: 8 };

describe('labels of a spectrum', () => {
  it('stand inside the plot, clear of every stem and of each other', () => {
    fc.assert(
      fc.property(lines, fc.double({ min: 0, max: 0.9, noNaN: true }), (spectrum, floor) => {
        // Room somewhere: what lies under the floor is down at 0.
        const stems = spectrum.map((height) => (height > floor ? height - floor : 0));
        const area = areaOf(stems.length);
        const room = new StemRoom();
        room.measure(area, scale, [stems], 0);
        const strongest = stems.indexOf(Math.max(...stems));
        const at = { x: area.x(strongest), y: area.y(stems[strongest]) };
        const spots = ['one', 'other'].map((name) => room.find(area, name, at, sizes)).filter((spot) => spot);
        for (const spot of spots) {
          if (spot === null) continue;
          const [left, right] = [spot.left, spot.left + sizes.width];
          expect(left).toBeGreaterThanOrEqual(area.left);
          expect(right).toBeLessThanOrEqual(area.right + 1e-9);
          expect(spot.y - sizes.height / 2).toBeGreaterThanOrEqual(area.top);
          stems.forEach((height, bin) => {
            const x = area.x(bin);
            if (x < left || x > right) return;
            expect(spot.y + sizes.height / 2).toBeLessThanOrEqual(area.y(height) - sizes.head + 1e-9);
          });
        }
        const [one, other] = spots;
        if (one && other) {
          const isApart =
            Math.abs(one.left - other.left) >= sizes.width || Math.abs(one.y - other.y) >= sizes.height;
          expect(isApart).toBe(true);
        }
      }),
      { seed: 51, numRuns: 300 },
    );
  });

  it('keep their place while the wave changes a little', () => {
    const room = new StemRoom();
    const area = areaOf(64);
    const stems = new Float64Array(64).map((_, bin) => (bin % 7 === 0 ? 0.3 : 0.05));
    const places = [0, 0.005, 0.01, 0.015].map((more) => {
      stems[20] = 0.4 + more;
      room.measure(area, scale, [stems], 0);
      return room.find(area, 'label', { x: area.x(20), y: area.y(stems[20]) }, sizes)?.left;
    });
    expect(new Set(places).size).toBe(1);
    expect(places[0]).toBeDefined();
  });

  it('are not found where stems fill the plot', () => {
    const room = new StemRoom();
    const area = areaOf(64);
    const stems = new Float64Array(64).fill(1);
    room.measure(area, scale, [stems], 0);
    expect(room.find(area, 'label', { x: area.x(3), y: area.y(1) }, sizes)).toBeNull();
  });
});

it('the error’s scale names the half LSB for as long as rounding alone makes it', () => {
  for (const worst of [0.5, 0.99]) {
    const scene = new ErrorScene(Float64Array.of(0, -worst, 0.1));
    const [low, high] = scene.yRange();
    const [left] = scene.axes;
    expect(left.ticks(low, high, 70).map(left.text)).toEqual(['−0.5', '0', '0.5']);
  }
});
