import { createTransport } from 'nodemailer';
import { mailDomain } from './queue-mail.ts';

export interface OutgoingMail {
  readonly messageId: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  /** Where one request ends mail of its kind; null for mail about the person's own account, which cannot be ended. */
  readonly unsubscribeUrl: string | null;
}

/** Hands a mail to the next server; rejects where that one did not take it. */
export type SendMail = (mail: OutgoingMail) => Promise<void>;

const seconds = 1000;

/** The longest that all steps of one mail may take together, in ms; a claim on a mail outlives it. */
export const sendTimeout = 90 * seconds;

/** Sends by the SMTP server of `url`, from `from` or from our own host's `no-reply`. */
export function smtpSender(url: string, origin: string, from = `no-reply@${mailDomain(origin)}`): SendMail {
  const transport = createTransport({
    url,
    dnsTimeout: 10 * seconds,
    connectionTimeout: 10 * seconds,
    greetingTimeout: 10 * seconds,
    socketTimeout: 30 * seconds,
    // A mail is text that we have written: it never names a file or an address to fetch.
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return async ({ to, unsubscribeUrl, ...mail }) => {
    const sending = transport.sendMail({
      ...mail,
      from: { name: 'Stepwell', address: from },
      to: { name: '', address: to },
      // RFC 3834 §5: no out-of-office answers, please.
      headers: { 'Auto-Submitted': 'auto-generated', ...unsubscribeHeaders(unsubscribeUrl) },
    });
    await inTime(sending);
  };
}

/**
 * What a mail program's own "unsubscribe" button uses: the address (RFC 2369 §3.2), and that a POST to it does it at
 * once (RFC 8058 §3.1). `prepared`: an address must not be folded.
 */
const unsubscribeHeaders = (
  url: string | null,
): Record<string, string | { prepared: boolean; value: string }> =>
  url === null
    ? {}
    : {
        'List-Unsubscribe': { prepared: true, value: `<${url}>` },
        'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
      };

/** The timeouts above are for single steps: a server that answers one byte at a time would hold a worker for ever. */
async function inTime(sending: Promise<unknown>): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error(`Not sent within ${sendTimeout / seconds} s.`)), sendTimeout);
  });
  await Promise.race([sending, late]).finally(() => clearTimeout(timer));
}
