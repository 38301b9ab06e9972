import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { pino } from 'pino';
import { startMailWorker } from '../../server/mail/mail-worker.ts';
import { smtpSender } from '../../server/mail/transport.ts';
import { writeLetter } from '../../server/mail/letter.ts';
import * as letters from '../../server/mail/letters.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson, makePerson } from '../support/people.ts';
import { catchMail, type SmtpCatcher } from '../support/smtp-catcher.ts';
import { waitUntil } from '../support/wait-until.ts';

const hostile = [
  '<script>alert(1)</script>',
  '"><img src=x onerror=alert(1)>',
  "' onmouseover='alert(1)",
  '--> <!-- <b>bold</b>',
  '*/ ??/ \\',
  '</p></body></html>',
  'Name\r\nBcc: victim@elsewhere.example\r\n\r\nBody',
  'two\u2028lines\u2029\u0085more',
  '\u202egnp.exe\u202c',
  'https://elsewhere.example/win www.elsewhere.example mail@elsewhere.example',
  '&lt;script&gt; &amp; &#60;',
  '=?utf-8?B?PHNjcmlwdD4=?=',
  '.\r\n.\r\nMAIL FROM:<x@elsewhere.example>',
];

describe('mail about a team with a hostile name, by a person with a hostile name', () => {
  let test: OwnTestApp;
  let smtp: SmtpCatcher;
  beforeAll(async () => {
    test = await makeOwnTestApp();
    smtp = await catchMail();
  });
  afterAll(async () => {
    await smtp.close();
    await test.close();
  });

  it.each(hostile)('is harmless: %j', async (name) => {
    const admin = await makePerson(test, name.trim());
    const team = await asPerson(test, admin).post('/teams', { name });
    const { slug } = team.body as { slug: string };
    const { length } = smtp.mails;
    const to = `guest-${length}@ninthfathom.example`;
    const invited = await asPerson(test, admin).post(`/teams/${slug}/invitations`, {
      email: to,
      role: 'viewer',
    });
    expect(invited.status).toBe(201);
    const worker = startMailWorker({
      db: test.database.db,
      send: smtpSender(smtp.url, 'https://tables.example'),
      logger: pino({ level: 'silent' }),
      pauseMs: 10,
    });
    await waitUntil('a mail', () => smtp.mails.length > length);
    await worker.close();
    expect(smtp.mails).toHaveLength(length + 1);

    const mail = smtp.mails[length];
    expect([...mail.headers.keys()].sort()).toEqual(
      [
        'auto-submitted',
        'content-type',
        'date',
        'from',
        'message-id',
        'mime-version',
        'subject',
        'to',
      ].sort(),
    );
    expect((Array.isArray(mail.to) ? mail.to : [mail.to]).map((entry) => entry?.value[0].address)).toEqual([
      to,
    ]);
    expect(mail.subject).toMatch(/^Invitation to the team [^\p{C}\p{Zl}\p{Zp}]+$/u);
    // Of the markup nothing but our own: the tags that a letter has, in their order.
    const tags = String(mail.html).match(/<[^>]*>/g) ?? [];
    expect(tags.map((tag) => /^<[!/]?\w+/.exec(tag)?.[0])).toEqual([
      ...['<!doctype', '<html', '<head', '<meta', '<title', '</title', '</head', '<body'],
      ...['<p', '</p', '<p', '<a', '</a', '</p', '<p', '</p'],
      ...['<p', '</p', '<p', '</p', '<p', '</p', '</body', '</html'],
    ]);
    expect(String(mail.html)).not.toMatch(/<!--|-->/);
    for (const text of [mail.text ?? '', String(mail.html)]) {
      // No bidirectional controls, and nothing a mail program takes for an address but our own link.
      expect(text).not.toMatch(/[\u202a-\u202e\u2066-\u2069\u2028\u2029]/);
      expect(text).not.toMatch(/elsewhere\.example/);
      expect(text.match(/https?:\/\/[^\s"<]+/g)?.every((url) => url.startsWith(new URL(url).origin))).toBe(
        true,
      );
      expect(new Set((text.match(/https?:\/\/[^\s"<]+/g) ?? []).map((url) => new URL(url).host))).toEqual(
        new Set(['127.0.0.1:4173']),
      );
    }
  });
});

describe('every letter', () => {
  const origin = 'https://tables.example';
  const token = 'T'.repeat(43);
  const all = {
    verify: letters.verifyAddressLetter(origin, token),
    exists: letters.accountExistsLetter(origin),
    reset: letters.resetPasswordLetter(origin, token),
    changed: letters.passwordChangedLetter(origin),
    confirm: letters.confirmAddressLetter(origin, token),
    address: letters.addressChangedLetter('new@ninthfathom.example'),
    deleted: letters.accountDeletedLetter(),
    invitation: letters.invitationLetter(origin, token, {
      teamName: 'Ninth Fathom',
      invitedBy: 'Ada',
      role: 'viewer',
    }),
  };

  it.each(Object.entries(all))('%s says the same in text and HTML', (_name, letter) => {
    const { subject, text, html } = writeLetter(letter);
    expect(subject.length).toBeGreaterThan(5);
    const unescape = (markup: string) =>
      markup
        .replace(/<title>.*<\/title>/, '')
        .replace(/<[^>]*>/g, ' ')
        .replaceAll('&#39;', "'")
        .replaceAll('&quot;', '"')
        .replaceAll('&lt;', '<')
        .replaceAll('&gt;', '>')
        .replaceAll('&amp;', '&');
    const words = (value: string) => value.split(/\s+/).filter(Boolean);
    expect(words(unescape(html)).join(' ')).toBe(words(text.replace(/:\n(?=https)/, '\n')).join(' '));
  });

  it('carries its token in the fragment, which no server sees', () => {
    for (const { action } of Object.values(all)) {
      if (!action) continue;
      const url = new URL(action.url);
      expect([url.origin, url.search, url.hash]).toEqual([origin, '', `#${token}`]);
    }
  });
});
