import { Router, type Request } from 'express';
import { changeLimitSetSchema, createLimitSetSchema } from '../../../shared/contract/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce } from '../../http/idempotency.ts';
import { parseInput } from '../../http/parse-input.ts';
import { parseNumber } from '../../http/parse-number.ts';
import { etagOf, preconditionOf } from '../../http/preconditions.ts';
import { readLimitSets } from '../../tables/limit-sets.ts';
import { changeLimitSet, createLimitSet, deleteLimitSet, type Command } from './commands.ts';

type LimitSetRequest = Request<{ team: string; id: string }>;

/** What tables of a team have to keep to be vetted. */
export const limitSets: Feature = ({ config, database }) => {
  const { db } = database;
  const router = Router();
  const commandOf = (request: object, transaction: Executor): Command => ({
    transaction,
    auditKey: config.auditKey,
    scope: teamOf(request),
  });

  router.get('/teams/:team/limit-sets', requireTeam('viewer'), async (request, response) => {
    response.json({ limitSets: await readLimitSets(db, teamOf(request).teamId) });
  });

  router.post('/teams/:team/limit-sets', requireTeam('admin'), async (request, response) => {
    const input = parseInput(createLimitSetSchema, request.body);
    await answerOnce(request, response, db, async (transaction) => {
      const made = await createLimitSet(commandOf(request, transaction), input);
      const headers = {
        ETag: etagOf(made.version),
        Location: `/api/v1/teams/${request.params.team}/limit-sets/${made.id}`,
      };
      return { status: 201, headers, body: made };
    });
  });

  router.put(
    '/teams/:team/limit-sets/:id',
    requireTeam('admin'),
    async (request: LimitSetRequest, response) => {
      const precondition = preconditionOf(request);
      const input = parseInput(changeLimitSetSchema, request.body);
      const id = parseNumber(request.params.id);
      const changed = await withTransaction(db, (transaction) =>
        changeLimitSet(commandOf(request, transaction), id, precondition, input),
      );
      response.set('ETag', etagOf(changed.version)).json(changed);
    },
  );

  router.delete(
    '/teams/:team/limit-sets/:id',
    requireTeam('admin'),
    async (request: LimitSetRequest, response) => {
      const precondition = preconditionOf(request);
      const id = parseNumber(request.params.id);
      await withTransaction(db, (transaction) =>
        deleteLimitSet(commandOf(request, transaction), id, precondition),
      );
      response.status(204).end();
    },
  );
  return router;
};
