import { fork } from 'node:child_process';
import { once } from 'node:events';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { pino } from 'pino';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { openDatabase } from '../../server/db/client.ts';
import { mailOutbox } from '../../server/db/schema/index.ts';
import { startMailWorker, type MailWorker, type MailWorkerOptions } from '../../server/mail/mail-worker.ts';
import { queueMail } from '../../server/mail/queue-mail.ts';
import { smtpSender } from '../../server/mail/transport.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { catchMail, type SmtpCatcher } from '../support/smtp-catcher.ts';
import { waitUntil } from '../support/wait-until.ts';

const origin = 'https://tables.example';
let test: OwnTestApp;
const running: (MailWorker | SmtpCatcher)[] = [];

beforeAll(async () => {
  test = await makeOwnTestApp();
});
afterAll(() => test.close());
beforeEach(() => test.database.db.delete(mailOutbox));
afterEach(async () => {
  for (const part of running.splice(0)) await part.close();
});

const queue = (to = 'rhea@ninthfathom.example', subject = 'A mail') =>
  queueMail(test.database.db, origin, to, {
    subject,
    paragraphs: ['First.'],
    action: { label: 'Go on', url: `${origin}/verify#${'T'.repeat(43)}` },
  });

function start(smtp: string | SmtpCatcher, options: Partial<MailWorkerOptions> = {}): MailWorker {
  const worker = startMailWorker({
    db: test.database.db,
    send: smtpSender(typeof smtp === 'string' ? smtp : smtp.url, origin),
    logger: pino({ level: 'silent' }),
    pauseMs: 10,
    backOff: () => 0,
    ...options,
  });
  running.push(worker);
  return worker;
}

async function catcher(options?: Parameters<typeof catchMail>[0]): Promise<SmtpCatcher> {
  const smtp = await catchMail(options);
  running.push(smtp);
  return smtp;
}

const rows = () => test.database.db.select().from(mailOutbox);
const untilNothingWaits = () =>
  waitUntil('no mail waits', async () => (await rows()).every(({ state }) => state !== 'waiting'));

