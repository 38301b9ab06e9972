import type { MailboxMessage, MailboxSummary } from '../../../shared/contract/index.ts';
import type { MessageRow } from './queries.ts';

export const presentSummary = (
  row: Pick<MessageRow, 'id' | 'recipient' | 'subject' | 'receivedAt'>,
): MailboxSummary => ({
  id: row.id,
  to: row.recipient,
  subject: row.subject,
  receivedAt: row.receivedAt.toISOString(),
});

export const presentMessage = (row: MessageRow): MailboxMessage => ({
  ...presentSummary(row),
  from: row.sender,
  text: row.textBody,
  html: row.htmlBody,
});
