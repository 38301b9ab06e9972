import { z } from 'zod';
import { cursorField, momentField, pageOf, slugField, titleField } from './fields.ts';
import { personSchema, revisionStateField, wholeNumberText } from './library.ts';
import { limitOutcomeSchema } from './vetting-limits.ts';

const words = (min: number, max: number) => {
  const error = min === 0 ? `at most ${max} characters` : `${min} to ${max} characters`;
  return z
    .string({ error })
    .trim()
    .min(min, { error })
    .max(max, { error })
    .refine((text) => !/\p{Surrogate}/u.test(text), {
      error: 'whole characters, no half of a surrogate pair',
    });
};

/** What a reviewer should look at. */
export const submitRevisionSchema = z.strictObject({ message: words(1, 2_000) });
export type SubmitRevision = z.infer<typeof submitRevisionSchema>;

export const verdicts = ['vetted', 'returned'] as const;
export const verdictField = z.enum(verdicts, { error: 'one of "vetted", "returned"' });
export type Verdict = z.infer<typeof verdictField>;

/** `note`: the reasons where it is returned, or where it is vetted against a failed limit; else it may be empty. */
export const giveVerdictSchema = z.strictObject({
  verdict: verdictField,
  note: words(0, 2_000).default(''),
});
export type GiveVerdict = z.infer<typeof giveVerdictSchema>;

export const withdrawRevisionSchema = z.strictObject({ reason: words(1, 2_000) });
export type WithdrawRevision = z.infer<typeof withdrawRevisionSchema>;

/** Why the one who asks may not do something now; null where they may. */
const hindranceField = z
  .enum(['state', 'role', 'own-revision'])
  .nullable()
  .describe(
    'state: the revision is not in the state for it, or its table is archived; own-revision: the two-person rule',
  );
export type Hindrance = z.infer<typeof hindranceField>;

/** How a revision stands in review. The ETag of this answer is what If-Match wants of verdict and withdrawal. */
export const reviewSchema = z.strictObject({
  tableSlug: slugField,
  tableTitle: titleField,
  tags: z.array(z.string()),
  number: z.int(),
  state: revisionStateField,
  madeBy: personSchema,
  madeAt: momentField,
  submission: z.strictObject({ by: personSchema, at: momentField, message: z.string() }).nullable(),
  verdict: z
    .strictObject({ verdict: verdictField, by: personSchema, at: momentField, note: z.string() })
    .nullable(),
  withdrawal: z.strictObject({ by: personSchema, at: momentField, reason: z.string() }).nullable(),
  /** With a verdict, as they were then; before it, against the team's limits of now. */
  limits: z.array(limitOutcomeSchema),
  /** The last vetted revision of the table before this one: what it is compared with. */
  lastVetted: z.int().nullable(),
  twoPersonRule: z.boolean(),
  /** Whether the one who asks may do it now. */
  hindrances: z.strictObject({ submit: hindranceField, judge: hindranceField, withdraw: hindranceField }),
  /** Compared by If-Match. */
  version: z.int(),
});
export type Review = z.infer<typeof reviewSchema>;

export const reviewShows = ['for-me', 'waiting', 'mine', 'decided'] as const;
/** `for-me`: in review, and I may judge it; `waiting`: all in review; `mine`: submitted by me; `decided`: with a verdict. */
export const reviewsQuerySchema = z.strictObject({
  show: z
    .enum(reviewShows, { error: `one of ${reviewShows.map((show) => `"${show}"`).join(', ')}` })
    .default('for-me'),
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(50),
});
export type ReviewsQuery = z.infer<typeof reviewsQuerySchema>;

/** A row of the Reviews place. Waiting ones: longest waiting first; decided ones and mine: newest first. */
export const reviewSummarySchema = z.strictObject({
  tableSlug: slugField,
  tableTitle: titleField,
  number: z.int(),
  state: revisionStateField,
  submittedBy: personSchema,
  submittedAt: momentField,
  message: z.string(),
  /** Those failed at the time of submission or, with a verdict, as kept with it. */
  failedLimits: z.int(),
  decidedBy: personSchema.nullable(),
  decidedAt: momentField.nullable(),
  mayJudge: z.boolean(),
});
export type ReviewSummary = z.infer<typeof reviewSummarySchema>;
export const reviewsPageSchema = pageOf(reviewSummarySchema).extend({
  /** How many wait for the one who asks. */
  waitingForMe: z.int(),
});

/** A comment on a revision or on one setting of it, named by its path as in refusals: `table.bits`. */
export const createCommentSchema = z.strictObject({
  text: words(1, 2_000),
  path: z
    .string({ error: 'the path of a setting' })
    .max(200, { error: 'at most 200 characters' })
    .regex(/^[A-Za-z][A-Za-z0-9]*(\.[A-Za-z][A-Za-z0-9]*|\[\d+\])*$/, {
      error: 'the path of a setting, as table.bits',
    })
    .nullable()
    .default(null),
});
export type CreateComment = z.infer<typeof createCommentSchema>;
export const commentSchema = z.strictObject({
  id: z.int(),
  by: personSchema,
  at: momentField,
  text: z.string(),
  path: z.string().nullable(),
});
export type Comment = z.infer<typeof commentSchema>;
/** Oldest first. */
export const commentsPageSchema = pageOf(commentSchema);
export const commentsQuerySchema = z.strictObject({
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(100),
});
export const commentsOfARevision = 1_000;
