import { randomBytes } from 'node:crypto';
import type { Executor } from '../db/client.ts';
import { mailOutbox } from '../db/schema/index.ts';
import { writeLetter, type Letter } from './letter.ts';

/**
 * Puts a letter into the outbox, in the transaction of its cause: either both happen or neither. Answers the mail's
 * number.
 */
export async function queueMail(
  transaction: Executor,
  origin: string,
  to: string,
  letter: Letter,
): Promise<number> {
  const [{ id }] = await transaction.insert(mailOutbox).values(rowOf(origin, { to, letter })).$returningId();
  return id;
}

export interface QueuedMail {
  readonly to: string;
  readonly letter: Letter;
  /** Where one request without a sign-in ends mail of this kind. */
  readonly unsubscribeUrl?: string;
}

/** The same for any number of mails, in one go. */
export async function queueMails(
  transaction: Executor,
  origin: string,
  mails: readonly QueuedMail[],
): Promise<void> {
  if (mails.length === 0) return;
  await transaction.insert(mailOutbox).values(mails.map((mail) => rowOf(origin, mail)));
}

/** The Message-ID is fixed here, so that a mail sent twice after a crash is known as one. */
function rowOf(origin: string, { to, letter, unsubscribeUrl }: QueuedMail): typeof mailOutbox.$inferInsert {
  const { subject, text, html } = writeLetter(letter);
  return {
    messageId: `<${randomBytes(16).toString('hex')}@${mailDomain(origin)}>`,
    recipient: to,
    subject,
    textBody: text,
    htmlBody: html,
    unsubscribeUrl,
    dueAt: new Date(),
  };
}

/** The host of our address as mail takes it: an address in numbers is no domain. */
export function mailDomain(origin: string): string {
  const { hostname } = new URL(origin);
  return /^[\d.]+$|^\[/.test(hostname) ? 'localhost' : hostname;
}
