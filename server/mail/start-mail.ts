import type { Logger } from 'pino';
import type { Config } from '../config.ts';
import type { Database } from '../db/client.ts';
import { hasReadableMailbox, startLocalMailbox } from './local-mailbox.ts';
import { startMailWorker } from './mail-worker.ts';
import { smtpSender } from './transport.ts';

/** Starts this process's mail worker, and with the private database alone the mailbox that it sends to. */
export async function startMail(
  config: Config,
  origin: string,
  db: Database,
  logger: Logger,
): Promise<{ close(): Promise<void> }> {
  const mailbox = hasReadableMailbox(config) ? await startLocalMailbox(db, logger) : undefined;
  const smtpUrl = config.smtpUrl ?? mailbox?.smtpUrl;
  if (smtpUrl === undefined) throw new Error('Mail has nowhere to go: SMTP_URL is missing.');
  const worker = startMailWorker({ db, send: smtpSender(smtpUrl, origin, config.mailFrom), logger });
  return {
    close: async () => {
      await worker.close();
      await mailbox?.close();
    },
  };
}
