import { Router, type Request } from 'express';
import { changeMemberSchema, changeTeamSchema, createTeamSchema } from '../../../shared/contract/index.ts';
import { requireTeam, requireUser, teamOf, userOf } from '../../auth/team-scope.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce } from '../../http/idempotency.ts';
import { parseInput } from '../../http/parse-input.ts';
import { parseNumber } from '../../http/parse-number.ts';
import { etagOf, preconditionOf } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import { changeRole, changeTeam, createTeam, removeMember } from './commands.ts';
import { presentMember, presentTeam } from './presenter.ts';
import { countTables, findMembers, findTeam, findTeamsOf } from './queries.ts';

type MemberRequest = Request<{ team: string; userId: string }>;

/** Teams and who belongs to them. */
export const teams: Feature = (deps) => {
  const { db } = deps.database;
  const router = Router();

  router.get('/teams', requireUser, async (request, response) => {
    response.json({ items: await findTeamsOf(db, userOf(request).id), nextCursor: null });
  });
  router.post('/teams', requireUser, async (request, response) => {
    const typed = parseInput(createTeamSchema, request.body);
    await answerOnce(request, response, db, async (transaction) => {
      const team = await createTeam(deps, transaction, userOf(request), typed);
      const headers = { Location: `/api/v1/teams/${team.slug}`, ETag: etagOf(team.version) };
      return { status: 201, headers, body: team };
    });
  });

  router.get('/teams/:team', requireTeam('viewer'), async (request, response) => {
    const { teamId, role } = teamOf(request);
    const [team, tables] = await Promise.all([findTeam(db, teamId), countTables(db, teamId)]);
    if (!team) throw new Problem('not-found');
    response.set('ETag', etagOf(team.version)).json(presentTeam(team, role, tables));
  });
  router.patch('/teams/:team', requireTeam('admin'), async (request, response) => {
    const typed = parseInput(changeTeamSchema, request.body);
    const team = await changeTeam(deps, teamOf(request), preconditionOf(request), typed);
    response.set('ETag', etagOf(team.version)).json(team);
  });

  router.get('/teams/:team/members', requireTeam('viewer'), async (request, response) => {
    const members = await findMembers(db, teamOf(request).teamId);
    response.json({ items: members.map(presentMember), nextCursor: null });
  });
  router.patch(
    '/teams/:team/members/:userId',
    requireTeam('admin'),
    async (request: MemberRequest, response) => {
      const { role } = parseInput(changeMemberSchema, request.body);
      response.json(await changeRole(deps, teamOf(request), parseNumber(request.params.userId), role));
    },
  );
  // A viewer may leave; whoever removes somebody else must be an admin, which the command sees to.
  router.delete(
    '/teams/:team/members/:userId',
    requireTeam('viewer'),
    async (request: MemberRequest, response) => {
      await removeMember(deps, teamOf(request), parseNumber(request.params.userId));
      response.status(204).end();
    },
  );
  return router;
};
