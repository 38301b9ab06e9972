import fc from 'fast-check';
import type { DefinitionInput, Partial, SourceInput } from '../../../shared/contract/index.ts';

// Random definitions that the engine has to take. Numbers have few decimals: a signal is then never so nearly
// zero, constant or tied that two correct programs may differ about it.

const decimal = (min: number, max: number, perUnit = 1000) =>
  fc
    .integer({ min: Math.round(min * perUnit), max: Math.round(max * perUnit) })
    .map((whole) => whole / perUnit);

const amplitude = fc.oneof(decimal(-1.5, 1.5), decimal(0.05, 1)).filter((value) => value !== 0);

const partial = fc.record({
  harmonic: fc.oneof(
    { weight: 3, arbitrary: fc.integer({ min: 1, max: 12 }) },
    fc.integer({ min: 1, max: 2000 }),
  ),
  amplitude,
  phaseDeg: fc.oneof(fc.constantFrom(0, 90, 180, 270, 30, 45), decimal(-720, 720, 10)),
});

/** A few partials: the first is in the list whatever the table's length cuts off. */
const harmonics = fc
  .tuple(
    partial,
    fc.oneof(fc.array(partial, { maxLength: 8 }), fc.array(partial, { minLength: 120, maxLength: 160 })),
  )
  .chain(([first, others]) =>
    fc.record({
      kind: fc.constant('harmonics' as const),
      offset: fc.oneof(fc.constant(0), decimal(-0.5, 0.5)),
      partials: fc.constant<Partial[]>([{ ...first, harmonic: 1 }, ...others]),
    }),
  );

/** Points at least a thousandth of a cycle apart, not all at one height. */
const points = fc
  .uniqueArray(fc.integer({ min: 0, max: 999 }), { minLength: 3, maxLength: 24 })
  .chain((places) =>
    fc.record({
      kind: fc.constant('points' as const),
      interpolation: fc.constantFrom('step', 'linear', 'monotone', 'spline'),
      points: fc
        .array(decimal(-1, 1, 200), { minLength: places.length, maxLength: places.length })
        .filter((heights) => Math.max(...heights) - Math.min(...heights) > 0.1)
        .map((heights) => [...places].sort((a, b) => a - b).map((x, i) => ({ x: x / 1000, y: heights[i] }))),
      bandlimit: fc.boolean(),
    }),
  );

const samples = fc.record({
  kind: fc.constant('samples' as const),
  values: fc
    .array(decimal(-1, 1, 200), { minLength: 2, maxLength: 300 })
    .filter((values) => Math.max(...values) - Math.min(...values) > 0.1),
  resampling: fc.constantFrom('bandlimited', 'linear', 'hold'),
});

const leaf: fc.Arbitrary<SourceInput> = fc.oneof(harmonics, points, samples);

function mixOf(inner: fc.Arbitrary<SourceInput>): fc.Arbitrary<SourceInput> {
  return fc.record({
    kind: fc.constant('mix' as const),
    operation: fc.constantFrom('sum', 'product'),
    parts: fc.array(fc.record({ gain: amplitude, source: inner }), { minLength: 1, maxLength: 4 }),
  });
}

export const anySource: fc.Arbitrary<SourceInput> = fc.oneof(
  { weight: 6, arbitrary: leaf },
  { weight: 2, arbitrary: mixOf(leaf) },
  { weight: 1, arbitrary: mixOf(fc.oneof(leaf, mixOf(leaf))) },
);

type TableInput = NonNullable<DefinitionInput['table']>;
type LevelInput = NonNullable<DefinitionInput['level']>;

const tableLength = fc.oneof(
  { weight: 4, arbitrary: fc.integer({ min: 4, max: 300 }) },
  { weight: 3, arbitrary: fc.integer({ min: 300, max: 3000 }) },
  { weight: 3, arbitrary: fc.constantFrom(16, 64, 128, 256, 512, 1024, 2048) },
);

const sampling = tableLength.chain((length) =>
  fc.record({
    length: fc.constant(length),
    cycles: fc.oneof(
      { weight: 4, arbitrary: fc.constant(1) },
      fc.integer({ min: 1, max: Math.min(64, Math.ceil(length / 2) - 1) }),
    ),
    startPhaseDeg: fc.oneof(
      { weight: 2, arbitrary: fc.constant(0) },
      fc.constantFrom(90, 180, 45),
      decimal(0, 359.9, 10),
    ),
    sampleAt: fc.constantFrom('start', 'centre'),
  }),
);

const wording = fc.record({
  coding: fc.constantFrom('offset-binary', 'twos-complement'),
  complement: fc.boolean(),
});

const evenSteps = fc.record({
  bits: fc.integer({ min: 1, max: 16 }),
  rounding: fc.constantFrom('half-up', 'half-even', 'down'),
  shaping: fc.oneof(
    { weight: 3, arbitrary: fc.constant(0 as const) },
    fc.constantFrom(1 as const, 2 as const),
  ),
});