describe('the mail worker', () => {
  it('sends a mail with its Message-ID and erases the bodies', async () => {
    const smtp = await catcher();
    await queue();
    const [{ messageId }] = await rows();
    start(smtp);
    await untilNothingWaits();
    const [mail] = smtp.mails;
    expect(mail.messageId).toBe(messageId);
    expect(messageId).toMatch(/^<[0-9a-f]{32}@tables\.example>$/);
    expect(mail.from?.value).toEqual([{ address: 'no-reply@tables.example', name: 'Stepwell' }]);
    expect(mail.text).toContain(`${origin}/verify#${'T'.repeat(43)}`);
    expect(mail.html).toContain(`href="${origin}/verify#${'T'.repeat(43)}"`);
    expect(mail.headers.get('auto-submitted')).toBe('auto-generated');
    expect(await rows()).toMatchObject([
      {
        state: 'sent',
        textBody: null,
        htmlBody: null,
        sentAt: expect.any(Date),
        claimedUntil: null,
        failures: 0,
      },
    ]);
  });

  it('sends each of 40 mails once, with three workers over two pools', async () => {
    const smtp = await catcher();
    for (let index = 0; index < 40; index++) await queue(`person-${index}@ninthfathom.example`);
    const other = openDatabase(test.url);
    const workers = [start(smtp), start(smtp), start(smtp, { db: other.db })];
    await untilNothingWaits();
    for (const worker of workers) await worker.close();
    await other.close();
    const addresses = smtp.mails.map(({ to }) => (Array.isArray(to) ? to[0] : to)?.value[0].address);
    expect(addresses).toHaveLength(40);
    expect(new Set(addresses).size).toBe(40);
  });

  it('sends nothing of a transaction that failed', async () => {
    await test.database.db
      .transaction(async (transaction) => {
        await queueMail(transaction, origin, 'a@b.example', { subject: 'X', paragraphs: [] });
        throw new Error('after all not');
      })
      .catch(() => undefined);
    expect(await rows()).toEqual([]);
  });

  it('that is killed between handing over and noting leaves a mail that goes out again under the same Message-ID', async () => {
    const smtp = await catcher();
    await queue();
    const claimMs = 1500;
    const child = fork(
      join(projectFolder, 'tests/support/mail-worker-process.ts'),
      [test.url, smtp.url, String(claimMs)],
      { execArgv: ['--import', 'tsx'] },
    );
    await once(child, 'message');
    child.kill('SIGKILL');
    await once(child, 'exit');
    expect(smtp.mails).toHaveLength(1);
    expect(await rows()).toMatchObject([{ state: 'waiting', textBody: expect.any(String) }]);
    start(smtp, { claimMs });
    await untilNothingWaits();
    expect(smtp.mails).toHaveLength(2);
    expect(smtp.mails[1].messageId).toBe(smtp.mails[0].messageId);
    expect(await rows()).toMatchObject([{ state: 'sent', failures: 0 }]);
  });

  it('does not touch a mail that another worker has claimed since', async () => {
    const smtp = await catcher();
    const id = await queue();
    let goOn: () => void = () => undefined;
    const slow = start(smtp, {
      claimMs: 50,
      send: () => new Promise((resolve) => (goOn = resolve)),
    });
    await waitUntil('a claim', async () => (await rows())[0].claimedUntil !== null);
    const claimedUntil = new Date(Date.now() + 60_000);
    await test.database.db.update(mailOutbox).set({ claimedUntil }).where(eq(mailOutbox.id, id));
    goOn();
    await slow.close();
    expect(await rows()).toMatchObject([{ state: 'waiting', claimedUntil }]);
  });

  it('waits while the mail server is away, and sends when it is back', async () => {
    const gone = await catchMail();
    await gone.close();
    await queue();
    start(gone.url, { backOff: () => 100 });
    await waitUntil('two failures', async () => (await rows())[0].failures >= 2);
    expect(await rows()).toMatchObject([
      { state: 'waiting', lastError: expect.stringContaining('ECONNREFUSED') },
    ]);
    const back = await catcher({ port: gone.port });
    await untilNothingWaits();
    expect(back.mails).toHaveLength(1);
    expect(await rows()).toMatchObject([{ state: 'sent' }]);
  });

  it('gives a mail up after the eighth failure, and erases it', async () => {
    let tries = 0;
    const smtp = await catcher({
      refuse: () => {
        tries += 1;
        return Object.assign(new Error('No room'), { responseCode: 452 });
      },
    });
    await queue();
    start(smtp);
    await untilNothingWaits();
    expect(await rows()).toMatchObject([
      {
        state: 'undelivered',
        failures: 8,
        textBody: null,
        htmlBody: null,
        lastError: expect.stringContaining('No room'),
      },
    ]);
    expect(tries).toBe(8);
  });

  it('lets others pass a mail that fails', async () => {
    const smtp = await catcher({ refuse: () => undefined });
    await queue('not an address at all');
    await queue('vera@ninthfathom.example');
    start(smtp, { backOff: () => 60_000 });
    await waitUntil('a mail', () => smtp.mails.length > 0);
    expect(smtp.mails).toHaveLength(1);
  });

  it('waits longer after each failure, two hours in all', async () => {
    const smtp = await catcher({ refuse: () => new Error('No') });
    await queue();
    const waits: number[] = [];
    for (let failure = 1; failure < 8; failure++) {
      const worker = startMailWorker({
        db: test.database.db,
        send: smtpSender(smtp.url, origin),
        logger: pino({ level: 'silent' }),
        pauseMs: 10,
      });
      const before = Date.now();
      await waitUntil('a failure', async () => (await rows())[0].failures === failure);
      await worker.close();
      waits.push(Math.round(((await rows())[0].dueAt.getTime() - before) / 60_000));
      await test.database.db.update(mailOutbox).set({ dueAt: new Date() });
    }
    expect(waits).toEqual([1, 2, 4, 8, 16, 32, 64]);
  });

  it('finishes the mail in hand when it is closed, and starts no other', async () => {
    const smtp = await catcher({ delayMs: 300 });
    await queue();
    await queue();
    const worker = start(smtp);
    await waitUntil('a claim', async () => (await rows()).some(({ claimedUntil }) => claimedUntil !== null));
    await worker.close();
    expect((await rows()).map(({ state }) => state).sort()).toEqual(['sent', 'waiting']);
  });

  it('goes on after the database was away', async () => {
    const smtp = await catcher();
    const pool = openDatabase(test.url, { connectionLimit: 1 });
    start(smtp, { db: pool.db });
    const [[{ id }]] = (await pool.pool.query('SELECT CONNECTION_ID() AS id')) as unknown as [
      [{ id: number }],
    ];
    await test.database.pool.query(`KILL ${id}`);
    await queue();
    await untilNothingWaits();
    expect(smtp.mails).toHaveLength(1);
    for (const part of running.splice(0)) await part.close();
    await pool.close();
  });
});
