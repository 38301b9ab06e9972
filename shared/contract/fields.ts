import { z } from 'zod';

// Fields that several resources share. Each error text says what is allowed.

const textField = (min: number, max: number) => {
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

/** Lower case, as addresses are compared. 254 characters at most (RFC 5321 §4.5.3.1.3). */
export const emailField = z
  .string({ error: 'an e-mail address' })
  .trim()
  .toLowerCase()
  .max(254, { error: 'at most 254 characters' })
  .pipe(z.email({ error: 'an e-mail address, as name@host.example' }));

/** NIST SP 800-63B: length is what counts; nothing else is asked for. */
const passwordError = '10 to 200 characters';
export const passwordField = z
  .string({ error: passwordError })
  .min(10, { error: passwordError })
  .max(200, { error: passwordError });

/** 256 random bits in base64url. */
export const linkTokenField = z
  .string({ error: 'the token of a mailed link' })
  .regex(/^[\w-]{43}$/, { error: 'the token of a mailed link' });

export const personNameField = textField(1, 100);
export const teamNameField = textField(1, 100);
export const titleField = textField(1, 64);
export const noteField = textField(0, 2_000);

/** Lower-case words joined by hyphens; part of addresses and of lock files. */
export const slugField = z
  .string({ error: 'lower-case letters, digits and hyphens' })
  .regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, { error: 'lower-case letters, digits and single hyphens between them' })
  .max(60, { error: 'at most 60 characters' });

export const tagField = z
  .string({ error: 'a tag' })
  .trim()
  .toLowerCase()
  .regex(/^[\p{L}\p{N}][\p{L}\p{N} ._-]*$/u, { error: 'letters, digits, spaces, dots, hyphens' })
  .max(32, { error: 'at most 32 characters' });

export const tagsField = z
  .array(tagField, { error: 'a list of tags' })
  .max(12, { error: 'at most 12 tags' })
  .transform((tags) => [...new Set(tags)].sort());

export const momentField = z.iso.datetime();

/** Where the next page begins; opaque, and only good for the same filters and order. */
export const cursorField = z.string({ error: 'a nextCursor' }).max(1_000, { error: 'a nextCursor' });

export const pageOf = <Item extends z.ZodType>(item: Item) =>
  z.strictObject({ items: z.array(item), nextCursor: cursorField.nullable() });
