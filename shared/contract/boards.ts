import { z } from 'zod';
import { boardSchema, type Board } from './board.ts';
import { cursorField, momentField, noteField, pageOf, slugField, titleField } from './fields.ts';
import { personSchema, revisionsQuerySchema, wholeNumberText } from './library.ts';
import { limits } from './limits.ts';
import { oneWordOf } from './number-fields.ts';
import { digestSchema } from './rendering.ts';

export const outputKinds = ['ladder', 'on-chip', 'serial', 'pwm'] as const;

/** A board on its way in: `parseBoard` says precisely what is wrong with it. */
export const boardField = z.custom<Board>((value) => typeof value === 'object' && value !== null, {
  error: 'a board',
});

/** A row of the boards list: the board with its newest revision. */
export const boardSummarySchema = z.strictObject({
  slug: slugField,
  name: titleField,
  outputKind: z.enum(outputKinds),
  bits: z.int(),
  isRetired: z.boolean(),
  latestRevision: z.int(),
  changedBy: personSchema,
  changedAt: momentField,
});
export type BoardSummary = z.infer<typeof boardSummarySchema>;

/** By name, then by age. */
export const boardsQuerySchema = z.strictObject({
  retired: oneWordOf(['no', 'yes']).default('no'),
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(50),
});
export type BoardsQuery = z.infer<typeof boardsQuerySchema>;
export const boardsPageSchema = pageOf(boardSummarySchema);

export const boardRevisionSummarySchema = z.strictObject({
  number: z.int(),
  note: z.string(),
  outputKind: z.enum(outputKinds),
  bits: z.int(),
  /** SHA-256 over the board's canonical JSON (RFC 8785). */
  digest: digestSchema,
  madeBy: personSchema,
  madeAt: momentField,
});
export type BoardRevisionSummary = z.infer<typeof boardRevisionSummarySchema>;
/** Newest first. */
export const boardRevisionsPageSchema = pageOf(boardRevisionSummarySchema);
export const boardRevisionsQuerySchema = revisionsQuerySchema;
export const boardRevisionNumberField = wholeNumberText(1, limits.revisionsPerBoard);

/** A whole revision; never changes. */
export const boardRevisionSchema = boardRevisionSummarySchema.extend({ board: boardSchema });
export type BoardRevision = z.infer<typeof boardRevisionSchema>;

/** A board as it is now; the ETag of this answer is what If-Match wants. */
export const libraryBoardSchema = boardSummarySchema.extend({
  createdAt: momentField,
  createdBy: personSchema,
  version: z.int(),
  /** Of the newest revision. */
  board: boardSchema,
  /** The newest ones, newest first. */
  revisions: z.array(boardRevisionSummarySchema),
  moreRevisions: z.boolean(),
  revisionsAtMost: z.int(),
});
export type LibraryBoard = z.infer<typeof libraryBoardSchema>;

/** Its name is the board's own. */
export const createBoardSchema = z.strictObject({ board: boardField, note: noteField.default('') });
export type CreateBoard = z.infer<typeof createBoardSchema>;
export const reviseBoardSchema = createBoardSchema;

export const copyBoardSchema = z.strictObject({
  /** The name of the copy; the other one’s with “copy” behind it where absent. */
  name: titleField.optional(),
  /** The newest where absent. */
  revision: z
    .int({ error: `a whole number from 1 to ${limits.revisionsPerBoard}` })
    .min(1, { error: `a whole number from 1 to ${limits.revisionsPerBoard}` })
    .max(limits.revisionsPerBoard, { error: `a whole number from 1 to ${limits.revisionsPerBoard}` })
    .optional(),
});
export type CopyBoard = z.infer<typeof copyBoardSchema>;
