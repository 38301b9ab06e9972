import { and, eq } from 'drizzle-orm';
import { originalLimits, type OriginalKind } from '../../../shared/contract/index.ts';
import { appendEvent } from '../../audit/append-event.ts';
import type { AuditKey } from '../../audit/mac.ts';
import { lockTeam } from '../../auth/team-lock.ts';
import type { TeamScope } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { uploads } from '../../db/schema/index.ts';
import { Problem } from '../../http/problem.ts';
import { noRevision } from '../../tables/not-there.ts';
import { bytesOfTeam, findRevisionId, listUploads, type UploadRow } from './queries.ts';

/** The transaction a command runs in, who gave it, and the revision it is about. */
export interface Command {
  readonly transaction: Executor;
  readonly auditKey: AuditKey;
  readonly scope: TeamScope;
  readonly slug: string;
  readonly number: number;
}

export interface NewUpload {
  readonly name: string;
  readonly kind: OriginalKind;
  readonly sha256: string;
  readonly content: Buffer;
}

/**
 * Keeps a file with a revision; the same bytes once more are the file that is kept already. The team's row is locked
 * first, so that two who come at once cannot both take the last of its room.
 *
 * @throws {Problem} `not-found`; `conflict` where the team or the revision has as much as it may
 */
export async function keepUpload(
  command: Command,
  { name, kind, sha256, content }: NewUpload,
): Promise<{ row: UploadRow; isNew: boolean }> {
  const { transaction, scope } = command;
  const { teamId, user } = scope;
  await lockTeam(transaction, scope, 'author');
  const revisionId = await revisionOf(command);
  const kept = await listUploads(transaction, teamId, revisionId);
  const same = kept.find((row) => row.sha256 === sha256);
  if (same) return { row: same, isNew: false };
  await refuseFull(transaction, teamId, kept.length, content.length);

  await transaction.insert(uploads).values({
    teamId,
    revisionId,
    name,
    kind,
    bytes: content.length,
    sha256,
    content,
    keptBy: user.id,
    keptAt: new Date(),
  });
  const row = (await listUploads(transaction, teamId, revisionId)).find((other) => other.sha256 === sha256);
  if (!row) throw new Error('The upload was not stored.');
  await noteEvent(command, 'original.kept', row);
  return { row, isNew: true };
}

/** @throws {Problem} `not-found` */
export async function removeUpload(command: Command, id: number | undefined): Promise<void> {
  const { transaction, scope } = command;
  await lockTeam(transaction, scope, 'admin');
  const revisionId = await revisionOf(command);
  const row = (await listUploads(transaction, scope.teamId, revisionId)).find((other) => other.id === id);
  if (!row) throw noUpload(command.slug, command.number);
  await transaction.delete(uploads).where(and(eq(uploads.teamId, scope.teamId), eq(uploads.id, row.id)));
  await noteEvent(command, 'original.removed', row);
}

export const noUpload = (slug: string, number: number | string) =>
  new Problem('not-found', { detail: `Revision ${number} of ${slug} has no such original.` });

async function revisionOf({ transaction, scope, slug, number }: Command): Promise<number> {
  const id = await findRevisionId(transaction, scope.teamId, slug, number);
  if (id === undefined) throw noRevision(slug, number);
  return id;
}

async function refuseFull(db: Executor, teamId: number, count: number, bytes: number): Promise<void> {
  const { perRevision, teamBytes } = originalLimits;
  if (count >= perRevision) {
    throw new Problem('conflict', { detail: `The revision has ${count} originals, as many as it may.` });
  }
  const taken = await bytesOfTeam(db, teamId);
  if (taken + bytes > teamBytes) {
    throw new Problem('conflict', {
      detail:
        `The team's originals take ${taken} bytes; with the ${bytes} of this file they would be more than the ` +
        `${teamBytes} it may have. An admin can remove old ones.`,
    });
  }
}

const noteEvent = (
  { transaction, auditKey, scope, slug, number }: Command,
  action: 'original.kept' | 'original.removed',
  { id, name, kind, bytes, sha256 }: UploadRow,
) =>
  appendEvent(transaction, auditKey, {
    teamId: scope.teamId,
    actor: scope.user,
    action,
    subject: `table:${slug}`,
    details: { number, original: id, name, kind, bytes, sha256 },
  });
