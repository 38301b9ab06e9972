import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { parseDefinition, type DefinitionInput, type SourceInput } from '../../shared/contract/index.ts';
import { fitsTable, phasesOf, synthesise } from '../../shared/waveform/index.ts';
import { holds } from './support/seeded.ts';
import { waveOf } from './support/waves.ts';

type Table = NonNullable<DefinitionInput['table']>;

function cycleOf(source: SourceInput, table: Table): Float64Array {
  return synthesise(parseDefinition(waveOf({ source, table }))).cycle;
}

function furthest(a: Float64Array, b: Float64Array | number[]): number {
  expect(a.length).toBe(b.length);
  return a.reduce((most, value, k) => Math.max(most, Math.abs(value - b[k])), 0);
}

const partial = fc.record({
  harmonic: fc.integer({ min: 1, max: 600 }),
  amplitude: fc.double({ min: -1, max: 1, noNaN: true }),
  phaseDeg: fc.double({ min: -720, max: 720, noNaN: true }),
});
const table = fc
  .tuple(
    fc.integer({ min: 3, max: 1500 }),
    fc.nat(),
    fc.double({ min: 0, max: 359, noNaN: true }),
    fc.boolean(),
  )
  .map(([length, pick, startPhaseDeg, centred]): Table => ({
    length,
    cycles: 1 + (pick % Math.min(64, Math.ceil(length / 2) - 1)),
    startPhaseDeg,
    sampleAt: centred ? 'centre' : 'start',
  }));

describe('phases', () => {
  it('are ((k+δ)·K/N + φ/360) mod 1', () => {
    const settings = parseDefinition(
      waveOf({ table: { length: 10, cycles: 3, startPhaseDeg: 90, sampleAt: 'centre' } }),
    ).table;
    const wanted = Array.from({ length: 10 }, (_, k) => (((k + 0.5) * 3) / 10 + 0.25) % 1);
    expect(Array.from(phasesOf(settings))).toEqual(wanted);
  });
});

describe('a sum of harmonics', () => {
  it('is offset + Σ a·sin(2πnt + φ)', () => {
    holds(
      fc.property(fc.array(partial, { minLength: 1, maxLength: 6 }), table, (partials, settings) => {
        const definition = parseDefinition(
          waveOf({ source: { kind: 'harmonics', offset: 0.25, partials }, table: settings }),
        );
        const wanted = phasesOf(definition.table).map((t) =>
          partials
            .filter(({ harmonic }) => 2 * harmonic * definition.table.cycles < definition.table.length)
            .reduce(
              (sum, p) =>
                sum + p.amplitude * Math.sin(2 * Math.PI * p.harmonic * t + (p.phaseDeg * Math.PI) / 180),
              0.25,
            ),
        );
        // The formula itself loses digits: n·t carries the rounding of t, n times.
        expect(furthest(synthesise(definition).cycle, wanted)).toBeLessThan(1e-11);
      }),
      200,
    );
  });

  it('is the same by single sines as through one transform', () => {
    holds(
      fc.property(fc.array(partial, { minLength: 450, maxLength: 500 }), table, (partials, settings) => {
        const together = cycleOf({ kind: 'harmonics', partials }, settings);
        const apart = new Float64Array(together.length);
        for (const one of partials) {
          cycleOf({ kind: 'harmonics', partials: [one] }, settings).forEach(
            (value, k) => (apart[k] += value),
          );
        }
        expect(furthest(together, apart)).toBeLessThan(1e-12);
      }),
      12,
    );
  });

  it('of K cycles holds the cycle K times', () => {
    holds(
      fc.property(
        fc.array(partial, { minLength: 1, maxLength: 6 }),
        fc.integer({ min: 3, max: 100 }),
        fc.integer({ min: 2, max: 8 }),
        fc.boolean(),
        (partials, short, cycles, centred) => {
          const source: SourceInput = { kind: 'harmonics', partials };
          const sampleAt = centred ? 'centre' : 'start';
          const once = cycleOf(source, { length: short, sampleAt });
          const repeated = cycleOf(source, { length: short * cycles, cycles, sampleAt });
          expect(
            furthest(
              repeated,
              Array.from(repeated, (_, k) => once[k % short]),
            ),
          ).toBeLessThan(1e-13);
        },
      ),
    );
  });

  it('of K cycles has its line in bin n·K', () => {
    const source: SourceInput = {
      kind: 'harmonics',
      partials: [{ harmonic: 5, amplitude: 1, phaseDeg: 30 }],
    };
    const { spectrum } = buildTable(
      waveOf({ source, level: { normalise: 'none' }, table: { length: 100, cycles: 7 } }),
    );
    expect(spectrum.intended[35]).toBeCloseTo(1, 12);
  });

  it('started j entries later is the table turned by j', () => {
    holds(
      fc.property(
        fc.array(partial, { minLength: 1, maxLength: 6 }),
        fc.constantFrom(8, 64, 180, 360, 720),
        fc.nat(719),
        (partials, length, pick) => {
          const source: SourceInput = { kind: 'harmonics', partials };
          const turn = pick % length;
          const turned = cycleOf(source, { length, startPhaseDeg: (360 * turn) / length });
          const plain = cycleOf(source, { length });
          expect(
            furthest(
              turned,
              Array.from(plain, (_, k) => plain[(k + turn) % length]),
            ),
          ).toBeLessThan(2e-12);
        },
      ),
    );
  });

  it('a phase of any size is one turn of the circle', () => {
    const of = (phaseDeg: number) =>
      cycleOf({ kind: 'harmonics', partials: [{ harmonic: 3, amplitude: 1, phaseDeg }] }, { length: 50 });
    expect(furthest(of(77 + 360 * 1e9), of(77))).toBeLessThan(1e-13);
    expect(of(1e300).every(Number.isFinite)).toBe(true);
  });
});

