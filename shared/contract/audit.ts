import { z } from 'zod';
import { cursorField, momentField, pageOf } from './fields.ts';
import { wholeNumberText } from './library.ts';

const dayError = 'a day, as 2026-03-31';
const actionError = 'an action, as revision.vetted, or its beginning, as revision.';

/** What is noted of a team, every kind of it; a new one needs its words on the audit page. */
export const auditActions = [
  'team.created',
  'team.changed',
  'member.invited',
  'member.joined',
  'member.role-changed',
  'member.left',
  'member.removed',
  'invitation.withdrawn',
  'table.created',
  'table.changed',
  'table.duplicated',
  'table.archived',
  'table.restored',
  'revision.saved',
  'revision.submitted',
  'revision.vetted',
  'revision.returned',
  'revision.withdrawn',
  'comment.added',
  'original.kept',
  'original.removed',
  'limits.created',
  'limits.changed',
  'limits.deleted',
  'board.created',
  'board.revised',
  'board.copied',
  'board.retired',
  'board.restored',
] as const;
export type AuditAction = (typeof auditActions)[number];

/** All filters hold together. Days are UTC, both included. */
export const auditFiltersSchema = z.strictObject({
  /** Id of the member who did it. */
  actor: z
    .string({ error: 'the id of a person' })
    .regex(/^\d{1,15}$/, { error: 'the id of a person' })
    .transform(Number)
    .optional(),
  /** A whole action, `revision.vetted`, or with its dot what it begins with, `revision.`. */
  action: z
    .string({ error: actionError })
    .regex(/^[a-z-]+\.[a-z-]*$/, { error: actionError })
    .max(60, { error: 'at most 60 characters' })
    .optional(),
  /** What it was done to: `table:fog-signal`. */
  subject: z
    .string({ error: 'text' })
    .min(1, { error: 'a subject, as table:fog-signal' })
    .max(160, { error: 'at most 160 characters' })
    .optional(),
  from: z.iso.date({ error: dayError }).optional(),
  to: z.iso.date({ error: dayError }).optional(),
});
export type AuditFilters = z.infer<typeof auditFiltersSchema>;
export const auditQuerySchema = auditFiltersSchema.extend({
  cursor: cursorField.optional(),
  limit: wholeNumberText(1, 100).default(50),
});
export type AuditQuery = z.infer<typeof auditQuerySchema>;

export const auditEventSchema = z.strictObject({
  sequence: z.int(),
  at: momentField,
  actor: z.strictObject({ id: z.int(), name: z.string() }),
  /** One of `auditActions`, or one of another version of the program. */
  action: z.string(),
  subject: z.string(),
  details: z.record(z.string(), z.unknown()),
});
export type AuditEvent = z.infer<typeof auditEventSchema>;
/** Newest first. */
export const auditPageSchema = pageOf(auditEventSchema);
