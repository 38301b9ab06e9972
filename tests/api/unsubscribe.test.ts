import { eq } from 'drizzle-orm';
import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { mailOutbox, noticeChoices, users } from '../../server/db/schema/index.ts';
import { sealUnsubscription } from '../../server/notices/unsubscribe-token.ts';
import type { NoticeKind } from '../../shared/contract/index.ts';
import { deliver, everything, makeNotices, oneClick, outboxRows } from '../support/notices.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson, makePerson, type TestPerson } from '../support/people.ts';
import { catchMail, type SmtpCatcher } from '../support/smtp-catcher.ts';
import { host, origin } from '../support/test-app.ts';

let test: OwnTestApp;
let smtp: SmtpCatcher;
let crew: Awaited<ReturnType<typeof makeNotices>>;

beforeAll(async () => {
  test = await makeOwnTestApp();
  smtp = await catchMail();
  crew = await makeNotices(test);
});
afterAll(async () => {
  await smtp.close();
  await test.close();
});
beforeEach(async () => {
  await test.database.db.delete(mailOutbox);
  await test.database.db.delete(noticeChoices);
});

const choices = (person: TestPerson) => asPerson(test, person).get('/account/notices');

const tokenFor = (person: { id: number }, kind: NoticeKind) =>
  sealUnsubscription(test.deps.config.unsubscribeKey, { userId: person.id, kind });

