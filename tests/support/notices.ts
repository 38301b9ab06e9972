import { pino } from 'pino';
import request from 'supertest';
import { mailOutbox } from '../../server/db/schema/index.ts';
import { withTransaction } from '../../server/db/transaction.ts';
import { startMailWorker } from '../../server/mail/mail-worker.ts';
import { smtpSender } from '../../server/mail/transport.ts';
import type { Notice } from '../../server/notices/notice.ts';
import { queueNotices } from '../../server/notices/queue-notices.ts';
import type { NoticeChoices } from '../../shared/contract/index.ts';
import { join, makeCrew, makePerson, makeTeam, type TestPerson, type TestTeam } from './people.ts';
import type { SmtpCatcher } from './smtp-catcher.ts';
import { host, origin, type TestApp } from './test-app.ts';
import { waitUntil } from './wait-until.ts';

export const everything: NoticeChoices = {
  'review-asked': true,
  verdict: true,
  comment: true,
  withdrawal: true,
};

/** A crew with a second reviewer, who has judged revision 3 of a table, and a stranger whom nothing concerns. */
export async function makeNotices(test: TestApp) {
  const crew = await makeCrew(test);
  const judge = await makePerson(test, 'Juno Deep');
  await join(test, crew.team.id, judge, 'reviewer');
  const stranger = await makePerson(test, 'Stella Strange');
  await makeTeam(test, [{ person: stranger, role: 'admin' }]);

  const table = { slug: 'fog-signal', title: 'Fog signal' };
  const notice = {
    'review-asked': (change: object = {}): Notice => ({
      ...{ kind: 'review-asked', table, number: 3, twoPersonRule: true, message: 'Mind the steps' },
      ...{ makerId: crew.author.id, submitterId: crew.author.id },
      ...change,
    }),
    verdict: (change: object = {}): Notice => ({
      ...{ kind: 'verdict', table, number: 3, verdict: 'returned', note: 'Too coarse' },
      ...{ makerId: crew.author.id, submitterId: crew.admin.id },
      ...change,
    }),
    comment: (change: object = {}): Notice => ({
      ...{ kind: 'comment', table, number: 3, text: 'Why 8 bits?', path: 'table.bits' },
      ...{ makerId: crew.author.id, submitterId: crew.author.id },
      ...{ commenterIds: [crew.viewer.id, crew.viewer.id], judgeIds: [judge.id] },
      ...change,
    }),
    withdrawal: (change: object = {}): Notice => ({
      ...{ kind: 'withdrawal', table, number: 3, reason: 'Clips at full scale' },
      ...change,
    }),
  };
  return {
    ...crew,
    judge,
    stranger,
    notice,
    queue: (actor: TestPerson, told: Notice, team: TestTeam = crew.team) =>
      withTransaction(test.database.db, (transaction) =>
        queueNotices(transaction, test.deps, { teamId: team.id, teamSlug: team.slug, user: actor }, told),
      ),
  };
}

export const outboxRows = (test: TestApp) => test.database.db.select().from(mailOutbox);

export const untilAllIsSent = (test: TestApp) =>
  waitUntil('no mail waits', async () => (await outboxRows(test)).every(({ state }) => state === 'sent'));

/** Sends what waits in the outbox, and answers what arrived. */
export async function deliver(test: TestApp, smtp: SmtpCatcher) {
  const from = smtp.mails.length;
  const worker = startMailWorker({
    db: test.database.db,
    send: smtpSender(smtp.url, origin),
    logger: pino({ level: 'silent' }),
    pauseMs: 10,
  });
  await untilAllIsSent(test);
  await worker.close();
  return { mails: smtp.mails.slice(from), raw: smtp.raw.slice(from) };
}

/** As a mail program does it: a form, without a cookie and without an Origin. */
export const oneClick = (
  test: TestApp,
  url: string,
  form = 'List-Unsubscribe=One-Click',
  type = 'application/x-www-form-urlencoded',
) => request(test.app).post(url).set('Host', host).set('Content-Type', type).send(form);
