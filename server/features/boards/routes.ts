import { Router, type Request, type Response } from 'express';
import {
  boardRevisionNumberField,
  boardRevisionsQuerySchema,
  boardsQuerySchema,
  copyBoardSchema,
  createBoardSchema,
  reviseBoardSchema,
  type LibraryBoard,
} from '../../../shared/contract/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce, type Answer } from '../../http/idempotency.ts';
import { readCursor, writeCursor } from '../../http/list-cursor.ts';
import { parseInput } from '../../http/parse-input.ts';
import { etagOf, preconditionOf } from '../../http/preconditions.ts';
import {
  copyBoard,
  createBoard,
  noBoard,
  noBoardRevision,
  readBoard,
  readBoardInput,
  reviseBoard,
  setRetired,
  type Command,
} from './commands.ts';
import { presentRevision, presentRevisionSummary, presentSummary } from './presenter.ts';
import { findBoard, findBoardRevision, listBoardRevisions, listBoards } from './queries.ts';

type BoardRequest = Request<{ team: string; board: string }>;
type RevisionRequest = Request<{ team: string; board: string; number: string }>;

/** What a team's tables play on. */
export const boards: Feature = ({ config, database }) => {
  const { db } = database;
  const router = Router();
  const commandOf = (request: object, transaction: Executor): Command => ({
    transaction,
    auditKey: config.auditKey,
    scope: teamOf(request),
  });

  router.get('/teams/:team/boards', requireTeam('viewer'), async (request, response) => {
    const { teamId } = teamOf(request);
    const { retired, cursor, limit } = parseInput(boardsQuerySchema, request.query, 'query');
    const question = ['boards', teamId, retired];
    const after = cursor === undefined ? undefined : readCursor(question, cursor);
    const found = await listBoards(db, teamId, { retired, limit: limit + 1 }, after);
    const page = found.slice(0, limit);
    const last = page.at(-1);
    response.json({
      items: page.map(presentSummary),
      nextCursor:
        last && found.length > page.length ? writeCursor(question, { key: last.name, id: last.id }) : null,
    });
  });

  router.post('/teams/:team/boards', requireTeam('author'), async (request, response) => {
    const input = parseInput(createBoardSchema, request.body);
    const board = readBoardInput(input.board);
    await answerOnce(request, response, db, async (transaction) =>
      created(request.params.team, await createBoard(commandOf(request, transaction), { ...input, board })),
    );
  });

  router.get('/teams/:team/boards/:board', requireTeam('viewer'), async (request: BoardRequest, response) => {
    send(response, await readBoard(db, teamOf(request).teamId, request.params.board));
  });

  for (const [action, isRetired] of [
    ['retire', true],
    ['restore', false],
  ] as const) {
    router.post(
      `/teams/:team/boards/:board/${action}`,
      requireTeam('author'),
      async (request: BoardRequest, response) => {
        await answerOnce(request, response, db, async (transaction) =>
          answer(await setRetired(commandOf(request, transaction), request.params.board, isRetired)),
        );
      },
    );
  }

  router.post(
    '/teams/:team/boards/:board/copy',
    requireTeam('author'),
    async (request: BoardRequest, response) => {
      const input = parseInput(copyBoardSchema, request.body ?? {});
      await answerOnce(request, response, db, async (transaction) =>
        created(
          request.params.team,
          await copyBoard(commandOf(request, transaction), request.params.board, input),
        ),
      );
    },
  );

  router.get(
    '/teams/:team/boards/:board/revisions',
    requireTeam('viewer'),
    async (request: BoardRequest, response) => {
      const { teamId } = teamOf(request);
      const { cursor, limit } = parseInput(boardRevisionsQuerySchema, request.query, 'query');
      const board = await findBoard(db, teamId, request.params.board);
      if (!board) throw noBoard(request.params.board);
      const question = ['board-revisions', board.id];
      const before = cursor === undefined ? undefined : readCursor(question, cursor).id;
      const rows = await listBoardRevisions(db, teamId, board.id, limit, before);
      const last = rows.at(-1);
      response.json({
        items: rows.map(presentRevisionSummary),
        nextCursor: last && last.number > 1 ? writeCursor(question, { key: null, id: last.number }) : null,
      });
    },
  );

  router.post(
    '/teams/:team/boards/:board/revisions',
    requireTeam('author'),
    async (request: BoardRequest, response) => {
      const precondition = preconditionOf(request);
      const input = parseInput(reviseBoardSchema, request.body);
      const board = readBoardInput(input.board);
      await answerOnce(request, response, db, async (transaction) => {
        const revised = await reviseBoard(
          commandOf(request, transaction),
          request.params.board,
          precondition,
          { ...input, board },
        );
        return created(request.params.team, revised, `/revisions/${revised.latestRevision}`);
      });
    },
  );

  router.get(
    '/teams/:team/boards/:board/revisions/:number',
    requireTeam('viewer'),
    async (request: RevisionRequest, response) => {
      const { board, number } = request.params;
      const wanted = boardRevisionNumberField.safeParse(number).data;
      const row = wanted && (await findBoardRevision(db, teamOf(request).teamId, board, wanted));
      if (!row) throw noBoardRevision(board, number);
      response.json(presentRevision(row));
    },
  );

  return router;
};

const send = (response: Response, board: LibraryBoard) => {
  response.set('ETag', etagOf(board.version)).json(board);
};

const answer = (board: LibraryBoard, status = 200): Answer => ({
  status,
  headers: { ETag: etagOf(board.version) },
  body: board,
});

const created = (team: string, board: LibraryBoard, below = ''): Answer => {
  const made = answer(board, 201);
  return {
    ...made,
    headers: { ...made.headers, Location: `/api/v1/teams/${team}/boards/${board.slug}${below}` },
  };
};
