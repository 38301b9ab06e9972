import fc from 'fast-check';
import {
  codings,
  interpolations,
  limits,
  normalisations,
  roundings,
  type Definition,
} from '../../shared/contract/index.ts';
import { parseDefinition } from '../../shared/contract/index.ts';
import type { Work } from '../../src/features/bench/state/wave.ts';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const amplitude = fc.double({ min: -2, max: 2, noNaN: true });

const harmonics = fc.record({
  kind: fc.constant('harmonics' as const),
  offset: amplitude,
  partials: fc.array(
    fc.record({ harmonic: fc.integer(limits.harmonic), amplitude: finite, phaseDeg: finite }),
    { minLength: 1, maxLength: 40 },
  ),
});

const points = fc.record({
  kind: fc.constant('points' as const),
  interpolation: fc.constantFrom(...interpolations),
  bandlimit: fc.boolean(),
  points: fc
    .uniqueArray(fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }), {
      minLength: 3,
      maxLength: 40,
    })
    .map((places) => places.map((x) => x + 0).sort((one, other) => one - other))
    .filter((places) => places.every((x, index) => index === 0 || x > places[index - 1]))
    .chain((places) => fc.tuple(...places.map((x) => fc.record({ x: fc.constant(x), y: finite })))),
});

/** Definitions as parsed, of the kinds that the bench makes. */
export const definitions: fc.Arbitrary<Definition> = fc
  .record({
    schema: fc.constant(1 as const),
    name: fc.string({ unit: 'grapheme', minLength: 1, maxLength: 20 }).filter(({ length }) => length <= 64),
    source: fc.oneof(harmonics, points),
    level: fc.record({
      removeMean: fc.boolean(),
      normalise: fc.constantFrom(...normalisations),
      level: fc.double({ min: 0, max: 1, noNaN: true }),
    }),
    table: fc.record({
      length: fc.integer({ min: 200, max: limits.tableLength.max }),
      bits: fc.integer(limits.bits),
      cycles: fc.integer(limits.cycles),
      startPhaseDeg: fc.double({ min: 0, max: 360, maxExcluded: true, noNaN: true }),
      rounding: fc.constantFrom(...roundings),
      coding: fc.constantFrom(...codings),
      complement: fc.boolean(),
    }),
  })
  .map(parseDefinition);

const pulses = fc.record({
  steps: fc.array(
    fc.record({
      onMs: fc.integer({ min: 1, max: 60_000 }),
      offMs: fc.integer({ min: 0, max: 60_000 }),
      repeats: fc.integer({ min: 1, max: 255 }),
    }),
    { minLength: 1, maxLength: 64 },
  ),
  endless: fc.boolean(),
});

const playbacks = fc.record(
  {
    mode: fc.constantFrom('loop' as const, 'once' as const, 'accumulator' as const),
    by: fc.constantFrom('tone' as const, 'sampleRate' as const),
    toneHz: finite,
    sampleRateHz: finite,
    pattern: pulses,
  },
  { requiredKeys: ['mode', 'by', 'toneHz', 'sampleRateHz'] },
);

export const works: fc.Arbitrary<Work> = fc.record({
  definition: definitions,
  playback: playbacks,
  exporting: fc.record({
    target: fc.constantFrom('c99', 'avr'),
    options: fc.dictionary(fc.constantFrom('c99', 'avr'), fc.record({ arrayName: fc.string() })),
  }),
});

/** JSON has no −0: what has been through it is compared with this. */
export const throughJson = <Value>(value: Value): Value => JSON.parse(JSON.stringify(value)) as Value;
