import { setTimeout as delay } from 'node:timers/promises';
import { and, asc, eq, isNull, lte, or } from 'drizzle-orm';
import type { Logger } from 'pino';
import type { Database } from '../db/client.ts';
import { mailOutbox } from '../db/schema/index.ts';
import { withTransaction } from '../db/transaction.ts';
import { sendTimeout, type SendMail } from './transport.ts';

export interface MailWorkerOptions {
  readonly db: Database;
  readonly send: SendMail;
  readonly logger: Logger;
  /** How long it rests when nothing is due, in ms. */
  readonly pauseMs?: number;
  /** How long a mail stays with one worker, in ms; longer than sending can take. */
  readonly claimMs?: number;
  /** How long to wait after so many failures, in ms. */
  readonly backOff?: (failures: number) => number;
}

export interface MailWorker {
  /** Finishes the mail in hand and stops. */
  close(): Promise<void>;
}

/** After the eighth failure a mail is given up; with the pauses below that takes about two hours. */
export const failuresAtMost = 8;
const minutesToWait = (failures: number) => 2 ** (failures - 1) * 60_000;

type Mail = typeof mailOutbox.$inferSelect;

/** What may hold a link is not kept once it is of no more use. */
const erased = { textBody: null, htmlBody: null, unsubscribeUrl: null } as const;

/**
 * Sends what is in the outbox, one mail after the other, until closed. Any number of workers may run, in any number
 * of processes: each mail is claimed in a short transaction, sent outside of one, and marked afterwards. A worker that
 * dies in between leaves a claim that runs out; the next one sends the mail again, under the same Message-ID.
 */
export function startMailWorker({
  db,
  send,
  logger,
  pauseMs = 1000,
  claimMs = 2 * sendTimeout,
  backOff = minutesToWait,
}: MailWorkerOptions): MailWorker {
  const stop = new AbortController();

  async function deliver(mail: Mail): Promise<void> {
    const { id, messageId, recipient: to, subject, textBody, htmlBody, unsubscribeUrl } = mail;
    try {
      await send({ messageId, to, subject, text: textBody ?? '', html: htmlBody ?? '', unsubscribeUrl });
    } catch (error) {
      await noteFailure(mail, error);
      return;
    }
    await ifStillOurs(mail, {
      state: 'sent',
      sentAt: new Date(),
      ...erased,
      claimedUntil: null,
    });
    logger.debug({ mail: id }, 'mail sent');
  }

  async function noteFailure(mail: Mail, error: unknown): Promise<void> {
    const failures = mail.failures + 1;
    const reason = error instanceof Error ? error.message : String(error);
    const isGivenUp = failures >= failuresAtMost;
    await ifStillOurs(mail, {
      failures,
      lastError: reason.slice(0, 500),
      claimedUntil: null,
      ...(isGivenUp
        ? { state: 'undelivered', ...erased }
        : { dueAt: new Date(Date.now() + backOff(failures)) }),
    });
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    logger.warn({ mail: mail.id, failures, code }, isGivenUp ? 'mail given up' : 'mail not sent');
  }

  /** A claim that ran out while we were sending belongs to another worker by now. */
  async function ifStillOurs({ id, claimedUntil }: Mail, change: Partial<Mail>): Promise<void> {
    if (!claimedUntil) return;
    await db
      .update(mailOutbox)
      .set(change)
      .where(and(eq(mailOutbox.id, id), eq(mailOutbox.claimedUntil, claimedUntil)));
  }

  async function run(): Promise<void> {
    while (!stop.signal.aborted) {
      try {
        const mail = await claimNext(db, claimMs);
        if (mail) {
          await deliver(mail);
          continue;
        }
      } catch (error) {
        logger.error({ err: error }, 'mail worker');
      }
      await delay(pauseMs, undefined, { signal: stop.signal }).catch(() => undefined);
    }
  }

  const running = run();
  return {
    close: async () => {
      stop.abort();
      await running;
    },
  };
}

/** Takes the mail that has been due for longest, passing over what other workers are just taking. */
const claimNext = (db: Database, claimMs: number): Promise<Mail | undefined> =>
  withTransaction(db, async (transaction) => {
    const now = new Date();
    const [mail] = await transaction
      .select()
      .from(mailOutbox)
      .where(
        and(
          eq(mailOutbox.state, 'waiting'),
          lte(mailOutbox.dueAt, now),
          or(isNull(mailOutbox.claimedUntil), lte(mailOutbox.claimedUntil, now)),
        ),
      )
      .orderBy(asc(mailOutbox.dueAt))
      .limit(1)
      .for('update', { skipLocked: true });
    if (!mail) return undefined;
    const claimedUntil = new Date(now.getTime() + claimMs);
    await transaction.update(mailOutbox).set({ claimedUntil }).where(eq(mailOutbox.id, mail.id));
    return { ...mail, claimedUntil };
  });
