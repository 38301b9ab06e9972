import { z } from 'zod';
import type { Definition } from './definition.ts';
import {
  cursorField,
  momentField,
  noteField,
  pageOf,
  slugField,
  tagField,
  tagsField,
  titleField,
} from './fields.ts';
import { limits } from './limits.ts';
import { pulsePatternSchema } from './pulse-pattern.ts';
import { digestSchema } from './rendering.ts';
import { reportSchema, warningSchema } from './report.ts';

const oneOf = <const Values extends readonly [string, ...string[]]>(values: Values) =>
  z.enum(values, { error: `one of ${values.map((value) => `"${value}"`).join(', ')}` });

const wholeNumber = (min: number, max: number) => {
  const error = `a whole number from ${min} to ${max}`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

/** The same in an address, where all is text. */
export const wholeNumberText = (min: number, max: number) => {
  const error = `a whole number from ${min} to ${max}`;
  return z
    .string({ error })
    .regex(/^\d{1,6}$/, { error })
    .transform(Number)
    .pipe(wholeNumber(min, max));
};

export const revisionStates = ['draft', 'in-review', 'vetted', 'returned', 'withdrawn'] as const;
export const revisionStateField = oneOf(revisionStates);
export type RevisionState = z.infer<typeof revisionStateField>;

const frequencyField = z
  .number({ error: 'a frequency above 0 Hz' })
  .positive({ error: 'a frequency above 0 Hz' });

/** How the wave was listened to; kept beside the definition, not part of it. */
export const playbackSettingsSchema = z.strictObject({
  /** `accumulator` counts where one is chosen and the table's length is a power of two; else it is a loop. */
  mode: oneOf(['loop', 'once', 'accumulator']),
  by: oneOf(['tone', 'sampleRate']),
  toneHz: frequencyField,
  sampleRateHz: frequencyField,
  /** The timer settings that the sample rate was chosen by: `clock/(prescaler·(compare + 1))`. */
  timer: z
    .strictObject({
      clockHz: frequencyField,
      prescaler: wholeNumber(1, 65_536),
      compare: wholeNumber(0, 2 ** 32 - 1),
    })
    .optional(),
  /** Bits and step word of the phase accumulator that plays the table. */
  accumulator: z
    .strictObject({ accumulatorBits: wholeNumber(1, 48), stepWord: wholeNumber(1, 2 ** 48 - 1) })
    .optional(),
  /** Pulses and pauses that the tone sounds in. */
  pattern: pulsePatternSchema.optional(),
});

/** A definition on its way in: `parseDefinition` says precisely what is wrong with it. */
export const definitionField = z.custom<Definition>((value) => typeof value === 'object' && value !== null, {
  error: 'a definition',
});

/** Lowest and highest code, as shares 0…255 of full scale, in each of at most 64 columns of the drawing. */
export const drawingSchema = z.strictObject({
  low: z.array(z.int().min(0).max(255)),
  high: z.array(z.int().min(0).max(255)),
});
export type Drawing = z.infer<typeof drawingSchema>;

export const personSchema = z.strictObject({ id: z.int().nullable(), name: z.string() });

/** A row of the tables list: the table with its latest revision. */
export const tableSummarySchema = z.strictObject({
  slug: slugField,
  title: titleField,
  tags: z.array(z.string()),
  isArchived: z.boolean(),
  latestRevision: z.int(),
  state: revisionStateField,
  bits: z.int(),
  length: z.int(),
  snrDb: z.number().nullable(),
  tableBytes: z.int(),
  drawing: drawingSchema,
  changedBy: personSchema,
  changedAt: momentField,
});
export type TableSummary = z.infer<typeof tableSummarySchema>;

export const tableSorts = ['changed', 'title', 'snr', 'bytes', 'length', 'bits'] as const;
export const sortDirections = ['asc', 'desc'] as const;

/** Query of the tables list; the client's address bar holds the same names. */
export const tablesQuerySchema = z.strictObject({
  /** Beginnings of words of title or tags, in any order; case and accents do not count. */
  search: z.string({ error: 'text' }).trim().max(100, { error: 'at most 100 characters' }).optional(),
  tag: tagField.optional(),
  /** Of the newest revision. */
  state: revisionStateField.optional(),
  archived: oneOf(['no', 'yes']).default('no'),
  sort: oneOf(tableSorts).default('changed'),
  direction: oneOf(sortDirections).default('desc'),
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(50),
});
export type TablesQuery = z.infer<typeof tablesQuerySchema>;
export const tablesPageSchema = pageOf(tableSummarySchema);

export const revisionSummarySchema = z.strictObject({
  number: z.int(),
  state: revisionStateField,
  note: z.string(),
  bits: z.int(),
  length: z.int(),
  snrDb: z.number().nullable(),
  tableBytes: z.int(),
  digest: digestSchema,
  engineVersion: z.string(),
  madeBy: personSchema,
  madeAt: momentField,
});
export type RevisionSummary = z.infer<typeof revisionSummarySchema>;
/** Newest first. */
export const revisionsPageSchema = pageOf(revisionSummarySchema);
export const revisionsQuerySchema = z.strictObject({
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(50),
});
export const revisionNumberField = wholeNumberText(1, limits.revisionsPerTable);

/** A whole revision; never changes but for its state. */
export const revisionSchema = revisionSummarySchema.extend({
  definition: definitionField,
  playback: playbackSettingsSchema.nullable(),
  report: reportSchema,
  warnings: z.array(warningSchema),
  codes: z.array(z.int()),
});
export type Revision = z.infer<typeof revisionSchema>;

/** A table with its newest revisions; the ETag of this answer is what If-Match wants. */
export const libraryTableSchema = tableSummarySchema.extend({
  createdAt: momentField,
  createdBy: personSchema,
  version: z.int(),
  /** The newest ones, newest first. */
  revisions: z.array(revisionSummarySchema),
  moreRevisions: z.boolean(),
  revisionsAtMost: z.int(),
});
export type LibraryTable = z.infer<typeof libraryTableSchema>;

export const createTableSchema = z.strictObject({
  title: titleField,
  tags: tagsField.default([]),
  definition: definitionField,
  playback: playbackSettingsSchema.nullable().default(null),
  note: noteField.default(''),
});
export type CreateTable = z.infer<typeof createTableSchema>;
export const createRevisionSchema = createTableSchema.omit({ title: true, tags: true });
export type CreateRevision = z.infer<typeof createRevisionSchema>;
export const changeTableSchema = z.strictObject({ title: titleField.optional(), tags: tagsField.optional() });
export type ChangeTable = z.infer<typeof changeTableSchema>;
export const duplicateTableSchema = z.strictObject({
  /** The old title with "copy" behind it, if not given. */
  title: titleField.optional(),
  /** The newest one, if not given. */
  revision: wholeNumber(1, limits.revisionsPerTable).optional(),
});
export type DuplicateTable = z.infer<typeof duplicateTableSchema>;
/** How many tables that are not archived have each tag. */
export const tagsListSchema = z.strictObject({
  tags: z.array(z.strictObject({ tag: z.string(), tables: z.int() })),
});

/** Query of an export. Every other name is an option of the target. */
export const exportQuerySchema = z.looseObject({
  target: z.string({ error: 'the name of a target' }),
  /** Answer this file alone, as an attachment. */
  file: z.string({ error: 'the name of a file of the export' }).optional(),
});
export type ExportQuery = z.infer<typeof exportQuerySchema>;
