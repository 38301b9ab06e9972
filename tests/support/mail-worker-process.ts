// A mail worker in a process of its own that hands a mail over, says so and then never gets to note it.
import { pino } from 'pino';
import { openDatabase } from '../../server/db/client.ts';
import { startMailWorker } from '../../server/mail/mail-worker.ts';
import { smtpSender } from '../../server/mail/transport.ts';

const [, , databaseUrl, smtpUrl, claimMs] = process.argv;
const sendBySmtp = smtpSender(smtpUrl, 'https://tables.example');

startMailWorker({
  db: openDatabase(databaseUrl).db,
  logger: pino({ level: 'silent' }),
  claimMs: Number(claimMs),
  pauseMs: 10,
  send: async (mail) => {
    await sendBySmtp(mail);
    process.send?.('handed over');
    await new Promise(() => undefined);
  },
});