describe('a notice as it arrives', () => {
  it('says what happened in text and HTML, and carries one link to the review and a way to end it', async () => {
    const typed = 'See <b>https://elsewhere.example/win</b>\r\nBcc: victim@elsewhere.example\u202e';
    await crew.queue(
      crew.reviewer,
      crew.notice.verdict({ note: typed, table: { slug: 'fog-signal', title: typed.slice(0, 60) } }),
    );
    const { mails, raw } = await deliver(test, smtp);
    const index = mails.findIndex(({ to }) => JSON.stringify(to).includes(crew.author.email));
    const { subject, text = '', html, headers, messageId } = mails[index];
    const token = tokenFor(crew.author, 'verdict');
    const review = `${origin}/teams/${crew.team.slug}/tables/fog-signal/revisions/3/review`;
    expect(subject).toMatch(/^Returned: revision 3 of See <b>/);
    for (const body of [text, String(html)]) {
      expect(body).toContain('Rhea Sound');
      expect(body).toContain('Ninth Fathom');
      expect(body).not.toMatch(/elsewhere\.example|\u202e/);
      expect(new Set(body.match(/https?:\/\/[^\s"<]+/g))).toEqual(
        new Set([review, `${origin}/unsubscribe#${token}`]),
      );
    }
    expect(String(html)).not.toContain('<b>');
    const source = raw[index].split('\r\n\r\n')[0].split('\r\n');
    const url = `${origin}/api/v1/notices/unsubscribe?token=${token}`;
    // On one line each, as they are: an address that is folded is another one.
    expect(source).toContain(`List-Unsubscribe: <${url}>`);
    expect(source).toContain('List-Unsubscribe-Post: List-Unsubscribe=One-Click');
    expect(headers.get('bcc')).toBeUndefined();
    expect(
      (await outboxRows(test)).map((row) => [row.messageId, row.unsubscribeUrl, row.textBody]),
    ).toContainEqual([messageId, null, null]);

    expect((await oneClick(test, url.slice(origin.length))).body).toEqual({ kind: 'verdict' });
    expect((await choices(crew.author)).body).toEqual({ ...everything, verdict: false });
    expect((await choices(crew.admin)).body).toEqual(everything);
  });
});

describe('an unsubscribe link', () => {
  it('works any number of times, by page and by mail program, signed in or not', async () => {
    const token = tokenFor(crew.viewer, 'withdrawal');
    const path = `/api/v1/notices/unsubscribe?token=${token}`;
    const multipart = [
      '--part',
      'Content-Disposition: form-data; name="List-Unsubscribe"',
      '',
      'One-Click',
      '--part--',
      '',
    ].join('\r\n');
    const answers = [
      await asPerson(test).post('/notices/unsubscribe', { token }),
      await asPerson(test, crew.stranger).post('/notices/unsubscribe', { token }),
      await oneClick(test, path),
      await oneClick(test, path, multipart, 'multipart/form-data; boundary=part'),
    ];
    expect(answers.map(({ status, body }) => [status, body])).toEqual(
      answers.map(() => [200, { kind: 'withdrawal' }]),
    );
    expect((await choices(crew.viewer)).body).toEqual({ ...everything, withdrawal: false });
    expect((await choices(crew.stranger)).body).toEqual(everything);
    await asPerson(test, crew.viewer).patch('/account/notices', { withdrawal: true });
    await oneClick(test, path);
    expect((await choices(crew.viewer)).body.withdrawal).toBe(false);
  });

  it('changes nothing when it is only opened, and leads to the page', async () => {
    const token = tokenFor(crew.viewer, 'comment');
    const response = await request(test.app)
      .get(`/api/v1/notices/unsubscribe?token=${token}`)
      .set('Host', host);
    expect([response.status, response.headers.location]).toEqual([303, `/unsubscribe#${token}`]);
    expect((await choices(crew.viewer)).body).toEqual(everything);
  });

  it('cannot be made, nor turned into that of another person or kind', async () => {
    const token = tokenFor(crew.viewer, 'comment');
    const [, , mac] = token.split('.');
    const other = sealUnsubscription(test.deps.config.unsubscribeKey, {
      userId: crew.author.id,
      kind: 'verdict',
    });
    const flipped = `${mac.slice(0, 20)}${mac[20] === 'A' ? 'B' : 'A'}${mac.slice(21)}`;
    const forged = [
      `${crew.author.id}.comment.${mac}`,
      `${crew.viewer.id}.verdict.${mac}`,
      `${crew.viewer.id}.comment.${flipped}`,
      `${crew.viewer.id}.comment.${other.split('.')[2]}`,
      `0${token}`,
      `${crew.viewer.id}.everything.${mac}`,
      `${crew.viewer.id}.comment.${'A'.repeat(43)}`,
      // The key of another use of the same secret is another key.
      `${crew.viewer.id}.comment.${'-'.repeat(43)}`,
    ];
    for (const one of forged) {
      expect((await asPerson(test).post('/notices/unsubscribe', { token: one })).status, one).toBe(404);
      expect((await oneClick(test, `/api/v1/notices/unsubscribe?token=${one}`)).status, one).toBe(404);
    }
    expect(await test.database.db.select().from(noticeChoices)).toEqual([]);
  });

  it('refuses other forms, and a foreign page', async () => {
    const path = `/api/v1/notices/unsubscribe?token=${tokenFor(crew.viewer, 'comment')}`;
    expect((await oneClick(test, path, 'List-Unsubscribe=Never')).status).toBe(422);
    expect((await oneClick(test, path, 'x=1')).status).toBe(422);
    expect((await oneClick(test, path, `x=${'y'.repeat(5000)}`)).status).toBe(413);
    expect((await oneClick(test, path, '<a/>', 'application/xml')).status).toBe(415);
    expect((await oneClick(test, '/api/v1/notices/unsubscribe')).status).toBe(422);
    expect((await oneClick(test, path).set('Origin', 'https://elsewhere.example')).status).toBe(403);
    // Only here: everywhere else a form is what a foreign page could send.
    expect((await oneClick(test, '/api/v1/account/forgot-password')).status).toBe(415);
    expect(await test.database.db.select().from(noticeChoices)).toEqual([]);
  });

  it('of an account that is gone is answered alike', async () => {
    const gone = await makePerson(test, 'Gone Soon');
    const token = tokenFor(gone, 'comment');
    await test.database.db.delete(users).where(eq(users.id, gone.id));
    const response = await oneClick(test, `/api/v1/notices/unsubscribe?token=${token}`);
    expect([response.status, response.body]).toEqual([200, { kind: 'comment' }]);
  });
});
