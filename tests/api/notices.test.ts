import { fork } from 'node:child_process';
import { once } from 'node:events';
import { join } from 'node:path';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { mailOutbox, noticeChoices } from '../../server/db/schema/index.ts';
import { withTransaction } from '../../server/db/transaction.ts';
import { queueNotices } from '../../server/notices/queue-notices.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { noticeKinds, type NoticeKind } from '../../shared/contract/index.ts';
import { everything, makeNotices, outboxRows, untilAllIsSent } from '../support/notices.ts';
import { makeOwnTestApp, type OwnTestApp } from '../support/own-database.ts';
import { asPerson, makePerson, makeTeam, type TestPerson } from '../support/people.ts';
import { catchMail, type SmtpCatcher } from '../support/smtp-catcher.ts';

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

const recipients = async () => (await outboxRows(test)).map(({ recipient }) => recipient).sort();
const addresses = (...people: TestPerson[]) => people.map(({ email }) => email).sort();

describe('a notice goes to', () => {
  it('the reviewers who may judge what is submitted, and not to who submits it', async () => {
    await crew.queue(crew.author, crew.notice['review-asked']());
    expect(await recipients()).toEqual(addresses(crew.reviewer, crew.judge, crew.admin));
    await test.database.db.delete(mailOutbox);
    const own = { makerId: crew.judge.id, submitterId: crew.reviewer.id };
    await crew.queue(crew.reviewer, crew.notice['review-asked'](own));
    expect(await recipients()).toEqual(addresses(crew.admin));
    await test.database.db.delete(mailOutbox);
    await crew.queue(crew.reviewer, crew.notice['review-asked']({ ...own, twoPersonRule: false }));
    expect(await recipients()).toEqual(addresses(crew.judge, crew.admin));
  });

  it('maker and submitter of what is judged; once where they are one, never to the one who judges', async () => {
    await crew.queue(crew.reviewer, crew.notice.verdict());
    expect(await recipients()).toEqual(addresses(crew.author, crew.admin));
    await test.database.db.delete(mailOutbox);
    await crew.queue(crew.admin, crew.notice.verdict());
    expect(await recipients()).toEqual(addresses(crew.author));
    await test.database.db.delete(mailOutbox);
    await crew.queue(crew.reviewer, crew.notice.verdict({ submitterId: crew.author.id }));
    expect(await recipients()).toEqual(addresses(crew.author));
  });

  it('all who took part before a comment, once each, and not to its author', async () => {
    await crew.queue(crew.reviewer, crew.notice.comment());
    expect(await recipients()).toEqual(addresses(crew.author, crew.viewer, crew.judge));
    await test.database.db.delete(mailOutbox);
    await crew.queue(crew.viewer, crew.notice.comment());
    expect(await recipients()).toEqual(addresses(crew.author, crew.judge));
  });

  it('all members where something is withdrawn, but who did it', async () => {
    await crew.queue(crew.judge, crew.notice.withdrawal());
    expect(await recipients()).toEqual(addresses(crew.viewer, crew.author, crew.reviewer, crew.admin));
  });

  it('nobody who has left the team or whose account is gone', async () => {
    await crew.queue(crew.admin, crew.notice.verdict({ makerId: null, submitterId: crew.stranger.id }));
    await crew.queue(
      crew.admin,
      crew.notice.comment({
        makerId: null,
        submitterId: null,
        commenterIds: [crew.stranger.id],
        judgeIds: [],
      }),
    );
    expect(await recipients()).toEqual([]);
  });

  it('nobody where its cause fails in the end', async () => {
    await withTransaction(test.database.db, async (transaction) => {
      const scope = { teamId: crew.team.id, teamSlug: crew.team.slug, user: crew.admin };
      expect(await queueNotices(transaction, test.deps, scope, crew.notice.withdrawal())).toBe(4);
      throw new Error('after all not');
    }).catch(() => undefined);
    expect(await outboxRows(test)).toEqual([]);
  });
});

