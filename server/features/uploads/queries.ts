import { and, asc, eq, sum } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { revisions, uploads, users, waveTables } from '../../db/schema/index.ts';

/** Id of a revision of the team; undefined where the team has none of that address. */
export async function findRevisionId(
  db: Executor,
  teamId: number,
  slug: string,
  number: number,
): Promise<number | undefined> {
  const [row] = await db
    .select({ id: revisions.id })
    .from(waveTables)
    .innerJoin(revisions, and(eq(revisions.teamId, waveTables.teamId), eq(revisions.tableId, waveTables.id)))
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.slug, slug), eq(revisions.number, number)));
  return (row as typeof row | undefined)?.id;
}

const columns = {
  id: uploads.id,
  name: uploads.name,
  kind: uploads.kind,
  bytes: uploads.bytes,
  sha256: uploads.sha256,
  keptById: uploads.keptBy,
  keptByName: users.name,
  keptAt: uploads.keptAt,
};

const ofRevision = (teamId: number, revisionId: number) =>
  and(eq(uploads.teamId, teamId), eq(uploads.revisionId, revisionId));

/** A revision's originals, first kept first, without their content. */
export const listUploads = (db: Executor, teamId: number, revisionId: number) =>
  db
    .select(columns)
    .from(uploads)
    .leftJoin(users, eq(users.id, uploads.keptBy))
    .where(ofRevision(teamId, revisionId))
    .orderBy(asc(uploads.id));
export type UploadRow = Awaited<ReturnType<typeof listUploads>>[number];

export async function findContent(db: Executor, teamId: number, revisionId: number, id: number) {
  const [row] = await db
    .select({ name: uploads.name, content: uploads.content })
    .from(uploads)
    .where(and(ofRevision(teamId, revisionId), eq(uploads.id, id)));
  return row as typeof row | undefined;
}

/** Bytes of all originals of a team. */
export async function bytesOfTeam(db: Executor, teamId: number): Promise<number> {
  const [row] = await db
    .select({ bytes: sum(uploads.bytes) })
    .from(uploads)
    .where(eq(uploads.teamId, teamId));
  return Number(row.bytes ?? 0);
}
