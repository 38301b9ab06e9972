import { Router, type Request } from 'express';
import { mailboxQuerySchema } from '../../../shared/contract/index.ts';
import type { Feature } from '../../feature.ts';
import { parseInput } from '../../http/parse-input.ts';
import { parseNumber } from '../../http/parse-number.ts';
import { Problem } from '../../http/problem.ts';
import { hasReadableMailbox } from '../../mail/local-mailbox.ts';
import { presentMessage, presentSummary } from './presenter.ts';
import { findMessage, findPage } from './queries.ts';

/**
 * The readable mailbox, for trying everything out on one's own machine: mail to anybody is shown to whoever sits
 * there. Anywhere else it has no routes at all.
 */
export const mailbox: Feature = (deps) => {
  const router = Router();
  if (!hasReadableMailbox(deps.config)) return router;
  const { db } = deps.database;

  router.get('/mailbox', async (request, response) => {
    const { cursor } = parseInput(mailboxQuerySchema, request.query, 'query');
    const { rows, next } = await findPage(db, cursor === undefined ? undefined : parseNumber(cursor));
    response.json({ items: rows.map(presentSummary), nextCursor: next === undefined ? null : String(next) });
  });
  router.get('/mailbox/:id', async (request: Request<{ id: string }>, response) => {
    const row = await findMessage(db, parseNumber(request.params.id));
    if (!row) throw new Problem('not-found', { detail: 'There is no such mail.' });
    response.json(presentMessage(row));
  });
  return router;
};
