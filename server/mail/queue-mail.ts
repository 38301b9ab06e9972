import { randomBytes } from 'node:crypto';
import type { Executor } from '../db/client.ts';
import { mailOutbox } from '../db/schema/index.ts';
import { writeLetter, type Letter } from './letter.ts';

/**
 * Puts a letter into the outbox, in the transaction of its cause: either both happen or neither. Answers the mail's
 * number. The Message-ID is fixed here, so that a mail sent twice after a crash is known as one.
 */
export async function queueMail(
  transaction: Executor,
  origin: string,
  to: string,
  letter: Letter,
): Promise<number> {
  const { subject, text, html } = writeLetter(letter);
  const [{ id }] = await transaction
    .insert(mailOutbox)
    .values({
      messageId: `<${randomBytes(16).toString('hex')}@${mailDomain(origin)}>`,
      recipient: to,
      subject,
      textBody: text,
      htmlBody: html,
      dueAt: new Date(),
    })
    .$returningId();
  return id;
}

/** The host of our address as mail takes it: an address in numbers is no domain. */
export function mailDomain(origin: string): string {
  const { hostname } = new URL(origin);
  return /^[\d.]+$|^\[/.test(hostname) ? 'localhost' : hostname;
}
