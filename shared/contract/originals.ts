import { z } from 'zod';
import { momentField } from './fields.ts';
import { personSchema } from './library.ts';

/** Bounds of the files that revisions were made from. */
export const originalLimits = {
  /** One file, in bytes. */
  bytes: 8 * 1024 * 1024,
  /** All of a team's, in bytes. */
  teamBytes: 500 * 1024 * 1024,
  perRevision: 20,
  nameLength: 120,
} as const;

/** What a file was found to be by what is in it. */
export const originalKinds = ['recording', 'columns', 'c', 'assembly', 'intel-hex'] as const;
export type OriginalKind = (typeof originalKinds)[number];

const nameError = `a file name of 1 to ${originalLimits.nameLength} characters, without / or \\`;

export const originalQuerySchema = z.strictObject({
  /** As the person's own file is called. */
  name: z
    .string({ error: nameError })
    .trim()
    .min(1, { error: nameError })
    .max(originalLimits.nameLength, { error: nameError })
    .regex(/^[^/\\\p{Cc}\p{Cs}\u2028\u2029]*$/u, { error: nameError }),
});

/** A file that a revision was made from, kept as it came. */
export const originalSchema = z.strictObject({
  id: z.int(),
  name: z.string(),
  kind: z.enum(originalKinds),
  bytes: z.int(),
  /** In hex. */
  sha256: z.string(),
  keptBy: personSchema,
  keptAt: momentField,
});

export const originalsListSchema = z.strictObject({
  items: z.array(originalSchema),
  /** What the team's originals take in all, and how much they may. */
  teamBytes: z.int(),
  teamBytesAtMost: z.int(),
});

export type Original = z.infer<typeof originalSchema>;
export type OriginalsList = z.infer<typeof originalsListSchema>;
