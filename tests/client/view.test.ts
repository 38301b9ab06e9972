import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { flightOfField, nameOfField } from '../../src/features/bench/problems/field-names.ts';
import { flightIds, readOpenFlights, writeOpenFlights } from '../../src/features/bench/view/open-flights.ts';
import { readSight, writeSight } from '../../src/features/bench/view/sight.ts';

describe('the view in the URL', () => {
  it('names open flights so that they read back, in their order', () => {
    fc.assert(
      fc.property(fc.subarray([...flightIds]), fc.boolean(), (open, isTurned) => {
        const named = isTurned ? open.toReversed() : open;
        expect(readOpenFlights(writeOpenFlights(named))).toEqual(open);
      }),
    );
  });

  it.each([
    [null, ['shape']],
    ['none', []],
    ['', []],
    ['export,cellar,shape,shape', ['shape', 'export']],
  ])('reads open flights from %j', (text, open) => {
    expect(readOpenFlights(text)).toEqual(open);
  });

  it('names a part in sight so that it reads back to a thousandth of an entry', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 65_000, noNaN: true }),
        fc.double({ min: 0.01, max: 500, noNaN: true }),
        (from, span) => {
          const sight = readSight(writeSight({ from, to: from + span }));
          expect(sight?.from).toBeCloseTo(from, 2.9);
          expect(sight?.to).toBeCloseTo(from + span, 2.9);
        },
      ),
    );
    expect(readSight(writeSight(null))).toBeNull();
  });

  it.each([['9-3'], ['4-4'], ['-3-9'], ['1e3-2e3'], ['a-b'], [''], [null]])(
    'takes %j for no part',
    (text) => {
      expect(readSight(text)).toBeNull();
    },
  );
});

describe('fields by their paths', () => {
  it.each([
    ['table.bits', 'Bit depth', 'quantise'],
    ['level.transfer.gamma', 'Gamma', 'quantise'],
    ['source.partials[2].amplitude', 'Partial 3, amplitude', 'shape'],
    ['source.points[0].x', 'Point 1, place in the cycle', 'shape'],
    ['source.parts[1].source', 'Part 2', 'shape'],
    ['source.parts[0].gain', 'Part 1, gain', 'shape'],
    [
      'source.parts[1].source.parts[0].source.partials[2].phaseDeg',
      'Part 2: Part 1: Partial 3, phase',
      'shape',
    ],
    ['source.values[4]', 'Sample 5', 'shape'],
    ['table.levels[3]', 'Measured level of code 3', 'quantise'],
    ['name', 'Name of the wave', null],
    ['definition', 'definition', null],
  ])('%s is “%s”', (path, name, flight) => {
    expect(nameOfField(path)).toBe(name);
    expect(flightOfField(path)).toBe(flight);
  });
});
