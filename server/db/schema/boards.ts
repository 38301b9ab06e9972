import {
  boolean,
  foreignKey,
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  tinyint,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, moment, reference } from './columns.ts';
import { teams } from './teams.ts';
import { users } from './users.ts';

const outputKinds = ['ladder', 'on-chip', 'serial', 'pwm'] as const;

/** What the list shows: of the newest revision, kept on the board's row. */
const shown = {
  outputKind: mysqlEnum('output_kind', outputKinds).notNull(),
  bits: tinyint({ unsigned: true }).notNull(),
};

/** A board of a team: a name over a row of revisions. */
export const boards = mysqlTable(
  'boards',
  {
    id: id(),
    teamId: reference('team_id')
      .notNull()
      .references(() => teams.id, { onDelete: 'cascade' }),
    slug: exactText(70).notNull(),
    name: varchar({ length: 64 }).notNull(),
    ...shown,
    /** Retired boards stay readable, for the files that were made for them. */
    isRetired: boolean('is_retired').notNull().default(false),
    /** Raised by each change; what If-Match is compared with. */
    version: int({ unsigned: true }).notNull().default(1),
    latestRevision: int('latest_revision', { unsigned: true }).notNull(),
    createdBy: reference('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    changedBy: reference('changed_by').references(() => users.id, { onDelete: 'set null' }),
    changedAt: moment('changed_at').notNull(),
  },
  (table) => [
    unique('boards_slug').on(table.teamId, table.slug),
    unique('boards_team_id').on(table.teamId, table.id),
    index('boards_name').on(table.teamId, table.isRetired, table.name, table.id),
  ],
);

/** What was saved, as it was parsed here; never changes. */
export const boardRevisions = mysqlTable(
  'board_revisions',
  {
    id: id(),
    teamId: reference('team_id').notNull(),
    boardId: reference('board_id').notNull(),
    number: int({ unsigned: true }).notNull(),
    ...shown,
    board: json().notNull(),
    digest: exactText(64).notNull(),
    note: varchar({ length: 2000 }).notNull().default(''),
    madeBy: reference('made_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [
    unique('board_revisions_number').on(table.teamId, table.boardId, table.number),
    unique('board_revisions_team_id').on(table.teamId, table.id),
    foreignKey({
      name: 'board_revisions_board_fk',
      columns: [table.teamId, table.boardId],
      foreignColumns: [boards.teamId, boards.id],
    }).onDelete('cascade'),
  ],
);
