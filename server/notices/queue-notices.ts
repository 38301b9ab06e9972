import { and, asc, eq, isNull, or } from 'drizzle-orm';
import type { NoticeKind } from '../../shared/contract/index.ts';
import type { TeamScope } from '../auth/team-scope.ts';
import type { Executor } from '../db/client.ts';
import { memberships, noticeChoices, teams, users } from '../db/schema/index.ts';
import type { ServerDeps } from '../feature.ts';
import { queueMails } from '../mail/queue-mail.ts';
import { noticeLetter } from './letters.ts';
import type { Notice } from './notice.ts';
import { recipientsOf } from './recipients.ts';
import { sealUnsubscription } from './unsubscribe-token.ts';

/**
 * Puts one mail for each member whom the notice concerns and who has not switched its kind off into the outbox, in the
 * transaction of its cause; call it before `appendEvent`. `scope.user` is the one who caused it and gets none. Answers
 * how many mails there are.
 */
export async function queueNotices(
  transaction: Executor,
  { config, origins }: Pick<ServerDeps, 'config' | 'origins'>,
  scope: Pick<TeamScope, 'teamId' | 'teamSlug' | 'user'>,
  notice: Notice,
): Promise<number> {
  const { teamId, teamSlug, user } = scope;
  const [origin] = origins;
  const { kind } = notice;
  const willing = await findWilling(transaction, teamId, kind);
  const mails = recipientsOf(notice, user.id, willing).map(({ userId, email, teamName }) => {
    const token = sealUnsubscription(config.unsubscribeKey, { userId, kind });
    const place = { origin, teamSlug, teamName, actorName: user.name };
    return {
      to: email,
      letter: noticeLetter(notice, place, `${origin}/unsubscribe#${token}`),
      unsubscribeUrl: `${origin}/api/v1/notices/unsubscribe?token=${token}`,
    };
  });
  await queueMails(transaction, origin, mails);
  return mails.length;
}

/** The team's members who want notices of the kind: all but those who have switched it off. */
const findWilling = (executor: Executor, teamId: number, kind: NoticeKind) =>
  executor
    .select({ userId: users.id, email: users.email, role: memberships.role, teamName: teams.name })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .innerJoin(users, eq(users.id, memberships.userId))
    .leftJoin(noticeChoices, and(eq(noticeChoices.userId, users.id), eq(noticeChoices.kind, kind)))
    .where(
      and(
        eq(memberships.teamId, teamId),
        or(isNull(noticeChoices.isWanted), eq(noticeChoices.isWanted, true)),
      ),
    )
    .orderBy(asc(users.id));
