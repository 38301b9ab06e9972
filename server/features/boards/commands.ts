import {
  checkBoard,
  limits,
  type Board,
  type CopyBoard,
  type CreateBoard,
  type LibraryBoard,
} from '../../../shared/contract/index.ts';
import { appendEvent, type AuditEntry } from '../../audit/append-event.ts';
import type { AuditKey } from '../../audit/mac.ts';
import type { TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { lostRace, type Precondition } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import { presentBoard } from './presenter.ts';
import { findBoard, findBoardRevision, listBoardRevisions, lockBoard, type LockedBoard } from './queries.ts';
import { insertBoard, insertNextRevision, storeRetired, type Place } from './store.ts';

/** The transaction a command runs in, and who gave it. */
export interface Command {
  readonly transaction: Executor;
  readonly auditKey: AuditKey;
  readonly scope: Pick<TeamScope, 'teamId' | 'user'>;
}

/** How many revisions come along with a board. */
const newest = 20;

export const noBoard = (slug: string) =>
  new Problem('not-found', { detail: `The team has no board named ${slug}.` });

export const noBoardRevision = (slug: string, number: number | string) =>
  new Problem('not-found', { detail: `The team's board ${slug} has no revision ${number}.` });

/**
 * Parses the `board` of a request.
 *
 * @throws {Problem} `validation` (422), naming each field at fault by its path in the request
 */
export function readBoardInput(input: unknown): Board {
  const checked = checkBoard(input);
  if ('board' in checked) return checked.board;
  throw new Problem('validation', {
    errors: checked.problems.map((problem) => ({ ...problem, path: withinBoard(problem.path) })),
  });
}

const withinBoard = (path: string) => {
  if (path === 'board') return path;
  return path.startsWith('[') ? `board${path}` : `board.${path}`;
};

/** @throws {Problem} `not-found` */
export async function readBoard(db: Executor, teamId: number, slug: string): Promise<LibraryBoard> {
  const row = await findBoard(db, teamId, slug);
  if (!row) throw noBoard(slug);
  return presentBoard(row, await listBoardRevisions(db, teamId, row.id, newest));
}

export async function createBoard(command: Command, { board, note }: CreateBoard): Promise<LibraryBoard> {
  const slug = await insertBoard(command.transaction, placeOf(command), { board, note });
  return concluded(command, slug, 'board.created', ({ revisions }) => ({
    name: board.name,
    digest: revisions[0].digest,
  }));
}

/** @throws {Problem} `precondition-failed` with the board as it is now, where somebody has changed it since */
export async function reviseBoard(
  command: Command,
  slug: string,
  precondition: Precondition,
  { board, note }: CreateBoard,
): Promise<LibraryBoard> {
  const before = await lock(command, slug);
  if (!precondition.holds(before.version))
    throw lostRace(await readBoard(command.transaction, before.teamId, slug));
  if (before.isRetired) {
    throw new Problem('conflict', { detail: 'The board is retired; restore it, then save.' });
  }
  const number = await insertNextRevision(command.transaction, placeOf(command), before, { board, note });
  return concluded(command, slug, 'board.revised', ({ revisions }) => ({
    name: board.name,
    number,
    note,
    digest: revisions[0].digest,
  }));
}

/** Takes a board out of use or back into it; nothing happens where it is there already. */
export async function setRetired(command: Command, slug: string, isRetired: boolean): Promise<LibraryBoard> {
  const board = await lock(command, slug);
  if (board.isRetired === isRetired) return readBoard(command.transaction, board.teamId, slug);
  await storeRetired(command.transaction, placeOf(command), board, isRetired);
  return concluded(command, slug, isRetired ? 'board.retired' : 'board.restored', ({ name }) => ({ name }));
}

/** Makes a new board whose first revision is a revision of another one, but for its name. */
export async function copyBoard(
  command: Command,
  slug: string,
  { name, revision }: CopyBoard,
): Promise<LibraryBoard> {
  const { transaction, scope } = command;
  const row = await findBoard(transaction, scope.teamId, slug);
  if (!row) throw noBoard(slug);
  const number = revision ?? row.latestRevision;
  const original = await findBoardRevision(transaction, scope.teamId, slug, number);
  if (!original) throw noBoardRevision(slug, number);
  const board = { ...(original.board as Board), name: name ?? copyName(row.name) };
  const made = await insertBoard(transaction, placeOf(command), { board, note: '' });
  return concluded(command, made, 'board.copied', ({ revisions }) => ({
    name: board.name,
    from: { slug, number },
    digest: revisions[0].digest,
  }));
}

const placeOf = ({ scope }: Command): Place => ({ teamId: scope.teamId, userId: scope.user.id });

async function lock({ transaction, scope }: Command, slug: string): Promise<LockedBoard> {
  const board = await lockBoard(transaction, scope.teamId, slug);
  if (!board) throw noBoard(slug);
  return board;
}

/** Notes what was done, last of all, and answers the board as it is now. */
async function concluded(
  { transaction, auditKey, scope }: Command,
  slug: string,
  action: AuditEntry['action'],
  detailsOf: (board: LibraryBoard) => AuditEntry['details'],
): Promise<LibraryBoard> {
  const board = await readBoard(transaction, scope.teamId, slug);
  await appendEvent(transaction, auditKey, {
    teamId: scope.teamId,
    actor: scope.user,
    action,
    subject: `board:${slug}`,
    details: detailsOf(board),
  });
  return board;
}

/** Cut, where it must be, so that the whole has the characters of a name, and not inside a surrogate pair. */
const copyName = (name: string) =>
  `${name
    .slice(0, limits.nameLength.max - ' copy'.length)
    .replace(/[\ud800-\udbff]$/, '')
    .trimEnd()} copy`;
