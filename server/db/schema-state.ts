import type { Connection, Pool, RowDataPacket } from 'mysql2/promise';
import type { Migration } from './journal.ts';

/** A database whose tables are not those of this version of the program. */
export class SchemaFault extends Error {
  override readonly name = 'SchemaFault';
}

/** How far one migration has come: how many of its statements are done, and which file they came from. */
interface Progress {
  readonly hash: string;
  readonly done: number;
}

export type AppliedMigrations = ReadonlyMap<string, Progress>;

/** What the database has seen, from the record that `migrate` keeps in it. */
export async function readApplied(
  connection: Connection | Pool,
  database: string,
): Promise<AppliedMigrations> {
  const [tables] = await connection.query<RowDataPacket[]>(
    "SELECT 1 FROM information_schema.tables WHERE table_schema = ? AND table_name = 'schema_steps'",
    [database],
  );
  if (tables.length === 0) return new Map();
  const [rows] = await connection.query<RowDataPacket[]>(
    'SELECT migration, MIN(hash) AS hash, COUNT(done_at) AS done FROM schema_steps GROUP BY migration',
  );
  return new Map(
    rows.map((row) => [String(row.migration), { hash: String(row.hash), done: Number(row.done) }]),
  );
}

export interface SchemaState {
  /** Not applied yet, or not to the end. */
  readonly behind: readonly string[];
  /** Applied, but unknown here: a newer version of the program was at work. */
  readonly ahead: readonly string[];
  /** Applied from a file that has other content now. */
  readonly changed: readonly string[];
}

export function compareSchema(journal: readonly Migration[], applied: AppliedMigrations): SchemaState {
  const known = new Set(journal.map(({ tag }) => tag));
  const isDone = ({ tag, statements }: Migration) => applied.get(tag)?.done === statements.length;
  const isChanged = ({ tag, hash }: Migration) => applied.has(tag) && applied.get(tag)?.hash !== hash;
  return {
    behind: journal.filter((entry) => !isDone(entry)).map(({ tag }) => tag),
    ahead: [...applied.keys()].filter((tag) => !known.has(tag)),
    changed: journal.filter(isChanged).map(({ tag }) => tag),
  };
}

/** @throws {SchemaFault} where no migration of ours can lead from there to here */
export function refuseForeign({ ahead, changed }: SchemaState): void {
  if (ahead.length > 0) {
    throw new SchemaFault(
      `The database is ahead of this program: it has ${ahead.join(', ')}, which is unknown here. Update the program.`,
    );
  }
  if (changed.length > 0) {
    throw new SchemaFault(
      `The database was made by another version of ${changed.join(', ')}: a migration must not change once it has run.`,
    );
  }
}

/** @throws {SchemaFault} unless the database is exactly what the journal says */
export function refuseInexact(state: SchemaState): void {
  refuseForeign(state);
  if (state.behind.length > 0) {
    throw new SchemaFault(
      `The database is behind this program: it lacks ${state.behind.join(', ')}. Run: npm run migrate`,
    );
  }
}
