import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { parseDefinition, type DefinitionInput } from '../../shared/contract/index.ts';
import { heightScaleOf } from '../../src/features/bench/drawings/height-scale.ts';

const length = 64;

/** Points that stand on entries of the table, so that each one's height is a sample's. */
const heights = fc
  .array(
    fc.double({ min: -1.5, max: 1.5, noNaN: true }).map((y) => Number(y.toFixed(3))),
    { minLength: 8, maxLength: 8 },
  )
  .filter((ys) => new Set(ys).size > 2 && Math.max(...ys) - Math.min(...ys) > 0.1 && Math.max(...ys) > 0.05);

const source = (ys: readonly number[]): DefinitionInput['source'] => ({
  kind: 'points',
  interpolation: 'linear',
  points: ys.map((y, index) => ({ x: index / ys.length, y })),
});

const levels = fc.record({
  removeMean: fc.boolean(),
  normalise: fc.constantFrom('none' as const, 'peak' as const, 'span' as const),
  level: fc.double({ min: 0.2, max: 1, noNaN: true }),
});

describe('the scale of heights', () => {
  it('lays the points of a wave on its levelled cycle, and back', () => {
    fc.assert(
      fc.property(
        heights,
        levels,
        fc.constantFrom('bipolar' as const, 'unipolar' as const),
        fc.constantFrom('none' as const, 'cie-lightness' as const, { gamma: 2.2 }),
        (ys, level, range, transfer) => {
          const definition = parseDefinition({
            schema: 1,
            name: 'drawn',
            source: source(ys),
            level: { ...level, transfer: range === 'unipolar' ? transfer : 'none' },
            table: { length, range, bits: 12 },
          });
          const table = tabulate(definition);
          const inside = table.cycle.filter(
            (height) => height > (range === 'bipolar' ? -1 : 0) && height < 1,
          );
          // Two entries at least must tell the slope; a wave that is clipped away all round tells none.
          fc.pre(new Set(inside).size > 4);
          const scale = heightScaleOf(table);
          if (scale === undefined) throw new Error('no scale for a wave of points');
          const low = range === 'bipolar' ? -1 : 0;
          ys.forEach((y, index) => {
            const height = scale.toPlot(y);
            const clipped = Math.min(1, Math.max(low, height));
            expect(clipped).toBeCloseTo(table.cycle[(index * length) / ys.length], 6);
            if (height > 0.001) expect(scale.fromPlot(height)).toBeCloseTo(y, 6);
          });
        },
      ),
    );
  });

  it('is none for a wave that is not made of points', () => {
    const partials = [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }];
    const table = tabulate(
      parseDefinition({ schema: 1, name: 'sine', source: { kind: 'harmonics', partials } }),
    );
    expect(heightScaleOf(table)).toBeUndefined();
  });
});
