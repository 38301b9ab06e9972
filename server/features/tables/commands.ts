import type {
  ChangeTable,
  CreateRevision,
  CreateTable,
  Definition,
  DuplicateTable,
  LibraryTable,
  Report,
  Revision,
  Warning,
} from '../../../shared/contract/index.ts';
import { appendEvent, type AuditEntry } from '../../audit/append-event.ts';
import type { AuditKey } from '../../audit/mac.ts';
import type { TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { lostRace, type Precondition } from '../../http/preconditions.ts';
import { Problem } from '../../http/problem.ts';
import { noRevision, noTable } from '../../tables/not-there.ts';
import type { BuiltRevision } from './build-revision.ts';
import { drawingOf } from './drawing.ts';
import { presentTable } from './presenter.ts';
import {
  findRevision,
  findTable,
  listRevisions,
  lockTable,
  type LockedTable,
  type RevisionRow,
} from './queries.ts';
import { insertNextRevision, insertTable, renameTable, storeArchived, type Place } from './store.ts';
import { unpackCodes } from './stored-codes.ts';

/** The transaction a command runs in, and who gave it. */
export interface Command {
  readonly transaction: Executor;
  readonly auditKey: AuditKey;
  readonly scope: Pick<TeamScope, 'teamId' | 'user'>;
}

/** How many revisions come along with a table. */
const newest = 20;

/** @throws {Problem} `not-found` */
export async function readTable(db: Executor, teamId: number, slug: string): Promise<LibraryTable> {
  const row = await findTable(db, teamId, slug);
  if (!row) throw noTable(slug);
  return presentTable(row, await listRevisions(db, teamId, row.id, newest));
}

export async function createTable(
  command: Command,
  { title, tags, playback, note }: Omit<CreateTable, 'definition'>,
  built: BuiltRevision,
): Promise<LibraryTable> {
  const slug = await insertTable(
    command.transaction,
    placeOf(command),
    { title, tags },
    { built, playback, note },
  );
  return concluded(command, slug, 'table.created', { title, tags, digest: built.digest });
}

/** @throws {Problem} `precondition-failed` with the table as it is now, where somebody has changed it since */
export async function addRevision(
  command: Command,
  slug: string,
  precondition: Precondition,
  { playback, note }: Omit<CreateRevision, 'definition'>,
  built: BuiltRevision,
): Promise<LibraryTable> {
  const table = await lockUnchanged(command, slug, precondition);
  if (table.isArchived) {
    throw new Problem('conflict', { detail: 'The table is archived; restore it, then save.' });
  }
  const number = await insertNextRevision(command.transaction, placeOf(command), table, {
    built,
    playback,
    note,
  });
  return concluded(command, slug, 'revision.saved', { number, note, digest: built.digest });
}

/** @throws {Problem} `precondition-failed` with the table as it is now, where somebody has changed it since */
export async function changeTable(
  command: Command,
  slug: string,
  precondition: Precondition,
  { title, tags }: ChangeTable,
): Promise<LibraryTable> {
  const table = await lockUnchanged(command, slug, precondition);
  const before = { title: table.title, tags: table.tags };
  const after = { title: title ?? before.title, tags: tags ?? before.tags };
  if (JSON.stringify(after) === JSON.stringify(before))
    return readTable(command.transaction, table.teamId, slug);
  await renameTable(command.transaction, placeOf(command), table, after);
  return concluded(command, slug, 'table.changed', { before, after });
}

/** Puts a table away or back; nothing happens where it is there already. */
export async function setArchived(
  command: Command,
  slug: string,
  isArchived: boolean,
): Promise<LibraryTable> {
  const table = await lock(command, slug);
  if (table.isArchived === isArchived) return readTable(command.transaction, table.teamId, slug);
  await storeArchived(command.transaction, placeOf(command), table, isArchived);
  return concluded(command, slug, isArchived ? 'table.archived' : 'table.restored', {});
}

/** Makes a new table whose first revision is a revision of another one, as it was computed then. */
export async function duplicateTable(
  command: Command,
  slug: string,
  { title, revision }: DuplicateTable,
): Promise<LibraryTable> {
  const { transaction, scope } = command;
  const table = await findTable(transaction, scope.teamId, slug);
  if (!table) throw noTable(slug);
  const number = revision ?? table.latestRevision;
  const original = await findRevision(transaction, scope.teamId, slug, number);
  if (!original) throw noRevision(slug, number);
  const named = { title: title ?? copyTitle(table.title), tags: table.tags };
  const made = await insertTable(transaction, placeOf(command), named, {
    built: asBuilt(original),
    playback: original.playback as Revision['playback'],
    note: '',
  });
  return concluded(command, made, 'table.duplicated', {
    ...named,
    from: { slug, number },
    digest: original.digest,
  });
}

const placeOf = ({ scope }: Command): Place => ({ teamId: scope.teamId, userId: scope.user.id });

async function lock({ transaction, scope }: Command, slug: string): Promise<LockedTable> {
  const table = await lockTable(transaction, scope.teamId, slug);
  if (!table) throw noTable(slug);
  return table;
}

async function lockUnchanged(
  command: Command,
  slug: string,
  precondition: Precondition,
): Promise<LockedTable> {
  const table = await lock(command, slug);
  if (precondition.holds(table.version)) return table;
  throw lostRace(await readTable(command.transaction, table.teamId, slug));
}

/** Notes what was done, last of all, and answers the table as it is now. */
async function concluded(
  { transaction, auditKey, scope }: Command,
  slug: string,
  action: AuditEntry['action'],
  details: AuditEntry['details'],
): Promise<LibraryTable> {
  const table = await readTable(transaction, scope.teamId, slug);
  await appendEvent(transaction, auditKey, {
    teamId: scope.teamId,
    actor: scope.user,
    action,
    subject: `table:${slug}`,
    details,
  });
  return table;
}

function asBuilt(row: RevisionRow): BuiltRevision {
  const codes = unpackCodes(row.codes);
  return {
    definition: row.definition as Definition,
    codes,
    report: row.report as Report,
    warnings: row.warnings as Warning[],
    engineVersion: row.engineVersion,
    digest: row.digest,
    drawing: drawingOf(codes, row.bits),
  };
}

/** Cut, where it must be, so that the whole has the 64 characters of a title, and not inside a surrogate pair. */
const copyTitle = (title: string) =>
  `${title
    .slice(0, 59)
    .replace(/[\ud800-\udbff]$/, '')
    .trimEnd()} copy`;
