import { and, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import {
  teamLimits,
  type Invitation,
  type inviteSchema,
  type OpenInvitation,
} from '../../../shared/contract/index.ts';
import { appendEvent } from '../../audit/append-event.ts';
import { findLink, makeLink, markUsed } from '../../auth/one-time-links.ts';
import { lockTeam } from '../../auth/team-lock.ts';
import type { Person, TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { memberships, oneTimeLinks } from '../../db/schema/index.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { ServerDeps } from '../../feature.ts';
import { Problem } from '../../http/problem.ts';
import { invitationLetter } from '../../mail/letters.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import { presentInvitation } from './presenter.ts';
import {
  countInvitations,
  countMembers,
  findInvitations,
  findMembership,
  isMemberAddress,
  lockTeamRow,
} from './queries.ts';

/**
 * Invites an address. An open invitation of the same address is replaced: its link works no longer.
 *
 * @throws {Problem} `conflict` where the address is a member's, or the team is full
 */
export async function invite(
  { config, origins }: Pick<ServerDeps, 'config' | 'origins'>,
  transaction: Executor,
  scope: TeamScope,
  { email, role }: z.infer<typeof inviteSchema>,
): Promise<Invitation> {
  const { teamId, user } = scope;
  const team = await lockTeam(transaction, scope, 'admin');
  if (await isMemberAddress(transaction, teamId, email)) {
    throw new Problem('conflict', { detail: `${email} belongs to the team already.` });
  }
  await transaction
    .delete(oneTimeLinks)
    .where(
      and(
        eq(oneTimeLinks.teamId, teamId),
        eq(oneTimeLinks.purpose, 'invitation'),
        eq(oneTimeLinks.email, email),
        isNull(oneTimeLinks.usedAt),
      ),
    );
  if ((await countInvitations(transaction, teamId)) >= teamLimits.openInvitations) {
    throw new Problem('conflict', {
      detail: `A team has at most ${teamLimits.openInvitations} open invitations.`,
    });
  }
  await requireRoom(transaction, teamId);
  const link = await makeLink(transaction, {
    purpose: 'invitation',
    email,
    teamId,
    role,
    createdBy: user.id,
  });
  const letter = invitationLetter(origins[0], link.token, {
    teamName: team.name,
    invitedBy: user.name,
    role,
  });
  const mailId = await queueMail(transaction, origins[0], email, letter);
  await transaction.update(oneTimeLinks).set({ mailId }).where(eq(oneTimeLinks.id, link.id));
  const made = (await findInvitations(transaction, teamId)).find(({ id }) => id === link.id);
  if (!made) throw new Error('The invitation just made is not there.');
  await appendEvent(transaction, config.auditKey, {
    teamId,
    actor: user,
    action: 'member.invited',
    subject: `invitation:${link.id}`,
    details: { email, role },
  });
  return presentInvitation(made);
}

/** @throws {Problem} `not-found` where the team has no such open invitation */
export const withdrawInvitation = (
  { config, database }: ServerDeps,
  scope: TeamScope,
  id: number,
): Promise<void> =>
  withTransaction(database.db, async (transaction) => {
    await lockTeam(transaction, scope, 'admin');
    const open = (await findInvitations(transaction, scope.teamId)).find(
      (invitation) => invitation.id === id,
    );
    const [{ affectedRows }] = await transaction
      .delete(oneTimeLinks)
      .where(
        and(
          eq(oneTimeLinks.id, id),
          eq(oneTimeLinks.teamId, scope.teamId),
          eq(oneTimeLinks.purpose, 'invitation'),
          isNull(oneTimeLinks.usedAt),
        ),
      );
    if (!open || affectedRows === 0) {
      throw new Problem('not-found', { detail: 'There is no such open invitation.' });
    }
    await appendEvent(transaction, config.auditKey, {
      teamId: scope.teamId,
      actor: scope.user,
      action: 'invitation.withdrawn',
      subject: `invitation:${id}`,
      details: { email: open.email, role: open.role },
    });
  });

/**
 * What the holder of an invitation's link may see of it.
 *
 * @throws {Problem} `not-found`, `link-used` or `link-expired`
 */
export const openInvitation = ({ database }: ServerDeps, token: string): Promise<OpenInvitation> =>
  withTransaction(database.db, async (transaction) => {
    const { team, role, email } = await readInvitation(transaction, token);
    return { teamName: team.name, teamSlug: team.slug, role, email };
  });

/**
 * Makes the person a member. Who is one already by another way keeps the role they have.
 *
 * @throws {Problem} as `openInvitation`; `forbidden` where the link was sent to another address; `conflict` where the
 * team or the person has no room
 */
export async function acceptInvitation(
  { config }: Pick<ServerDeps, 'config'>,
  transaction: Executor,
  user: Person,
  token: string,
): Promise<OpenInvitation> {
  const { link, team, role, email } = await readInvitation(transaction, token);
  if (email !== user.email) {
    throw new Problem('forbidden', {
      detail: `The invitation was sent to ${email}; you are signed in as ${user.email}.`,
    });
  }
  await markUsed(transaction, link);
  const held = await findMembership(transaction, team.id, user.id);
  if (!held) {
    await requireRoom(transaction, team.id);
    await transaction.insert(memberships).values({ teamId: team.id, userId: user.id, role });
    await appendEvent(transaction, config.auditKey, {
      teamId: team.id,
      actor: user,
      action: 'member.joined',
      subject: `member:${user.id}`,
      details: { invitation: link.id, role },
    });
  }
  return { teamName: team.name, teamSlug: team.slug, role: held?.role ?? role, email };
}

async function readInvitation(transaction: Executor, token: string) {
  const link = await findLink(transaction, token, 'invitation');
  const team = link.teamId === null ? undefined : await lockTeamRow(transaction, link.teamId);
  if (!team || !link.role) throw new Problem('not-found', { detail: 'The team is gone.' });
  return { link, team, role: link.role, email: link.email };
}

async function requireRoom(transaction: Executor, teamId: number): Promise<void> {
  if ((await countMembers(transaction, teamId)) < teamLimits.members) return;
  throw new Problem('conflict', { detail: `A team has at most ${teamLimits.members} members.` });
}
