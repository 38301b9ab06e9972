import type { AddressInfo } from 'node:net';
import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';

export interface SmtpCatcher {
  readonly url: string;
  readonly port: number;
  /** What it has taken, in order. */
  readonly mails: ParsedMail[];
  /** As they came over the wire. */
  readonly raw: string[];
  close(): Promise<void>;
}

/** A mail server that takes everything, or answers each mail with `refuse`, after `delayMs`. */
export async function catchMail({
  port = 0,
  refuse,
  delayMs = 0,
}: { port?: number; refuse?: () => Error | undefined; delayMs?: number } = {}): Promise<SmtpCatcher> {
  const mails: ParsedMail[] = [];
  const raw: string[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    onData: (stream, _session, done) => {
      const parts: Buffer[] = [];
      stream.on('data', (part: Buffer) => parts.push(part));
      stream.on('end', () => {
        const text = Buffer.concat(parts);
        const fault = refuse?.();
        if (!fault) raw.push(text.toString('latin1'));
        void simpleParser(text, { skipHtmlToText: true, skipTextToHtml: true, skipTextLinks: true }).then(
          (mail) => {
            if (!fault) mails.push(mail);
            setTimeout(() => done(fault), delayMs);
          },
        );
      });
    },
  });
  server.on('error', () => undefined);
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
  const taken = (server.server.address() as AddressInfo).port;
  return {
    url: `smtp://127.0.0.1:${taken}`,
    port: taken,
    mails,
    raw,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
