import { insertBoard } from '../../server/features/boards/store.ts';
import { parseBoard } from '../../shared/contract/index.ts';
import { boardWith } from '../engine/support/boards.ts';
import type { RouteCase, Target } from './trespass-routes.ts';

/** A new board of the team, with one revision and version 1; answers its address. */
export const freshBoard = ({ test, team, admin }: Target): Promise<string> =>
  insertBoard(
    test.database.db,
    { teamId: team.id, userId: admin.id },
    { board: parseBoard(boardWith({}, { name: 'Trespass' })), note: '' },
  );

const ofBoard =
  (status: number, below: string, body?: object, headers?: Record<string, string>): RouteCase['attempt'] =>
  async (target) => ({
    path: `/teams/${target.team.slug}/boards/${await freshBoard(target)}${below}`,
    body,
    headers,
    status,
  });

const ofTeam =
  (status: number, body?: object): RouteCase['attempt'] =>
  ({ team }) =>
    Promise.resolve({ path: `/teams/${team.slug}/boards`, body, status });

const saved = { board: boardWith({}, { name: 'Trespass' }) };
const path = '/teams/:team/boards';

/** The routes of a team's boards. */
export const boardCases: Readonly<Record<string, RouteCase>> = {
  [`GET ${path}`]: { access: 'viewer', attempt: ofTeam(200) },
  [`POST ${path}`]: { access: 'author', attempt: ofTeam(201, saved) },
  [`GET ${path}/:board`]: { access: 'viewer', attempt: ofBoard(200, '') },
  [`POST ${path}/:board/retire`]: { access: 'author', attempt: ofBoard(200, '/retire') },
  [`POST ${path}/:board/restore`]: { access: 'author', attempt: ofBoard(200, '/restore') },
  [`POST ${path}/:board/copy`]: { access: 'author', attempt: ofBoard(201, '/copy') },
  [`GET ${path}/:board/revisions`]: { access: 'viewer', attempt: ofBoard(200, '/revisions') },
  [`POST ${path}/:board/revisions`]: {
    access: 'author',
    attempt: ofBoard(201, '/revisions', saved, { 'If-Match': '"1"' }),
  },
  [`GET ${path}/:board/revisions/:number`]: { access: 'viewer', attempt: ofBoard(200, '/revisions/1') },
};
