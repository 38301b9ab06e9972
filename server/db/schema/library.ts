import {
  bigint,
  boolean,
  customType,
  double,
  foreignKey,
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  smallint,
  tinyint,
  unique,
  varchar,
  type MySqlColumn,
} from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, moment, reference } from './columns.ts';
import { teams } from './teams.ts';
import { users } from './users.ts';

const bytes = (name: string, dataType: 'varbinary(128)' | 'mediumblob') =>
  customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => dataType })(name);

export const revisionStates = ['draft', 'in-review', 'vetted', 'returned', 'withdrawn'] as const;

/** Figures that the list shows and sorts by: those of the latest revision, kept on the table's row. */
const figures = {
  state: mysqlEnum(revisionStates).notNull().default('draft'),
  bits: tinyint({ unsigned: true }).notNull(),
  length: int({ unsigned: true }).notNull(),
  snrDb: double('snr_db'),
  tableBytes: int('table_bytes', { unsigned: true }).notNull(),
};

/** Which terms a row may have, as a bit pattern: read while walking an index, so that most rows need no closer look. */
const signature = (name: string) => bigint(name, { mode: 'bigint', unsigned: true }).notNull();

type Columns<Name extends string> = Record<Name, MySqlColumn>;

/** An order of the list. State and signatures come along: filters then read nothing but the index. */
const orderedBy = (
  table: Columns<'teamId' | 'isArchived' | 'id' | 'state' | 'signatureLow' | 'signatureHigh'>,
  column: MySqlColumn,
) =>
  [
    table.teamId,
    table.isArchived,
    column,
    table.id,
    table.state,
    table.signatureLow,
    table.signatureHigh,
  ] as const;

/** A table of the library: a title and tags over a row of revisions. */
export const waveTables = mysqlTable(
  'wave_tables',
  {
    id: id(),
    teamId: reference('team_id')
      .notNull()
      .references(() => teams.id, { onDelete: 'cascade' }),
    slug: exactText(70).notNull(),
    title: varchar({ length: 64 }).notNull(),
    tags: json().$type<string[]>().notNull(),
    signatureLow: signature('signature_low'),
    signatureHigh: signature('signature_high'),
    isArchived: boolean('is_archived').notNull().default(false),
    /** Raised by each change; what If-Match is compared with. */
    version: int({ unsigned: true }).notNull().default(1),
    latestRevision: int('latest_revision', { unsigned: true }).notNull(),
    ...figures,
    /** Low and high of up to 64 columns, interleaved: a small drawing of the staircase. */
    drawing: bytes('drawing', 'varbinary(128)').notNull(),
    createdBy: reference('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    changedBy: reference('changed_by').references(() => users.id, { onDelete: 'set null' }),
    changedAt: moment('changed_at').notNull(),
  },
  (table) => [
    unique('wave_tables_slug').on(table.teamId, table.slug),
    unique('wave_tables_team_id').on(table.teamId, table.id),
    index('wave_tables_state').on(table.teamId, table.isArchived, table.state, table.id),
    index('wave_tables_changed').on(...orderedBy(table, table.changedAt)),
    index('wave_tables_title').on(...orderedBy(table, table.title)),
    index('wave_tables_snr').on(...orderedBy(table, table.snrDb)),
    index('wave_tables_bytes').on(...orderedBy(table, table.tableBytes)),
    index('wave_tables_length').on(...orderedBy(table, table.length)),
    index('wave_tables_bits').on(...orderedBy(table, table.bits)),
  ],
);

/** What a table is found by: the words of its title and tags and, behind `#`, each tag as a whole. */
export const tableTerms = mysqlTable(
  'table_terms',
  {
    teamId: reference('team_id').notNull(),
    tableId: reference('table_id').notNull(),
    /** As the table's, so that a term is counted and read for the tables of one kind only. */
    isArchived: boolean('is_archived').notNull().default(false),
    term: exactText(64).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.isArchived, table.term, table.tableId] }),
    unique('table_terms_table').on(table.teamId, table.tableId, table.term),
    foreignKey({
      name: 'table_terms_table_fk',
      columns: [table.teamId, table.tableId],
      foreignColumns: [waveTables.teamId, waveTables.id],
    }).onDelete('cascade'),
  ],
);

/** What was saved, as it was computed here. Only the state ever changes. */
export const revisions = mysqlTable(
  'revisions',
  {
    id: id(),
    teamId: reference('team_id').notNull(),
    tableId: reference('table_id').notNull(),
    number: int({ unsigned: true }).notNull(),
    ...figures,
    definition: json().notNull(),
    playback: json(),
    report: json().notNull(),
    warnings: json().notNull(),
    /** Codes as 16-bit words, low byte first. */
    codes: bytes('codes', 'mediumblob').notNull(),
    engineVersion: exactText(20, 'engine_version').notNull(),
    digest: exactText(64).notNull(),
    note: varchar({ length: 2000 }).notNull().default(''),
    madeBy: reference('made_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [
    unique('revisions_number').on(table.teamId, table.tableId, table.number),
    unique('revisions_team_id').on(table.teamId, table.id),
    index('revisions_digest').on(table.teamId, table.digest),
    // The last vetted one of a table, without reading any other.
    index('revisions_state').on(table.teamId, table.tableId, table.state, table.number),
    foreignKey({
      name: 'revisions_table_fk',
      columns: [table.teamId, table.tableId],
      foreignColumns: [waveTables.teamId, waveTables.id],
    }).onDelete('cascade'),
  ],
);

/** Answers to POSTs that carried an Idempotency-Key, so that a repeated one gets the same answer. */
export const idempotencyKeys = mysqlTable(
  'idempotency_keys',
  {
    userId: reference('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    key: exactText(100).notNull(),
    /** SHA-256 of method, path and body: one key, one request. */
    requestHash: exactText(64, 'request_hash').notNull(),
    status: smallint({ unsigned: true }),
    headers: json(),
    body: json(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.userId, table.key] }),
    index('idempotency_keys_age').on(table.createdAt),
  ],
);