/** Steps as a converter was measured: near the even ones, out of order here and there, all in volts. */
const measuredSteps = fc.integer({ min: 1, max: 8 }).chain((bits) =>
  fc.record({
    bits: fc.constant(bits),
    levels: fc
      .array(decimal(-0.9, 0.9, 100), { minLength: 2 ** bits, maxLength: 2 ** bits })
      .map((errors) => errors.map((error, code) => 0.2 + ((code + error) * 5) / 2 ** bits))
      .filter((volts) => Math.max(...volts) - Math.min(...volts) > 0.1),
  }),
);

const steps: fc.Arbitrary<TableInput> = fc.oneof(
  { weight: 5, arbitrary: evenSteps },
  { weight: 1, arbitrary: measuredSteps },
);

/**
 * Shaping carries every last bit of a position on: order 1 as a step, order 2 as a ramp. Where positions are
 * fine and the table long, two correct programs then part, as their sines differ in the last bit.
 */
function steady(table: TableInput): TableInput {
  const { bits = 8, length = 256, shaping = 0 } = table;
  const isSteady = shaping === 0 || (shaping === 1 ? bits <= 12 : bits <= 8 && length <= 1000);
  return isSteady ? table : { ...table, shaping: 0 };
}

const bipolarTable: fc.Arbitrary<TableInput> = fc
  .tuple(sampling, steps, wording, fc.constantFrom('full-span', 'mid-tread'))
  .map(([where, stepping, words, scale]) =>
    steady({ ...where, ...stepping, ...words, ...(stepping.levels === undefined ? { scale } : {}) }),
  );

const unipolarTable: fc.Arbitrary<TableInput> = fc
  .tuple(sampling, steps, wording)
  .map(([where, stepping, words]) => steady({ ...where, ...stepping, ...words, range: 'unipolar' as const }));

const plainLevel = fc.record({
  removeMean: fc.boolean(),
  normalise: fc.constantFrom('none', 'peak', 'span'),
  level: fc.oneof(fc.constant(1), decimal(0.2, 1)),
});

const transfer = fc.oneof(
  fc.constant('none' as const),
  fc.constant('cie-lightness' as const),
  // Below 1 a power lifts the last bits of a zero crossing into sight: (10⁻¹⁶)^0.1 is 0.025.
  fc.record({ gamma: decimal(1, 10, 10) }),
);

const withTransfer: fc.Arbitrary<LevelInput> = fc
  .tuple(plainLevel, transfer)
  .map(([level, chosen]) => ({ ...level, transfer: chosen }));

const freeDefinition: fc.Arbitrary<DefinitionInput> = fc
  .oneof(
    fc.record({ source: anySource, level: plainLevel, table: bipolarTable }),
    fc.record({ source: anySource, level: withTransfer, table: unipolarTable }),
  )
  .map((parts) => ({ schema: 1 as const, name: 'random', ...parts }));

/** Odd harmonics in phase, sampled at the centres: the symmetry that a quarter fold stores once. */
const foldable: fc.Arbitrary<DefinitionInput> = fc
  .tuple(
    fc.array(fc.tuple(fc.integer({ min: 0, max: 6 }), amplitude), { minLength: 1, maxLength: 5 }),
    fc.integer({ min: 3, max: 300 }),
    fc.integer({ min: 1, max: 16 }),
    fc.constantFrom('half-up', 'half-even'),
    wording,
  )
  .map(([partials, quarter, bits, rounding, words]) => ({
    schema: 1 as const,
    name: 'folded',
    source: {
      kind: 'harmonics' as const,
      partials: [
        { harmonic: 1, amplitude: 1, phaseDeg: 0 },
        ...partials.map(([n, a]) => ({ harmonic: 2 * n + 1, amplitude: a / (2 * n + 1), phaseDeg: 0 })),
      ],
    },
    table: {
      length: 4 * quarter,
      bits,
      rounding,
      sampleAt: 'centre' as const,
      fold: 'quarter' as const,
      ...words,
    },
  }));

/** Definitions without dither: every program that follows the specification must give the same codes. */
export const anyDefinition: fc.Arbitrary<DefinitionInput> = fc.oneof(
  { weight: 12, arbitrary: freeDefinition },
  { weight: 1, arbitrary: foldable },
);

/** The same, some of them dithered. */
export const ditheredDefinition: fc.Arbitrary<DefinitionInput> = fc
  .tuple(anyDefinition, fc.constantFrom('none', 'rectangular', 'triangular'), fc.nat(4_294_967_295))
  .map(([definition, dither, seed]) =>
    definition.table?.levels === undefined && definition.table?.fold === undefined
      ? { ...definition, table: { ...definition.table, dither, seed } }
      : definition,
  );
