import { createTransport } from 'nodemailer';
import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readConfig } from '../../server/config.ts';
import { mailboxMessages, mailOutbox } from '../../server/db/schema/index.ts';
import { hasReadableMailbox, startLocalMailbox, type LocalMailbox } from '../../server/mail/local-mailbox.ts';
import { startMail } from '../../server/mail/start-mail.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson } from '../support/people.ts';
import { makeTestApp, origin, testSecret } from '../support/test-app.ts';
import { waitUntil } from '../support/wait-until.ts';

const silent = pino({ level: 'silent' });
const local = { PRIVATE_DATABASE_URL: 'mysql://x@localhost/stepwell_test_x', AUTH_SECRET: testSecret };
const anywhere = {
  ...{ AUTH_SECRET: testSecret, APP_ORIGIN: 'https://tables.example', SMTP_URL: 'smtp://mail.example' },
  DATABASE_URL: 'mysql://x@localhost/stepwell_test_x',
};

let test: OwnTestApp;
let mailbox: LocalMailbox;
beforeAll(async () => {
  test = await makeOwnTestApp();
  mailbox = await startLocalMailbox(test.database.db, silent);
});
afterAll(async () => {
  await mailbox.close();
  await test.close();
});

const send = (mail: object, url = mailbox.smtpUrl) =>
  createTransport({ url }).sendMail({
    ...{
      from: 'Stepwell <no-reply@localhost>',
      to: 'vera@ninthfathom.example',
      subject: 'A mail',
      text: 'Text',
    },
    ...mail,
  });

type Page = { items: { id: number; to: string; subject: string }[]; nextCursor: string | null };
const page = async (query = '') => (await asPerson(test).get(`/mailbox${query}`)).body as Page;

describe('the readable mailbox', () => {
  it('shows what a sign-up sends, from the outbox by real SMTP', async () => {
    const email = 'ines@ninthfathom.example';
    await asPerson(test).post('/account/sign-up', { name: 'Ines', email, password: 'nine fathoms deep' });
    const config = readConfig(local);
    const mail = await startMail(config, origin, test.database.db, silent);
    const [summary] = await waitUntil('the mail', async () => {
      const { items } = await page();
      return items.length > 0 ? items : undefined;
    });
    await waitUntil(
      'the note',
      async () => (await test.database.db.select().from(mailOutbox))[0].state === 'sent',
    );
    await mail.close();
    expect(summary).toMatchObject({ to: email, subject: 'Verify your address' });
    const { body } = await asPerson(test).get(`/mailbox/${summary.id}`);
    expect(body).toMatchObject({ to: email, from: '"Stepwell" <no-reply@localhost>' });
    const token = /127\.0\.0\.1:4173\/verify#([\w-]{43})/.exec((body as { text: string }).text)?.[1];
    const verified = await asPerson(test).post('/account/verify-address', { token });
    expect([verified.status, verified.body]).toEqual([200, { email }]);
  });

  it('keeps a mail that comes twice once', async () => {
    await send({ messageId: '<twice@localhost>', subject: 'Twice' });
    await send({ messageId: '<twice@localhost>', subject: 'Twice' });
    expect((await page()).items.filter(({ subject }) => subject === 'Twice')).toHaveLength(1);
  });

  it('goes by pages, the newest first', async () => {
    const receivedAt = new Date();
    await test.database.db.delete(mailboxMessages);
    await test.database.db.insert(mailboxMessages).values(
      Array.from({ length: 120 }, (_none, index) => ({
        ...{ messageId: `<${index}@x>`, recipient: 'a@b.example', sender: 'x', subject: `Mail ${index}` },
        ...{ textBody: '', htmlBody: '', receivedAt },
      })),
    );
    const subjects: string[] = [];
    let cursor: string | null = '';
    let pages = 0;
    while (cursor !== null) {
      const { items, nextCursor }: Page = await page(cursor && `?cursor=${cursor}`);
      subjects.push(...items.map(({ subject }) => subject));
      cursor = nextCursor;
      pages += 1;
    }
    expect(pages).toBe(3);
    expect(subjects).toEqual(Array.from({ length: 120 }, (_none, index) => `Mail ${119 - index}`));
  });

  it('takes any text as text', async () => {
    const text = `<script>alert(1)</script> ${'é\u{1f6a2}'.repeat(50)} */ --> "quoted" \\`;
    await send({ subject: text.slice(0, 200), text, html: `<p>${text}</p>` });
    const [{ id }] = (await page()).items;
    const response = await asPerson(test).get(`/mailbox/${id}`);
    expect((response.body as { text: string }).text.trim()).toBe(text);
    expect(response.headers['content-type']).toMatch(/^application\/json/);
  });

  it('takes mail from this process only', async () => {
    const url = new URL(mailbox.smtpUrl);
    expect(url.hostname).toBe('127.0.0.1');
    url.password = 'guessed';
    await expect(send({}, url.href)).rejects.toThrow(/535|Invalid login/);
    url.username = url.password = '';
    await expect(send({}, url.href)).rejects.toThrow(/530|authentication/i);
  });

  it('asks to try again where the database does not keep it', async () => {
    await test.database.pool.query('RENAME TABLE mailbox_messages TO mailbox_messages_gone');
    await expect(send({})).rejects.toMatchObject({ responseCode: 451 });
    await test.database.pool.query('RENAME TABLE mailbox_messages_gone TO mailbox_messages');
  });

  it('answers 404 for what is not there', async () => {
    for (const id of ['999999999', '0', 'x', '1.5']) {
      expect((await asPerson(test).get(`/mailbox/${id}`)).status).toBe(404);
    }
    expect((await asPerson(test).get('/mailbox?limit=5')).status).toBe(422);
  });

  it('is there only with the private database and where mail has no other way to go', async () => {
    expect(hasReadableMailbox(readConfig(local))).toBe(true);
    for (const environment of [
      anywhere,
      { ...local, SMTP_URL: 'smtp://mail.example' },
      { ...anywhere, HOST: '0.0.0.0' },
      { ...anywhere, ...local },
    ]) {
      const config = readConfig(environment);
      expect(hasReadableMailbox(config)).toBe(false);
      const other = makeTestApp({ config: { ...config, databaseUrl: test.url } });
      for (const path of ['/mailbox', '/mailbox/1']) {
        const response = await asPerson(other).get(path);
        expect([path, response.status, (response.body as { detail: string }).detail]).toEqual([
          path,
          404,
          `There is nothing at /api/v1${path}.`,
        ]);
      }
      await other.close();
    }
  });
});
