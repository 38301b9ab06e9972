import {
  boardRevisionSchema,
  boardRevisionsPageSchema,
  boardRevisionsQuerySchema,
  boardsPageSchema,
  boardsQuerySchema,
  copyBoardSchema,
  createBoardSchema,
  libraryBoardSchema,
  reviseBoardSchema,
} from '../../../../shared/contract/index.ts';
import type { Answer, Operation, Section } from '../operation.ts';

const board: Answer = {
  status: 200,
  description: 'The board as it is now',
  schema: libraryBoardSchema,
  headers: ['ETag'],
};
const newBoard: Answer = {
  ...board,
  status: 201,
  description: 'The new board',
  headers: ['ETag', 'Location'],
};

const takeOut = (id: string, action: string, summary: string): Operation => ({
  id,
  method: 'post',
  path: `/teams/:team/boards/:board/${action}`,
  summary,
  access: 'author',
  repeatable: true,
  answer: board,
});

export const boards: Section = {
  name: 'Boards',
  description:
    'What tables play on: clock, pins, converter and what follows it. Revisions of a board never change.',
  operations: [
    {
      id: 'listBoards',
      method: 'get',
      path: '/teams/:team/boards',
      summary: 'List boards by name',
      access: 'viewer',
      query: boardsQuerySchema,
      answer: { status: 200, description: 'A page of boards', schema: boardsPageSchema },
    },
    {
      id: 'createBoard',
      method: 'post',
      path: '/teams/:team/boards',
      summary: 'Save a new board',
      access: 'author',
      body: createBoardSchema,
      repeatable: true,
      answer: newBoard,
      refusals: [409],
    },
    {
      id: 'readBoard',
      method: 'get',
      path: '/teams/:team/boards/:board',
      summary: 'Read a board with its newest revisions',
      access: 'viewer',
      answer: board,
    },
    takeOut('retireBoard', 'retire', 'Take a board out of use'),
    takeOut('restoreBoard', 'restore', 'Take a board back into use'),
    {
      id: 'copyBoard',
      method: 'post',
      path: '/teams/:team/boards/:board/copy',
      summary: 'Make a new board out of a revision of this one',
      access: 'author',
      body: copyBoardSchema,
      bodyOptional: true,
      repeatable: true,
      answer: newBoard,
      refusals: [409],
    },
    {
      id: 'listBoardRevisions',
      method: 'get',
      path: '/teams/:team/boards/:board/revisions',
      summary: 'List the revisions of a board, newest first',
      access: 'viewer',
      query: boardRevisionsQuerySchema,
      answer: { status: 200, description: 'A page of revisions', schema: boardRevisionsPageSchema },
    },
    {
      id: 'reviseBoard',
      method: 'post',
      path: '/teams/:team/boards/:board/revisions',
      summary: 'Save a board as its next revision',
      access: 'author',
      body: reviseBoardSchema,
      conditional: true,
      repeatable: true,
      answer: {
        ...newBoard,
        description: 'The board with its new revision; Location is that of the revision',
      },
      refusals: [409],
    },
    {
      id: 'readBoardRevision',
      method: 'get',
      path: '/teams/:team/boards/:board/revisions/:number',
      summary: 'Read a revision of a board',
      access: 'viewer',
      answer: { status: 200, description: 'The revision', schema: boardRevisionSchema },
    },
  ],
};
