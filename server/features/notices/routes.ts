import { Router, type Request } from 'express';
import { changeNoticeChoicesSchema, unsubscribeSchema } from '../../../shared/contract/index.ts';
import { requireUser, userOf } from '../../auth/team-scope.ts';
import type { Feature } from '../../feature.ts';
import { fieldOf } from '../../http/form-body.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';
import { changeChoices, unsubscribe } from './commands.ts';
import { findChoices } from './queries.ts';

/** What mail a person wants, and how they end it. */
export const notices: Feature = (deps) => {
  const { db } = deps.database;
  const router = Router();

  router.get('/account/notices', requireUser, async (request, response) => {
    response.json(await findChoices(db, userOf(request).id));
  });
  router.patch('/account/notices', requireUser, async (request, response) => {
    const changes = parseInput(changeNoticeChoicesSchema, request.body);
    response.json(await changeChoices(deps, userOf(request).id, changes));
  });

  router.post('/notices/unsubscribe', async (request, response) => {
    response.json(await unsubscribe(deps, tokenOf(request)));
  });
  // The same address is opened as a page by mail programs that know only RFC 2369. Reading must change nothing: what
  // looks through mail for harm opens addresses, too.
  router.get('/notices/unsubscribe', (request, response) => {
    const { token } = parseInput(unsubscribeSchema, request.query, 'query');
    response.redirect(303, `/unsubscribe#${token}`);
  });
  return router;
};

/** From our own page as JSON; from a mail program in the query, with the form of RFC 8058 §3.1 as the body. */
function tokenOf(request: Request): string {
  const form: unknown = request.body;
  if (typeof form !== 'string') return parseInput(unsubscribeSchema, form).token;
  const said = fieldOf(form, 'List-Unsubscribe');
  if (said !== 'One-Click') {
    throw new Problem('validation', {
      errors: [
        {
          path: 'List-Unsubscribe',
          value: said === undefined ? 'missing' : 'another value',
          allowed: 'One-Click',
        },
      ],
    });
  }
  return parseInput(unsubscribeSchema, request.query, 'query').token;
}
