import { z } from 'zod';
import { limits } from './limits.ts';
import { arrayPrefixField, licenceLineField } from './rendering.ts';
import {
  emailField,
  linkTokenField,
  momentField,
  pageOf,
  personNameField,
  slugField,
  teamNameField,
} from './fields.ts';

/** Each role includes the ones before it. */
export const roles = ['viewer', 'author', 'reviewer', 'admin'] as const;
export const roleField = z.enum(roles, { error: `one of ${roles.join(', ')}` });
export type Role = z.infer<typeof roleField>;

/** Whether a role may do what another one may. */
export function includesRole(held: Role, needed: Role): boolean {
  return roles.indexOf(held) >= roles.indexOf(needed);
}

/** How much one team or person may have; told before it is hit. */
export const teamLimits = {
  teamsOfAPerson: 50,
  members: 200,
  openInvitations: 100,
  tables: 200_000,
  boards: 1_000,
} as const;

const wholeNumber = ({ min, max }: { readonly min: number; readonly max: number }) => {
  const error = `a whole number from ${min} to ${max}`;
  return z.int({ error }).min(min, { error }).max(max, { error });
};

const defaultFields = {
  arrayPrefix: arrayPrefixField,
  licenceLine: licenceLineField,
  bits: wholeNumber(limits.bits),
  length: wholeNumber(limits.tableLength),
  target: z
    .string({ error: 'the name of an export' })
    .regex(/^[a-z0-9-]{1,40}$/, { error: 'the name of an export' }),
};

/** What a new table of the team begins with. */
export const teamDefaultsSchema = z.strictObject({
  arrayPrefix: defaultFields.arrayPrefix.default(''),
  licenceLine: defaultFields.licenceLine.default(''),
  bits: defaultFields.bits.default(8),
  length: defaultFields.length.default(256),
  target: defaultFields.target.default('c99'),
});
export type TeamDefaults = z.infer<typeof teamDefaultsSchema>;

export const teamSummarySchema = z.strictObject({ slug: slugField, name: teamNameField, myRole: roleField });
export type TeamSummary = z.infer<typeof teamSummarySchema>;
export const teamsPageSchema = pageOf(teamSummarySchema);

export const teamSchema = teamSummarySchema.extend({
  defaults: teamDefaultsSchema,
  /** Whether nobody vets, returns or withdraws a revision that they made or submitted. */
  twoPersonRule: z.boolean(),
  /** Limits of size, told before they are hit. */
  usage: z.strictObject({ tables: z.int(), tablesAtMost: z.int() }),
  /** Compared by If-Match on a change. */
  version: z.int(),
});
export type Team = z.infer<typeof teamSchema>;

export const createTeamSchema = z.strictObject({ name: teamNameField, slug: slugField.optional() });
/** What is left out stays as it is, among the defaults too. */
export const changeTeamSchema = z.strictObject({
  name: teamNameField.optional(),
  defaults: z.strictObject(defaultFields).partial().optional(),
  twoPersonRule: z.boolean({ error: 'true or false' }).optional(),
});

export const memberSchema = z.strictObject({
  userId: z.int(),
  name: personNameField,
  email: z.string(),
  role: roleField,
  since: momentField,
});
export type Member = z.infer<typeof memberSchema>;
export const membersPageSchema = pageOf(memberSchema);
export const changeMemberSchema = z.strictObject({ role: roleField });

export const deliveryStates = ['waiting', 'sent', 'undelivered'] as const;

export const invitationSchema = z.strictObject({
  id: z.int(),
  email: z.string(),
  role: roleField,
  /** Null where that account is gone. */
  invitedBy: z.string().nullable(),
  /** How far its mail has come. */
  delivery: z.enum(deliveryStates),
  createdAt: momentField,
  expiresAt: momentField,
});
export type Invitation = z.infer<typeof invitationSchema>;
export const invitationsPageSchema = pageOf(invitationSchema);
export const inviteSchema = z.strictObject({ email: emailField, role: roleField });
export const invitationTokenSchema = z.strictObject({ token: linkTokenField });
/** What the holder of an invitation's link is shown before accepting it. */
export const openInvitationSchema = z.strictObject({
  teamName: teamNameField,
  teamSlug: slugField,
  role: roleField,
  email: z.string(),
});
export type OpenInvitation = z.infer<typeof openInvitationSchema>;
