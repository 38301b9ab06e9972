import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linesOf } from '../../shared/dft/index.ts';
import { parseDefinition, type DefinitionInput, type SamplesSource } from '../../shared/contract/index.ts';
import { phasesOf, synthesise } from '../../shared/waveform/index.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

function resampled(values: number[], resampling: SamplesSource['resampling'], table: Table): Float64Array {
  return synthesise(parseDefinition(waveOf({ source: { kind: 'samples', values, resampling }, table })))
    .cycle;
}

const values = (maxLength = 200) =>
  fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 2, maxLength });
const expectNear = (actual: Float64Array, wanted: ArrayLike<number>, within = 1e-12) => {
  expect(actual.length).toBe(wanted.length);
  expect(actual.every((value, k) => Math.abs(value - wanted[k]) < within)).toBe(true);
};

describe('hold', () => {
  it('of as many values as entries is the values', () => {
    holds(
      fc.property(values(), (list) => {
        expect(Array.from(resampled(list, 'hold', { length: list.length }))).toEqual(list);
        expect(Array.from(resampled(list, 'hold', { length: list.length, sampleAt: 'centre' }))).toEqual(
          list,
        );
      }),
    );
  });

  it('takes floor((2k+2δ)·M/(2N)) in whole numbers, an edge going to the later value', () => {
    holds(
      fc.property(
        fc.integer({ min: 2, max: 3000 }),
        fc.integer({ min: 2, max: 3000 }),
        fc.boolean(),
        (count, length, centred) => {
          const list = Array.from({ length: count }, (_, j) => j);
          const cycle = resampled(list, 'hold', { length, sampleAt: centred ? 'centre' : 'start' });
          const wanted = Array.from({ length }, (_, k) =>
            Number((BigInt(2 * k + (centred ? 1 : 0)) * BigInt(count)) / BigInt(2 * length)),
          );
          expect(Array.from(cycle)).toEqual(wanted);
        },
      ),
    );
  });

  it('takes values[floor(t·M)] in other tables', () => {
    holds(
      fc.property(
        values(),
        fc.integer({ min: 5, max: 400 }),
        fc.double({ min: 0.001, max: 359, noNaN: true }),
        (list, length, startPhaseDeg) => {
          const table = { length, cycles: 2, startPhaseDeg };
          const phases = phasesOf(parseDefinition(waveOf({ table })).table);
          expect(resampled(list, 'hold', table)).toEqual(
            phases.map((t) => list[Math.floor(t * list.length)]),
          );
        },
      ),
    );
  });
});

describe('linear', () => {
  it('joins neighbours, the last to the first', () => {
    expectNear(resampled([0, 1, -1, 3], 'linear', { length: 8 }), [0, 0.5, 1, 0, -1, 1, 3, 1.5]);
  });

  it('keeps the values where a phase meets them', () => {
    holds(
      fc.property(values(), fc.integer({ min: 1, max: 5 }), (list, factor) => {
        const cycle = resampled(list, 'linear', { length: list.length * factor });
        expectNear(
          Float64Array.from(list, (_, j) => cycle[j * factor]),
          list,
        );
      }),
    );
  });
});

describe('bandlimited', () => {
  it('of an odd number of values at as many entries is the values', () => {
    holds(
      fc.property(
        values().filter((list) => list.length % 2 === 1),
        (list) => {
          expectNear(resampled(list, 'bandlimited', { length: list.length }), list);
        },
      ),
    );
  });

  it('passes through an odd number of values at any multiple of entries', () => {
    holds(
      fc.property(
        values(99).filter((list) => list.length % 2 === 1),
        fc.integer({ min: 2, max: 6 }),
        (list, factor) => {
          const cycle = resampled(list, 'bandlimited', { length: list.length * factor });
          expectNear(
            Float64Array.from(list, (_, j) => cycle[j * factor]),
            list,
          );
        },
      ),
    );
  });

  it('keeps harmonics m < min(M/2, N/(2K)) and no other', () => {
    holds(
      fc.property(
        values(),
        fc.integer({ min: 5, max: 300 }),
        fc.integer({ min: 1, max: 2 }),
        (list, length, cycles) => {
          const given = linesOf(Float64Array.from(list));
          const lines = linesOf(resampled(list, 'bandlimited', { length, cycles }));
          for (let bin = 0; bin < lines.re.length; bin += 1) {
            const m = bin / cycles;
            const stays = Number.isInteger(m) && m < Math.min(list.length / 2, length / (2 * cycles));
            expect(lines.re[bin] / length).toBeCloseTo(stays ? given.re[m] / list.length : 0, 12);
            expect(lines.im[bin] / length).toBeCloseTo(stays ? given.im[m] / list.length : 0, 12);
          }
        },
      ),
    );
  });

  it('goes to a shorter table and back without a loss below its limit', () => {
    const wave = Array.from(
      { length: 300 },
      (_, k) => Math.sin((2 * Math.PI * 3 * k) / 300) + 0.5 * Math.cos((2 * Math.PI * 11 * k) / 300),
    );
    const short = resampled(wave, 'bandlimited', { length: 37 });
    expectNear(resampled(Array.from(short), 'bandlimited', { length: 300 }), wave);
  });
});
