import { includesRole, type Role } from '../../shared/contract/index.ts';
import type { Notice } from './notice.ts';

interface Candidate {
  readonly userId: number;
  readonly role: Role;
}

/** Which of a team's members a notice is for: never the one who caused it, and only who can act on it or took part. */
export function recipientsOf<Member extends Candidate>(
  notice: Notice,
  actorId: number,
  members: readonly Member[],
): Member[] {
  const concerns = concernedBy(notice);
  return members.filter((member) => member.userId !== actorId && concerns(member));
}

function concernedBy(notice: Notice): (member: Candidate) => boolean {
  if (notice.kind === 'withdrawal') return () => true;
  const authors = [notice.makerId, notice.submitterId];
  if (notice.kind === 'review-asked') {
    return ({ userId, role }) =>
      includesRole(role, 'reviewer') && !(notice.twoPersonRule && authors.includes(userId));
  }
  const took = new Set<number | null>(
    notice.kind === 'comment' ? [...authors, ...notice.commenterIds, ...notice.judgeIds] : authors,
  );
  return ({ userId }) => took.has(userId);
}
