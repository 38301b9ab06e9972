import { z } from 'zod';
import type { Definition } from './definition.ts';
import { cursorField, momentField, noteField, pageOf, slugField, tagField, tagsField, titleField } from './fields.ts';
import { reportSchema, warningSchema } from './report.ts';

export const revisionStates = ['draft', 'in-review', 'vetted', 'returned', 'withdrawn'] as const;
export const revisionStateField = z.enum(revisionStates);
export type RevisionState = z.infer<typeof revisionStateField>;

/** How the wave was listened to; kept beside the definition, not part of it. */
export const playbackSettingsSchema = z.strictObject({
  mode: z.enum(['loop', 'once']),
  by: z.enum(['tone', 'sampleRate']),
  toneHz: z.number().positive(),
  sampleRateHz: z.number().positive(),
});

/** A definition on its way in: `parseDefinition` says precisely what is wrong with it. */
const definitionField = z.custom<Definition>((value) => typeof value === 'object' && value !== null, {
  error: 'a definition',
});

/** Lowest and highest code, as shares 0…255 of full scale, in each of at most 64 columns of the drawing. */
export const drawingSchema = z.strictObject({
  low: z.array(z.int().min(0).max(255)),
  high: z.array(z.int().min(0).max(255)),
});
export type Drawing = z.infer<typeof drawingSchema>;

const personSchema = z.strictObject({ id: z.int().nullable(), name: z.string() });

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
  search: z.string().trim().max(100).optional(),
  tag: tagField.optional(),
  state: revisionStateField.optional(),
  archived: z.enum(['no', 'yes']).default('no'),
  sort: z.enum(tableSorts).default('changed'),
  direction: z.enum(sortDirections).default('desc'),
  cursor: cursorField.optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
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
  digest: z.string(),
  engineVersion: z.string(),
  madeBy: personSchema,
  madeAt: momentField,
});
export type RevisionSummary = z.infer<typeof revisionSummarySchema>;
export const revisionsPageSchema = pageOf(revisionSummarySchema);

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
  revisions: z.array(revisionSummarySchema),
  moreRevisions: z.boolean(),
});
export type LibraryTable = z.infer<typeof libraryTableSchema>;

export const createTableSchema = z.strictObject({
  title: titleField,
  tags: tagsField.default([]),
  definition: definitionField,
  playback: playbackSettingsSchema.nullable().default(null),
  note: noteField.default(''),
});
export const createRevisionSchema = createTableSchema.omit({ title: true, tags: true });
export const changeTableSchema = z.strictObject({ title: titleField.optional(), tags: tagsField.optional() });
export const duplicateTableSchema = z.strictObject({ title: titleField.optional(), revision: z.int().optional() });
export const tagsListSchema = z.strictObject({ tags: z.array(z.strictObject({ tag: z.string(), tables: z.int() })) });