describe('partials that do not fit', () => {
  it('2nK ≥ N is left out, 2nK < N stays', () => {
    expect([4, 5].map((n) => fitsTable(n, { length: 10, cycles: 1 }))).toEqual([true, false]);
    expect([2, 3].map((n) => fitsTable(n, { length: 10, cycles: 2 }))).toEqual([true, false]);
    const ten = (harmonic: number): SourceInput => ({
      kind: 'harmonics',
      offset: 0.5,
      partials: [{ harmonic, amplitude: 1, phaseDeg: 90 }],
    });
    expect(new Set(cycleOf(ten(5), { length: 10 }))).toEqual(new Set([0.5]));
    expect(new Set(cycleOf(ten(4), { length: 10 })).size).toBeGreaterThan(1);
  });

  it('each is named in a warning with its field', () => {
    const source: SourceInput = {
      kind: 'mix',
      operation: 'sum',
      parts: [
        {
          gain: 1,
          source: {
            kind: 'harmonics',
            partials: [1, 5, 9].map((harmonic) => ({ harmonic, amplitude: 1, phaseDeg: 0 })),
          },
        },
      ],
    };
    const { warnings } = buildTable(waveOf({ source, table: { length: 10 } }));
    expect(warnings.map(({ code, path }) => [code, path])).toEqual([
      ['partial-above-nyquist', 'source.parts[0].source.partials[1].harmonic'],
      ['partial-above-nyquist', 'source.parts[0].source.partials[2].harmonic'],
    ]);
    expect(warnings[0].message).toContain('Harmonic 5');
  });

  it('many are still all named, in few words', () => {
    const partials = Array.from({ length: 3000 }, (_, i) => ({ harmonic: i + 1, amplitude: 1, phaseDeg: 0 }));
    partials.splice(20, 1);
    const { warnings } = buildTable(
      waveOf({ source: { kind: 'harmonics', partials }, table: { length: 16 } }),
    );
    const said = warnings.map(({ message }) => message).join('\n');
    for (const harmonic of [8, 9, 10, 15]) expect(said).toContain(`Harmonic ${harmonic} `);
    expect(said).toContain('16–20, 22–3000');
    expect(warnings.length).toBeLessThan(12);
  });
});
