import { index, mediumtext, mysqlEnum, mysqlTable, text, tinyint, varchar } from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, moment } from './columns.ts';

export const mailStates = ['waiting', 'sent', 'undelivered'] as const;

/** Mail on its way out, written in the transaction of its cause. */
export const mailOutbox = mysqlTable(
  'mail_outbox',
  {
    id: id(),
    /** Fixed before the first try, so that a mail sent twice is known as one. */
    messageId: exactText(300, 'message_id').notNull().unique(),
    recipient: exactText(254).notNull(),
    subject: varchar({ length: 200 }).notNull(),
    /** Both bodies are erased once it is delivered or given up: they may hold a link. */
    textBody: text('text_body'),
    htmlBody: text('html_body'),
    /** Where one request ends mail of its kind (RFC 8058); erased like the bodies. Null: it cannot be ended. */
    unsubscribeUrl: varchar('unsubscribe_url', { length: 500 }),
    state: mysqlEnum(mailStates).notNull().default('waiting'),
    failures: tinyint({ unsigned: true }).notNull().default(0),
    lastError: varchar('last_error', { length: 500 }),
    /** Not before this moment. */
    dueAt: moment('due_at').notNull(),
    /** While this lies ahead, one worker has it in hand. */
    claimedUntil: moment('claimed_until'),
    createdAt: createdAt(),
    sentAt: moment('sent_at'),
  },
  (table) => [index('mail_outbox_due').on(table.state, table.dueAt)],
);

/** Mail that came to the readable mailbox of this machine; filled only with the private database. */
export const mailboxMessages = mysqlTable('mailbox_messages', {
  id: id(),
  /** A mail sent twice arrives once. */
  messageId: exactText(300, 'message_id').notNull().unique(),
  recipient: exactText(254).notNull(),
  sender: varchar({ length: 300 }).notNull(),
  subject: varchar({ length: 300 }).notNull(),
  textBody: mediumtext('text_body').notNull(),
  htmlBody: mediumtext('html_body').notNull(),
  receivedAt: moment('received_at').notNull(),
});
