import { Router, type Request } from 'express';
import { invitationTokenSchema, inviteSchema } from '../../../shared/contract/index.ts';
import { requireTeam, requireUser, teamOf, userOf } from '../../auth/team-scope.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce } from '../../http/idempotency.ts';
import { networkOf } from '../../http/network.ts';
import { parseInput } from '../../http/parse-input.ts';
import { parseNumber } from '../../http/parse-number.ts';
import { heed, limitRate, rateLimiter } from '../../http/rate-limiter.ts';
import { acceptInvitation, invite, openInvitation, withdrawInvitation } from './commands.ts';
import { presentInvitation } from './presenter.ts';
import { findInvitations } from './queries.ts';

/** Invitations to a team: made and withdrawn by its admins, opened and accepted by whoever has the link. */
export const invitations: Feature = (deps) => {
  const { db } = deps.database;
  const limiter = rateLimiter(deps);
  const linkUses = limitRate(limiter, 'link-use', networkOf);
  const router = Router();

  router.get('/teams/:team/invitations', requireTeam('admin'), async (request, response) => {
    const rows = await findInvitations(db, teamOf(request).teamId);
    response.json({ items: rows.map(presentInvitation), nextCursor: null });
  });
  router.post('/teams/:team/invitations', requireTeam('admin'), async (request, response) => {
    const typed = parseInput(inviteSchema, request.body);
    const scope = teamOf(request);
    heed(response, await limiter.count('invitations', String(scope.teamId)));
    await answerOnce(request, response, db, async (transaction) => {
      const body = await invite(deps, transaction, scope, typed);
      return {
        status: 201,
        headers: { Location: `/api/v1/teams/${scope.teamSlug}/invitations/${body.id}` },
        body,
      };
    });
  });
  router.delete(
    '/teams/:team/invitations/:id',
    requireTeam('admin'),
    async (request: Request<{ team: string; id: string }>, response) => {
      await withdrawInvitation(deps, teamOf(request), parseNumber(request.params.id));
      response.status(204).end();
    },
  );

  router.post('/invitations/open', linkUses, async (request, response) => {
    response.json(await openInvitation(deps, parseInput(invitationTokenSchema, request.body).token));
  });
  router.post('/invitations/accept', linkUses, requireUser, async (request, response) => {
    const { token } = parseInput(invitationTokenSchema, request.body);
    await answerOnce(request, response, db, async (transaction) => ({
      status: 200,
      body: await acceptInvitation(deps, transaction, userOf(request), token),
    }));
  });
  return router;
};
