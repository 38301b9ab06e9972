import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { ErrorScene } from '../../src/plots/error-scene.ts';
import { createPlotLink } from '../../src/plots/plot-link.ts';
import { shifted, showing, viewWithin, zoomed } from '../../src/plots/plot-view.ts';

const scene = new ErrorScene(new Float64Array(256));

describe('zoom and pan', () => {
  it('keep the view inside the table and no narrower than its least span', () => {
    const step = fc.record({
      factor: fc.double({ min: 0.1, max: 4, noNaN: true }),
      about: fc.double({ min: 0, max: 256, noNaN: true }),
      by: fc.integer({ min: -300, max: 300 }),
    });
    fc.assert(
      fc.property(fc.array(step, { maxLength: 12 }), (steps) => {
        let view = viewWithin(scene, null);
        for (const { factor, about, by } of steps) {
          const place = Math.min(view.to, Math.max(view.from, about));
          view = shifted(scene, viewWithin(scene, zoomed(scene, view, factor, place)), by);
          expect(view.from).toBeGreaterThanOrEqual(-1e-9);
          expect(view.to).toBeLessThanOrEqual(256 + 1e-9);
          expect(view.to - view.from).toBeGreaterThanOrEqual(scene.leastSpan - 1e-9);
        }
      }),
      { seed: 21, numRuns: 300 },
    );
  });

  it('leave the place zoomed about where it was', () => {
    const view = zoomed(scene, { from: 40, to: 140 }, 0.5, 65);
    expect(view).toEqual({ from: 52.5, to: 102.5 });
  });

  it('come back to the whole, and say so with null', () => {
    expect(zoomed(scene, { from: 10, to: 200 }, 3, 50)).toBeNull();
    expect(viewWithin(scene, null)).toEqual({ from: 0, to: 256 });
  });

  it('show the whole of a shorter table where the view lies past its end', () => {
    expect(viewWithin(new ErrorScene(new Float64Array(16)), { from: 40, to: 60 })).toEqual({
      from: 0,
      to: 16,
    });
  });

  it('follow the cursor no further than needed', () => {
    const view = { from: 40, to: 60 };
    expect(showing(scene, view, 50)).toBe(view);
    expect(showing(scene, view, 60)).toEqual({ from: 41, to: 61 });
    expect(showing(scene, view, 30)).toEqual({ from: 30, to: 50 });
  });
});

describe('a link between plots', () => {
  it('tells of a change once, and of no change not at all', () => {
    const link = createPlotLink();
    const heard = vi.fn();
    const end = link.subscribe(heard);
    link.setCursor(3);
    link.setCursor(3);
    link.setView({ from: 1, to: 9 });
    link.setView({ from: 1, to: 9 });
    expect(heard).toHaveBeenCalledTimes(2);
    end();
    link.setCursor(null);
    expect(heard).toHaveBeenCalledTimes(2);
  });
});

describe('the error drawing', () => {
  it('keeps its scale still while errors stay within half an LSB', () => {
    expect(new ErrorScene(Float64Array.of(0.1, -0.5)).yRange()).toEqual([-0.75, 0.75]);
    expect(new ErrorScene(Float64Array.of(0, 0.9)).yRange()).toEqual([-1.25, 1.25]);
    expect(new ErrorScene(Float64Array.of(0, -700)).yRange()).toEqual([-1000, 1000]);
  });

  it('says its key facts in words', () => {
    expect(new ErrorScene(Float64Array.of(0.1, -0.5, 0.75)).summary()).toBe(
      'Error of 3 entries in LSB. The largest is 0.7500\u00a0LSB, at entry 2. One entry is off by more than half an LSB.',
    );
  });
});