const choices = (person: TestPerson) => asPerson(test, person).get('/account/notices');

describe('the choice of notices', () => {
  it('is everything at first, and each can be switched off and on without the others', async () => {
    expect((await choices(crew.author)).body).toEqual(everything);
    const change = await asPerson(test, crew.author).patch('/account/notices', { comment: false });
    expect(change.body).toEqual({ ...everything, comment: false });
    await asPerson(test, crew.author).patch('/account/notices', { verdict: false, comment: true });
    expect((await choices(crew.author)).body).toEqual({ ...everything, verdict: false });
    expect((await choices(crew.viewer)).body).toEqual(everything);
    const wrong = await asPerson(test, crew.author).patch('/account/notices', { comment: 'no', other: true });
    expect(wrong.status).toBe(422);
    expect((wrong.body.errors as { path: string }[]).map(({ path }) => path).sort()).toEqual([
      'comment',
      'other',
    ]);
  });

  it('holds for each kind, and loses no side of two changes at once', async () => {
    const kinds: [NoticeKind, TestPerson][] = [
      ['review-asked', crew.reviewer],
      ['verdict', crew.author],
      ['comment', crew.author],
      ['withdrawal', crew.author],
    ];
    await Promise.all(
      kinds.map(([kind, person]) => asPerson(test, person).patch('/account/notices', { [kind]: false })),
    );
    expect((await choices(crew.author)).body).toEqual({
      ...everything,
      verdict: false,
      comment: false,
      withdrawal: false,
    });
    for (const [kind, person] of kinds) {
      await test.database.db.delete(mailOutbox);
      expect(await crew.queue(crew.judge, crew.notice[kind]())).toBeGreaterThan(0);
      expect(await recipients(), kind).not.toContain(person.email);
    }
  });
});

it('knows a letter for each kind', async () => {
  for (const kind of noticeKinds) {
    await test.database.db.delete(mailOutbox);
    await crew.queue(crew.admin, crew.notice[kind]());
    const [{ subject, textBody }] = await outboxRows(test);
    expect(subject, kind).toContain('revision 3 of Fog signal');
    expect(textBody, kind).toMatch(/“(Mind the steps|Too coarse|Why 8 bits\?|Clips at full scale)”/);
  }
});

it('reaches everybody at least once with one Message-ID each, though one of two mail processes is killed at work', async () => {
  const crowd = await Promise.all(Array.from({ length: 24 }, () => makePerson(test)));
  const team = await makeTeam(
    test,
    crowd.map((person) => ({ person, role: 'viewer' })),
  );
  await crew.queue(crew.admin, crew.notice.withdrawal(), team);
  const messageIds = new Map(
    (await outboxRows(test)).map(({ recipient, messageId }) => [recipient, messageId]),
  );
  expect(messageIds.size).toBe(24);
  const from = smtp.mails.length;
  const spawn = (goodMails: number) =>
    fork(
      join(projectFolder, 'tests/support/mail-worker-process.ts'),
      [test.url, smtp.url, '2000', String(goodMails)],
      { execArgv: ['--import', 'tsx'] },
    );
  const [dying, living] = [spawn(3), spawn(1000)];
  await once(dying, 'message');
  dying.kill('SIGKILL');
  await untilAllIsSent(test);
  living.kill('SIGKILL');
  await once(living, 'exit');
  const sent = smtp.mails
    .slice(from)
    .map(({ to, messageId }) => [(Array.isArray(to) ? to[0] : to)?.value[0].address ?? '', messageId]);
  // One was handed over by the process that died before it could say so: that one came twice.
  expect(sent).toHaveLength(25);
  expect(new Map(sent as [string, string][])).toEqual(messageIds);
  for (const [recipient, messageId] of sent) expect(messageIds.get(String(recipient))).toBe(messageId);
});
