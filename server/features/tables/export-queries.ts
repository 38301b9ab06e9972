import { and, eq, sql } from 'drizzle-orm';
import type { Database } from '../../db/client.ts';
import { once } from '../../db/once.ts';
import { revisions, teams, waveTables } from '../../db/schema/index.ts';

export interface RevisionPlace {
  readonly teamId: number;
  readonly slug: string;
  readonly number: number;
}

const exportable = once((db: Database) =>
  db
    .select({
      id: revisions.id,
      digest: revisions.digest,
      state: revisions.state,
      playback: revisions.playback,
      teamDefaults: teams.defaults,
    })
    .from(waveTables)
    .innerJoin(revisions, and(eq(revisions.teamId, waveTables.teamId), eq(revisions.tableId, waveTables.id)))
    .innerJoin(teams, eq(teams.id, waveTables.teamId))
    .where(
      and(
        eq(waveTables.teamId, sql.placeholder('teamId')),
        eq(waveTables.slug, sql.placeholder('slug')),
        eq(revisions.number, sql.placeholder('number')),
      ),
    )
    .prepare(),
);

/** What decides how a revision is exported; the bulk of it comes with `findExportContent`. */
export async function findExportable(db: Database, place: RevisionPlace) {
  const [row] = await exportable(db).execute({ ...place });
  return row as typeof row | undefined;
}

/** @param id of a revision that `findExportable` has found, in its team */
export async function findExportContent(db: Database, id: number) {
  const [row] = await db
    .select({
      definition: revisions.definition,
      codes: revisions.codes,
      report: revisions.report,
      engineVersion: revisions.engineVersion,
    })
    .from(revisions)
    .where(eq(revisions.id, id));
  return row;
}
