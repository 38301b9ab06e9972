import { z } from 'zod';
import {
  emailField,
  linkTokenField,
  momentField,
  pageOf,
  passwordField,
  personNameField,
  slugField,
} from './fields.ts';
import { roleField } from './teams.ts';

export const signUpSchema = z.strictObject({
  name: personNameField,
  email: emailField,
  password: passwordField,
});
export const emailOnlySchema = z.strictObject({ email: emailField });
export const tokenOnlySchema = z.strictObject({ token: linkTokenField });
export const resetPasswordSchema = z.strictObject({ token: linkTokenField, password: passwordField });
/** Limits of today's password are not asked of the one typed to prove who one is. */
const currentPasswordField = z
  .string({ error: 'your password' })
  .min(1, { error: 'your password' })
  .max(200, { error: 'your password' });
export const changePasswordSchema = z.strictObject({
  currentPassword: currentPasswordField,
  newPassword: passwordField,
});
export const changeAddressSchema = z.strictObject({
  currentPassword: currentPasswordField,
  email: emailField,
});
export const deleteAccountSchema = z.strictObject({ currentPassword: currentPasswordField });
export const changeAccountSchema = z.strictObject({ name: personNameField });

export const accountSchema = z.strictObject({
  id: z.int(),
  name: personNameField,
  email: z.string(),
  memberships: z.array(z.strictObject({ teamSlug: slugField, teamName: z.string(), role: roleField })),
});
/** Which address a link has proved. */
export const provenAddressSchema = z.strictObject({ email: z.string() });
export type Account = z.infer<typeof accountSchema>;

export const sessionSchema = z.strictObject({
  id: z.string(),
  isThisOne: z.boolean(),
  /** The browser, as it names itself, shortened. */
  client: z.string(),
  createdAt: momentField,
  lastSeenAt: momentField,
  expiresAt: momentField,
});
export type SignInSession = z.infer<typeof sessionSchema>;
export const sessionsPageSchema = pageOf(sessionSchema);
