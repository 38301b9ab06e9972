import { z } from 'zod';
import { limits } from './limits.ts';

// Zod's `error` texts here say what is allowed; parse-definition.ts adds the path and the value found.

const wholeNumber = ({ min, max }: { min: number; max: number }) => {
  const error = `a whole number from ${min} to ${max}`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

const anyNumber = z.number({ error: 'a finite number' });

const numberBetween = (min: number, max: number) => {
  const error = `a number from ${min} to ${max}`;
  return z.number({ error }).min(min, { error }).max(max, { error });
};

const listOf = <Item extends z.ZodType>(
  item: Item,
  { min, max }: { min: number; max: number },
  what: string,
) => {
  const error = `a list of ${min} to ${max} ${what}`;
  return z.array(item, { error }).min(min, { error }).max(max, { error });
};

const oneOf = <const Values extends readonly [string, ...string[]]>(values: Values) =>
  z.enum(values, { error: `one of ${values.map((value) => `"${value}"`).join(', ')}` });

const yesOrNo = z.boolean({ error: 'true or false' });

const partialSchema = z.strictObject({
  /** Multiple of the cycle's frequency. */
  harmonic: wholeNumber(limits.harmonic),
  /** Peak amplitude; full scale is 1. */
  amplitude: anyNumber,
  /** Phase of the sine at the start of the cycle, in degrees. */
  phaseDeg: anyNumber,
});

export const harmonicsSchema = z.strictObject({
  kind: z.literal('harmonics'),
  offset: anyNumber.default(0),
  partials: listOf(partialSchema, limits.partials, 'partials'),
});

const pointError = 'a number from 0 up to, not including, 1';
const pointSchema = z.strictObject({
  x: z.number({ error: pointError }).min(0, { error: pointError }).lt(1, { error: pointError }),
  y: anyNumber,
});

export const interpolations = ['step', 'linear', 'monotone', 'spline'] as const;

export const pointsSchema = z
  .strictObject({
    kind: z.literal('points'),
    interpolation: oneOf(interpolations),
    points: listOf(pointSchema, limits.points, 'points'),
    bandlimit: yesOrNo.default(false),
  })
  .superRefine((source, context) => {
    source.points.forEach((point, index) => {
      if (index > 0 && point.x <= source.points[index - 1].x) {
        context.addIssue({
          code: 'custom',
          path: ['points', index, 'x'],
          message: `more than the x before it, ${source.points[index - 1].x}`,
          input: point.x,
        });
      }
    });
    if (source.interpolation === 'spline' && source.points.length < limits.splinePoints.min) {
      context.addIssue({
        code: 'custom',
        path: ['points'],
        message: `at least ${limits.splinePoints.min} points for a spline`,
        input: source.points,
      });
    }
  });

export const resamplings = ['bandlimited', 'linear', 'hold'] as const;

export const samplesSchema = z.strictObject({
  kind: z.literal('samples'),
  values: listOf(anyNumber, limits.samples, 'numbers'),
  resampling: oneOf(resamplings),
});

export type Partial = z.infer<typeof partialSchema>;
export type Point = z.infer<typeof pointSchema>;
export type HarmonicsSource = z.infer<typeof harmonicsSchema>;
export type PointsSource = z.infer<typeof pointsSchema>;
export type SamplesSource = z.infer<typeof samplesSchema>;
export interface MixPart {
  gain: number;
  source: Source;
}
export interface MixSource {
  kind: 'mix';
  parts: MixPart[];
  operation: 'sum' | 'product';
}
export type LeafSource = HarmonicsSource | PointsSource | SamplesSource;
export type Source = LeafSource | MixSource;

type LeafInput =
  z.input<typeof harmonicsSchema> | z.input<typeof pointsSchema> | z.input<typeof samplesSchema>;
export type SourceInput =
  LeafInput | { kind: 'mix'; parts: { gain: number; source: SourceInput }[]; operation: 'sum' | 'product' };

const mixSchema: z.ZodType<MixSource, Extract<SourceInput, { kind: 'mix' }>> & z.ZodObject = z.strictObject({
  kind: z.literal('mix'),
  parts: listOf(
    z.strictObject({
      gain: anyNumber,
      get source() {
        return sourceSchema;
      },
    }),
    limits.mixParts,
    'parts',
  ),
  operation: oneOf(['sum', 'product']),
}) as never;

export const sourceSchema: z.ZodType<Source, SourceInput> = z.discriminatedUnion(
  'kind',
  [harmonicsSchema, pointsSchema, samplesSchema, mixSchema],
  { error: 'a source of kind "harmonics", "points", "samples" or "mix"' },
) as never;

export const normalisations = ['none', 'peak', 'span'] as const;

export const levelSchema = z.strictObject({
  removeMean: yesOrNo.default(false),
  normalise: oneOf(normalisations).default('peak'),
  level: numberBetween(0, 1).default(1),
  transfer: z
    .union(
      [
        z.literal('none'),
        z.literal('cie-lightness'),
        z.strictObject({ gamma: numberBetween(limits.gamma.min, limits.gamma.max) }),
      ],
      {
        error: `"none", "cie-lightness" or { "gamma": a number from ${limits.gamma.min} to ${limits.gamma.max} }`,
      },
    )
    .default('none'),
});

export const roundings = ['half-up', 'half-even', 'down'] as const;
export const dithers = ['none', 'rectangular', 'triangular'] as const;
export const codings = ['offset-binary', 'twos-complement'] as const;
export const ranges = ['bipolar', 'unipolar'] as const;
export const scales = ['full-span', 'mid-tread'] as const;
export const samplings = ['start', 'centre'] as const;
export const folds = ['none', 'quarter'] as const;

const phaseError = 'a number of degrees from 0 up to, not including, 360';

export const tableSchema = z.strictObject({
  length: wholeNumber(limits.tableLength).default(256),
  bits: wholeNumber(limits.bits).default(8),
  cycles: wholeNumber(limits.cycles).default(1),
  startPhaseDeg: z
    .number({ error: phaseError })
    .min(0, { error: phaseError })
    .lt(360, { error: phaseError })
    .default(0),
  sampleAt: oneOf(samplings).default('start'),
  range: oneOf(ranges).default('bipolar'),
  scale: oneOf(scales).default('full-span'),
  rounding: oneOf(roundings).default('half-up'),
  dither: oneOf(dithers).default('none'),
  seed: wholeNumber(limits.seed).default(1),
  shaping: z.literal([0, 1, 2], { error: 'error-feedback order 0, 1 or 2' }).default(0),
  coding: oneOf(codings).default('offset-binary'),
  complement: yesOrNo.default(false),
  fold: oneOf(folds).default('none'),
  /** Measured voltages by code, before complement; 2^bits of them. */
  levels: listOf(anyNumber, { min: 2, max: 2 ** limits.bits.max }, 'voltages').optional(),
});

const nameError = `${limits.nameLength.min} to ${limits.nameLength.max} characters`;
const nameField = z
  .string({ error: nameError })
  .min(limits.nameLength.min, { error: nameError })
  .max(limits.nameLength.max, { error: nameError })
  // Half a surrogate pair has no UTF-8 form, so no digest (RFC 8785 §3.2.2.2).
  .regex(/^\P{Cs}*$/u, { error: 'whole characters, no half of a surrogate pair' });

export const definitionSchema = z.strictObject({
  schema: z.literal(1, { error: '1' }),
  name: nameField,
  source: sourceSchema,
  level: levelSchema.prefault({}),
  table: tableSchema.prefault({}),
});

/** A definition as parsed: every default filled in, every rule of §1 kept. */
export type Definition = z.infer<typeof definitionSchema>;
export type DefinitionInput = z.input<typeof definitionSchema>;
export type LevelSettings = z.infer<typeof levelSchema>;
export type TableSettings = z.infer<typeof tableSchema>;
export type Transfer = LevelSettings['transfer'];
