// A mail worker in a process of its own. The mail after `goodMails` others it hands over, says so and then never gets
// to note it; where that is left out, the very first.
import { pino } from 'pino';
import { openDatabase } from '../../server/db/client.ts';
import { startMailWorker } from '../../server/mail/mail-worker.ts';
import { smtpSender } from '../../server/mail/transport.ts';

const [, , databaseUrl, smtpUrl, claimMs, goodMails = '0'] = process.argv;
const sendBySmtp = smtpSender(smtpUrl, 'https://tables.example');
let left = Number(goodMails);

startMailWorker({
  db: openDatabase(databaseUrl).db,
  logger: pino({ level: 'silent' }),
  claimMs: Number(claimMs),
  pauseMs: 10,
  send: async (mail) => {
    await sendBySmtp(mail);
    if (left-- > 0) return;
    process.send?.('handed over');
    await new Promise(() => undefined);
  },
});
