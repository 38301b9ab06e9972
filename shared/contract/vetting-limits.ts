import { z } from 'zod';
import { tagField } from './fields.ts';
import { limits } from './limits.ts';

const between = (min: number, max: number, unit: string) => {
  const error = `a number from ${min} to ${max}${unit && ` ${unit}`}`;
  return z.number({ error }).min(min, { error }).max(max, { error });
};

const wholeBetween = (min: number, max: number, unit: string) => {
  const error = `a whole number from ${min} to ${max}${unit && ` ${unit}`}`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

const listOf = ({ min, max }: { readonly min: number; readonly max: number }, atMost: number) =>
  z
    .array(wholeBetween(min, max, ''), { error: 'a list of whole numbers' })
    .min(1, { error: 'at least one number' })
    .max(atMost, { error: `at most ${atMost} numbers` })
    .transform((values) => [...new Set(values)].sort((a, b) => a - b));

/** What a table has to keep to be vetted. What is left out is not asked for; figures as in the report (§4). */
export const vettingLimitsSchema = z.strictObject({
  /** `snrDb` at least this, dB. */
  minSnrDb: between(0, 200, 'dB').optional(),
  /** `unwantedDb` at most this, dB. */
  maxUnwantedDb: between(-200, 0, 'dB').optional(),
  /** `peakErrorLsb` at most this, LSB. */
  maxPeakErrorLsb: between(0, 65_536, 'LSB').optional(),
  /** `tableBytes` at most this. */
  maxTableBytes: wholeBetween(1, 131_072, 'bytes').optional(),
  /** |`mean`| at most this, as a share of full scale: direct current after the converter. */
  maxMean: between(0, 1, 'of full scale').optional(),
  /** `clippedSamples` + `clippedCodes` at most this. */
  maxClipped: wholeBetween(0, 65_536, 'entries').optional(),
  /** `worstToggle.bits` at most this. */
  maxWorstToggleBits: wholeBetween(0, 16, 'bits').optional(),
  lengths: listOf(limits.tableLength, 64).optional(),
  bits: listOf(limits.bits, 16).optional(),
});
export type VettingLimits = z.infer<typeof vettingLimitsSchema>;
export type VettingLimit = keyof VettingLimits;

/** Limits of a team: general, or for the tables that have a tag. Both count where both are there. */
export const limitSetSchema = z.strictObject({
  id: z.int(),
  /** Null: general. */
  tag: z.string().nullable(),
  limits: vettingLimitsSchema,
  /** Compared by If-Match on a change. */
  version: z.int(),
});
export type LimitSet = z.infer<typeof limitSetSchema>;
export const limitSetsListSchema = z.strictObject({ limitSets: z.array(limitSetSchema) });

const someLimits = vettingLimitsSchema.refine((value) => Object.values(value).some((x) => x !== undefined), {
  error: 'at least one limit',
});
export const createLimitSetSchema = z.strictObject({
  tag: tagField.nullable(),
  limits: someLimits,
});
export type CreateLimitSet = z.infer<typeof createLimitSetSchema>;
/** The limits as a whole: what is left out is no longer asked for. */
export const changeLimitSetSchema = z.strictObject({ limits: someLimits });
export const limitSetsOfATeam = 100;

/** How a table stands against one limit. */
export const limitOutcomeSchema = z.strictObject({
  limit: vettingLimitsSchema.keyof(),
  /** Whose limit it is: a tag's, or null for the general ones. */
  tag: z.string().nullable(),
  /** What is allowed: a bound, or the list of allowed values. */
  allowed: z.union([z.number(), z.array(z.number())]),
  /** Null where the figure does not exist. */
  measured: z.number().nullable(),
  passed: z.boolean(),
});
export type LimitOutcome = z.infer<typeof limitOutcomeSchema>;
