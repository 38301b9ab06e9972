import { z } from 'zod';
import { reportSchema, warningSchema } from './report.ts';

export const fileEncodings = ['utf-8', 'base64'] as const;

/** A file of an export. */
export const generatedFileSchema = z.strictObject({
  /** Its name, without a folder. */
  name: z.string(),
  /** Its content; lines end in LF unless another line end was asked for. */
  text: z.string(),
  /** How bytes become of the text: `base64` (RFC 4648 §4) where the file is no text. */
  encoding: z.enum(fileEncodings),
});

/** Put before array names that are made from definitions' names; empty, or a C identifier's beginning. */
export const arrayPrefixField = z
  .string({ error: 'text' })
  .max(32, { error: 'at most 32 characters' })
  .regex(/^([A-Za-z](_?[A-Za-z0-9])*_?)?$/, {
    error: 'ASCII letters, digits and single underscores, a letter first; or nothing',
  });

/** A comment line at the top of each exported file, such as an SPDX identifier; empty for none. */
export const licenceLineField = z
  .string({ error: 'text' })
  .max(200, { error: 'at most 200 characters' })
  .regex(/^[^\p{Cc}\p{Surrogate}\u2028\u2029]*$/u, { error: 'one line of text' });

/** SHA-256 over the RFC 8785 canonical JSON of `{ definition, engineVersion, codes }`, in lower-case hexadecimal. */
export const digestSchema = z.string().regex(/^[0-9a-f]{64}$/);

/** What the command line and the API answer of a definition (engine specification §3, §4). */
export const tableReportSchema = z.strictObject({
  /** One code an entry, 0…2^bits − 1, before complement and coding. */
  codes: z.array(z.int()),
  /** The words that are stored (§3.6). */
  stored: z.array(z.int()),
  report: reportSchema,
  /** Amplitudes A_k of what the codes stand for, bins 0…⌊N/2⌋; an amplitude-1 sine is 1. */
  spectrum: z.array(z.number()),
  warnings: z.array(warningSchema),
});

export const reportAnswerSchema = z.strictObject({ ...tableReportSchema.shape, digest: digestSchema });

const anyObject = (error: string) => z.record(z.string(), z.unknown(), { error });

export const renderRequestSchema = z.strictObject({
  /** A definition (§1); its fields are checked by the definition's own schema. */
  definition: z.unknown().refine((value) => value !== undefined, { error: 'a definition' }),
  target: z.string({ error: 'the name of a target' }),
  /** By the target's own schema; every default where left out. */
  options: anyObject('an object of options').default({}),
});

export const renderAnswerSchema = z.strictObject({
  files: z.array(generatedFileSchema),
  digest: digestSchema,
});

export type GeneratedFile = z.infer<typeof generatedFileSchema>;
export type TableReport = z.infer<typeof tableReportSchema>;
export type ReportAnswer = z.infer<typeof reportAnswerSchema>;
export type RenderRequest = z.infer<typeof renderRequestSchema>;
export type RenderAnswer = z.infer<typeof renderAnswerSchema>;
