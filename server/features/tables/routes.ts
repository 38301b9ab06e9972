import { Router, type Request, type Response } from 'express';
import {
  changeTableSchema,
  createRevisionSchema,
  createTableSchema,
  duplicateTableSchema,
  revisionsQuerySchema,
  tablesQuerySchema,
  type LibraryTable,
} from '../../../shared/contract/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce, type Answer } from '../../http/idempotency.ts';
import { readCursor, writeCursor } from '../../http/list-cursor.ts';
import { parseInput } from '../../http/parse-input.ts';
import { etagOf, preconditionOf } from '../../http/preconditions.ts';
import { noRevision, noTable } from '../../tables/not-there.ts';
import { numberOf } from '../../tables/revision-number.ts';
import {
  addRevision,
  changeTable,
  createTable,
  duplicateTable,
  readTable,
  setArchived,
  type Command,
} from './commands.ts';
import { computeRevision } from './compute.ts';
import { addExportRoute } from './export-route.ts';
import { findTables } from './find-tables.ts';
import { presentRevision, presentRevisionSummary, presentSummary } from './presenter.ts';
import { findRevision, findTable, listRevisions, listTags, readSummaries } from './queries.ts';

type TableRequest = Request<{ team: string; table: string }>;
type RevisionRequest = Request<{ team: string; table: string; number: string }>;

/** The library of a team: tables, their revisions and what is exported from them. */
export const tables: Feature = (deps) => {
  const { config, database, jobs } = deps;
  const { db } = database;
  const router = Router();
  const commandOf = (request: object, transaction: Executor): Command => ({
    transaction,
    auditKey: config.auditKey,
    scope: teamOf(request),
  });

  router.get('/teams/:team/tables', requireTeam('viewer'), async (request, response) => {
    const { teamId } = teamOf(request);
    const query = parseInput(tablesQuerySchema, request.query, 'query');
    const { ids, nextCursor } = await findTables(db, teamId, query);
    response.json({ items: (await readSummaries(db, teamId, ids)).map(presentSummary), nextCursor });
  });

  router.post('/teams/:team/tables', requireTeam('author'), async (request, response) => {
    const input = parseInput(createTableSchema, request.body);
    const built = await computeRevision(jobs, input.definition);
    await answerOnce(request, response, db, async (transaction) =>
      created(request.params.team, await createTable(commandOf(request, transaction), input, built)),
    );
  });

  router.get('/teams/:team/tables/:table', requireTeam('viewer'), async (request: TableRequest, response) => {
    send(response, await readTable(db, teamOf(request).teamId, request.params.table));
  });

  router.patch(
    '/teams/:team/tables/:table',
    requireTeam('author'),
    async (request: TableRequest, response) => {
      const precondition = preconditionOf(request);
      const input = parseInput(changeTableSchema, request.body);
      const table = await withTransaction(db, (transaction) =>
        changeTable(commandOf(request, transaction), request.params.table, precondition, input),
      );
      send(response, table);
    },
  );

  for (const [action, isArchived] of [
    ['archive', true],
    ['restore', false],
  ] as const) {
    router.post(
      `/teams/:team/tables/:table/${action}`,
      requireTeam('author'),
      async (request: TableRequest, response) => {
        await answerOnce(request, response, db, async (transaction) =>
          answer(await setArchived(commandOf(request, transaction), request.params.table, isArchived)),
        );
      },
    );
  }

  router.post(
    '/teams/:team/tables/:table/duplicate',
    requireTeam('author'),
    async (request: TableRequest, response) => {
      const input = parseInput(duplicateTableSchema, request.body ?? {});
      await answerOnce(request, response, db, async (transaction) =>
        created(
          request.params.team,
          await duplicateTable(commandOf(request, transaction), request.params.table, input),
        ),
      );
    },
  );

  router.get(
    '/teams/:team/tables/:table/revisions',
    requireTeam('viewer'),
    async (request: TableRequest, response) => {
      const { teamId } = teamOf(request);
      const { cursor, limit } = parseInput(revisionsQuerySchema, request.query, 'query');
      const table = await findTable(db, teamId, request.params.table);
      if (!table) throw noTable(request.params.table);
      const question = ['revisions', table.id];
      const before = cursor === undefined ? undefined : readCursor(question, cursor).id;
      const rows = await listRevisions(db, teamId, table.id, limit, before);
      const last = rows.at(-1);
      response.json({
        items: rows.map(presentRevisionSummary),
        nextCursor: last && last.number > 1 ? writeCursor(question, { key: null, id: last.number }) : null,
      });
    },
  );

  router.post(
    '/teams/:team/tables/:table/revisions',
    requireTeam('author'),
    async (request: TableRequest, response) => {
      const precondition = preconditionOf(request);
      const input = parseInput(createRevisionSchema, request.body);
      const built = await computeRevision(jobs, input.definition);
      await answerOnce(request, response, db, async (transaction) => {
        const { table: slug } = request.params;
        const table = await addRevision(commandOf(request, transaction), slug, precondition, input, built);
        return created(request.params.team, table, `/revisions/${table.latestRevision}`);
      });
    },
  );

  router.get(
    '/teams/:team/tables/:table/revisions/:number',
    requireTeam('viewer'),
    async (request: RevisionRequest, response) => {
      const { table, number } = request.params;
      const wanted = numberOf(number);
      const row = wanted && (await findRevision(db, teamOf(request).teamId, table, wanted));
      if (!row) throw noRevision(table, number);
      response.json(presentRevision(row));
    },
  );

  addExportRoute(router, deps);

  router.get('/teams/:team/tags', requireTeam('viewer'), async (request, response) => {
    response.json({ tags: await listTags(db, teamOf(request).teamId) });
  });

  return router;
};

const send = (response: Response, table: LibraryTable) => {
  response.set('ETag', etagOf(table.version)).json(table);
};

const answer = (table: LibraryTable, status = 200): Answer => ({
  status,
  headers: { ETag: etagOf(table.version) },
  body: table,
});

const created = (team: string, table: LibraryTable, below = ''): Answer => {
  const made = answer(table, 201);
  return {
    ...made,
    headers: { ...made.headers, Location: `/api/v1/teams/${team}/tables/${table.slug}${below}` },
  };
};
