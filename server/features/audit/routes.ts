import { Router } from 'express';
import { auditFiltersSchema, auditQuerySchema, type AuditFilters } from '../../../shared/contract/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { Feature } from '../../feature.ts';
import { readCursor, writeCursor } from '../../http/list-cursor.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';
import { presentEvent } from './presenter.ts';
import { findEvents } from './queries.ts';
import { sendCsv } from './send-csv.ts';

/** A team's audit trail, for those who answer for what is vetted. */
export const audit: Feature = (deps) => {
  const { db } = deps.database;
  const router = Router();

  router.get('/teams/:team/audit', requireTeam('reviewer'), async (request, response) => {
    const { teamId } = teamOf(request);
    const { cursor, limit, ...filters } = parseInput(auditQuerySchema, request.query, 'query');
    requireOrder(filters);
    const question = ['audit', teamId, filters];
    const before = cursor === undefined ? undefined : readCursor(question, cursor).id;
    const rows = await findEvents(db, { teamId, filters, before, limit: limit + 1 });
    const shown = rows.slice(0, limit);
    const last = rows.length > limit ? shown[shown.length - 1] : undefined;
    response.json({
      items: shown.map(presentEvent),
      nextCursor: last ? writeCursor(question, { key: null, id: last.sequence }) : null,
    });
  });

  router.get('/teams/:team/audit.csv', requireTeam('reviewer'), async (request, response) => {
    const { teamId, teamSlug } = teamOf(request);
    const filters = parseInput(auditFiltersSchema, request.query, 'query');
    requireOrder(filters);
    await sendCsv(request, response, db, { teamId, filters, fileName: `audit-${teamSlug}.csv` });
  });
  return router;
};

/** @throws {Problem} `validation` where the days end before they begin: nothing could be found */
function requireOrder({ from, to }: AuditFilters): void {
  if (from === undefined || to === undefined || from <= to) return;
  throw new Problem('validation', {
    errors: [{ path: 'to', value: to, allowed: `a day not before ${from}` }],
  });
}
