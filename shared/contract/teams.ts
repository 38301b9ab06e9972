import { z } from 'zod';
import { limits } from './limits.ts';
import { emailField, linkTokenField, momentField, personNameField, slugField, teamNameField } from './fields.ts';

/** Each role includes the ones before it. */
export const roles = ['viewer', 'author', 'reviewer', 'admin'] as const;
export const roleField = z.enum(roles, { error: `one of ${roles.join(', ')}` });
export type Role = z.infer<typeof roleField>;

/** Whether a role may do what another one may. */
export function includesRole(held: Role, needed: Role): boolean {
  return roles.indexOf(held) >= roles.indexOf(needed);
}

/** What a new table of the team begins with. */
export const teamDefaultsSchema = z.strictObject({
  /** Put before array names on export; empty, or a C identifier's beginning. */
  arrayPrefix: z
    .string()
    .max(32, { error: 'at most 32 characters' })
    .regex(/^([A-Za-z][A-Za-z0-9_]*)?$/, { error: 'letters, digits and underscores, a letter first; or nothing' })
    .default(''),
  /** A comment line at the top of each exported file, such as an SPDX identifier. */
  licenceLine: z
    .string()
    .max(200, { error: 'at most 200 characters' })
    .regex(/^[^\p{Cc}\u2028\u2029]*$/u, { error: 'one line of text' })
    .default(''),
  bits: z.int().min(limits.bits.min).max(limits.bits.max).default(8),
  length: z.int().min(limits.tableLength.min).max(limits.tableLength.max).default(256),
  target: z.string().max(40).default('c99'),
});
export type TeamDefaults = z.infer<typeof teamDefaultsSchema>;

export const teamSchema = z.strictObject({
  slug: slugField,
  name: teamNameField,
  myRole: roleField,
  defaults: teamDefaultsSchema,
  /** Limits of size, told before they are hit. */
  usage: z.strictObject({ tables: z.int(), tablesAtMost: z.int() }),
  /** Compared by If-Match on a change. */
  version: z.int(),
});
export type Team = z.infer<typeof teamSchema>;

export const createTeamSchema = z.strictObject({ name: teamNameField, slug: slugField.optional() });
export const changeTeamSchema = z.strictObject({
  name: teamNameField.optional(),
  defaults: teamDefaultsSchema.optional(),
});

export const memberSchema = z.strictObject({
  userId: z.int(),
  name: personNameField,
  email: z.string(),
  role: roleField,
  since: momentField,
});
export type Member = z.infer<typeof memberSchema>;
export const changeMemberSchema = z.strictObject({ role: roleField });

export const invitationSchema = z.strictObject({
  id: z.int(),
  email: z.string(),
  role: roleField,
  invitedBy: z.string(),
  createdAt: momentField,
  expiresAt: momentField,
});
export type Invitation = z.infer<typeof invitationSchema>;
export const inviteSchema = z.strictObject({ email: emailField, role: roleField });
export const invitationTokenSchema = z.strictObject({ token: linkTokenField });
/** What the holder of an invitation's link is shown before accepting it. */
export const openInvitationSchema = z.strictObject({
  teamName: teamNameField,
  teamSlug: slugField,
  role: roleField,
  email: z.string(),
});
