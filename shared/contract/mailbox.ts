import { z } from 'zod';
import { cursorField, momentField, pageOf } from './fields.ts';

/** A mail in the readable mailbox, which is there only on one's own machine with the private database. */
export const mailboxSummarySchema = z.strictObject({
  id: z.int(),
  to: z.string(),
  subject: z.string(),
  receivedAt: momentField,
});
export type MailboxSummary = z.infer<typeof mailboxSummarySchema>;
export const mailboxQuerySchema = z.strictObject({ cursor: cursorField.optional() });
export const mailboxPageSchema = pageOf(mailboxSummarySchema);

export const mailboxMessageSchema = mailboxSummarySchema.extend({
  from: z.string(),
  text: z.string(),
  /** As it was sent: show it in a frame without scripts, or not at all. */
  html: z.string(),
});
export type MailboxMessage = z.infer<typeof mailboxMessageSchema>;
