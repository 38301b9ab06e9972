import { and, eq } from 'drizzle-orm';
import { limits, teamLimits, type Revision } from '../../../shared/contract/index.ts';
import type { Executor } from '../../db/client.ts';
import { errno, errnoOf } from '../../db/errors.ts';
import { revisions, tableTerms, waveTables } from '../../db/schema/index.ts';
import { Problem } from '../../http/problem.ts';
import { numbered } from '../../text/slugs.ts';
import type { BuiltRevision } from './build-revision.ts';
import { countTables } from './queries.ts';
import { signatureOf, termsOf } from './search-terms.ts';
import { firstFreeNumber, slugFrom } from './slugs.ts';
import { packCodes } from './stored-codes.ts';

export interface Place {
  readonly teamId: number;
  readonly userId: number;
}

export interface Named {
  readonly title: string;
  readonly tags: readonly string[];
}

export interface Saved {
  readonly built: BuiltRevision;
  readonly playback: Revision['playback'];
  readonly note: string;
}

/** What the table's row shows of its newest revision. */
const shownOf = ({ definition: { table }, report, drawing }: BuiltRevision) => ({
  state: 'draft' as const,
  bits: table.bits,
  length: table.length,
  snrDb: report.snrDb,
  tableBytes: report.tableBytes,
  drawing: Buffer.from(drawing),
});

const signatureColumns = (named: Named) => {
  const { low, high } = signatureOf(termsOf(named));
  return { signatureLow: low, signatureHigh: high };
};

/**
 * Stores a new table with its first revision, under a free address made from its title; answers that.
 *
 * @throws {Problem} `conflict` (409) where the team has as many tables as it may
 */
export async function insertTable(
  db: Executor,
  { teamId, userId }: Place,
  named: Named,
  saved: Saved,
): Promise<string> {
  await refuseFull(db, teamId);
  const now = new Date();
  const row = {
    teamId,
    ...named,
    tags: [...named.tags],
    ...signatureColumns(named),
    ...shownOf(saved.built),
    latestRevision: 1,
    createdBy: userId,
    createdAt: now,
    changedBy: userId,
    changedAt: now,
  };
  const { id, slug } = await insertUnderFreeSlug(db, row);
  await insertTerms(db, { teamId, tableId: id, isArchived: false }, named);
  await insertRevision(db, { teamId, userId }, id, 1, saved);
  return slug;
}

/** Gives the table its next revision, under the number after its newest. */
export async function insertNextRevision(
  db: Executor,
  place: Place,
  table: { readonly id: number; readonly latestRevision: number; readonly version: number },
  saved: Saved,
): Promise<number> {
  const number = table.latestRevision + 1;
  if (number > limits.revisionsPerTable) {
    throw new Problem('conflict', {
      detail: `This table has ${table.latestRevision} revisions, as many as one may; duplicate it to go on.`,
    });
  }
  await insertRevision(db, place, table.id, number, saved);
  await changeRow(db, place, table, { ...shownOf(saved.built), latestRevision: number });
  return number;
}

/** Gives the table another title or other tags, and makes it found by them. */
export async function renameTable(
  db: Executor,
  place: Place,
  table: { readonly id: number; readonly version: number; readonly isArchived: boolean },
  named: Named,
): Promise<void> {
  await changeRow(db, place, table, {
    title: named.title,
    tags: [...named.tags],
    ...signatureColumns(named),
  });
  await db.delete(tableTerms).where(termsOfTable(place.teamId, table.id));
  await insertTerms(db, { teamId: place.teamId, tableId: table.id, isArchived: table.isArchived }, named);
}

export async function storeArchived(
  db: Executor,
  place: Place,
  table: { readonly id: number; readonly version: number },
  isArchived: boolean,
): Promise<void> {
  await changeRow(db, place, table, { isArchived });
  await db.update(tableTerms).set({ isArchived }).where(termsOfTable(place.teamId, table.id));
}

const changeRow = (
  db: Executor,
  { teamId, userId }: Place,
  { id, version }: { readonly id: number; readonly version: number },
  changes: Partial<typeof waveTables.$inferInsert>,
) =>
  db
    .update(waveTables)
    .set({ ...changes, version: version + 1, changedBy: userId, changedAt: new Date() })
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.id, id)));

const termsOfTable = (teamId: number, tableId: number) =>
  and(eq(tableTerms.teamId, teamId), eq(tableTerms.tableId, tableId));

async function insertTerms(
  db: Executor,
  row: { readonly teamId: number; readonly tableId: number; readonly isArchived: boolean },
  named: Named,
): Promise<void> {
  const rows = termsOf(named).map((term) => ({ ...row, term }));
  // A title may have neither letters nor digits.
  if (rows.length > 0) await db.insert(tableTerms).values(rows);
}

const insertRevision = (
  db: Executor,
  { teamId, userId }: Place,
  tableId: number,
  number: number,
  { built, playback, note }: Saved,
) => {
  const { drawing: _, ...shown } = shownOf(built);
  return db.insert(revisions).values({
    teamId,
    tableId,
    number,
    ...shown,
    definition: built.definition,
    playback,
    report: built.report,
    warnings: built.warnings,
    codes: packCodes(built.codes),
    engineVersion: built.engineVersion,
    digest: built.digest,
    note,
    madeBy: userId,
    createdAt: new Date(),
  });
};

async function refuseFull(db: Executor, teamId: number): Promise<void> {
  const tables = await countTables(db, teamId);
  if (tables < teamLimits.tables) return;
  throw new Problem('conflict', {
    detail: `The team has ${tables} tables, archived ones included, as many as it may.`,
  });
}

/** Two that save under the same title at once see the same number free: the later one takes the next. */
async function insertUnderFreeSlug(
  db: Executor,
  row: Omit<typeof waveTables.$inferInsert, 'slug'>,
): Promise<{ id: number; slug: string }> {
  const base = slugFrom(row.title);
  const first = await firstFreeNumber(db, row.teamId, base);
  for (let number = first; ; number += 1) {
    const slug = numbered(base, number);
    try {
      const [{ id }] = await db
        .insert(waveTables)
        .values({ ...row, slug })
        .$returningId();
      return { id, slug };
    } catch (error) {
      if (errnoOf(error) !== errno.duplicate || number - first > 20) throw error;
    }
  }
}
