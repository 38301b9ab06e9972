import { z } from 'zod';

const figure = z.number().nullable();

/** A step of the table at which the most bits change at once. */
export const worstToggleSchema = z.strictObject({
  bits: z.int(),
  index: z.int(),
  from: z.int(),
  to: z.int(),
});

/** Figures of a table (engine specification §4). A figure that does not exist is `null`. */
export const reportSchema = z.strictObject({
  snrDb: figure,
  idealSnrDb: z.number(),
  /** Whether the codes stand for the levelled cycle without any error. */
  exact: z.boolean(),
  meanErrorLsb: z.number(),
  rmsErrorLsb: z.number(),
  peakErrorLsb: z.number(),
  mean: z.number(),
  rms: z.number(),
  crestFactor: figure,
  minCode: z.int(),
  maxCode: z.int(),
  usedCodes: z.int(),
  clippedSamples: z.int(),
  clippedCodes: z.int(),
  sinadDb: figure,
  enobBits: figure,
  thdDb: figure,
  thdPercent: figure,
  sfdrDb: figure,
  unwantedDb: figure,
  tableBytes: z.int(),
  meanToggles: z.number(),
  worstToggle: worstToggleSchema,
});

export const warningSchema = z.strictObject({
  code: z.enum(['partial-above-nyquist', 'clipped', 'shaping-seam']),
  /** Field the warning is about. */
  path: z.string(),
  message: z.string(),
});

export type Report = z.infer<typeof reportSchema>;
export type WorstToggle = z.infer<typeof worstToggleSchema>;
export type Warning = z.infer<typeof warningSchema>;
