import {
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
    index('wave_tables_changed').on(table.teamId, table.isArchived, table.changedAt, table.id),
    index('wave_tables_title').on(table.teamId, table.isArchived, table.title, table.id),
    index('wave_tables_snr').on(table.teamId, table.isArchived, table.snrDb, table.id),
    index('wave_tables_bytes').on(table.teamId, table.isArchived, table.tableBytes, table.id),
    index('wave_tables_length').on(table.teamId, table.isArchived, table.length, table.id),
    index('wave_tables_bits').on(table.teamId, table.isArchived, table.bits, table.id),
  ],
);

export const tableTags = mysqlTable(
  'table_tags',
  {
    teamId: reference('team_id').notNull(),
    tableId: reference('table_id').notNull(),
    tag: exactText(32).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.tag, table.tableId] }),
    index('table_tags_table').on(table.teamId, table.tableId),
    foreignKey({
      name: 'table_tags_table_fk',
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
  (table) => [primaryKey({ columns: [table.userId, table.key] }), index('idempotency_keys_age').on(table.createdAt)],
);
