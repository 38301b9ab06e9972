import {
  customType,
  foreignKey,
  index,
  int,
  mysqlEnum,
  mysqlTable,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core';
import { originalKinds } from '../../../shared/contract/index.ts';
import { createdAt, exactText, id, reference } from './columns.ts';
import { revisions } from './library.ts';
import { users } from './users.ts';

const content = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'mediumblob' });

/** Files that revisions were made from, byte by byte. A row never changes; it can be removed. */
export const uploads = mysqlTable(
  'uploads',
  {
    id: id(),
    teamId: reference('team_id').notNull(),
    revisionId: reference('revision_id').notNull(),
    name: varchar({ length: 120 }).notNull(),
    kind: mysqlEnum(originalKinds).notNull(),
    bytes: int({ unsigned: true }).notNull(),
    /** In hex; a revision has each file once. */
    sha256: exactText(64).notNull(),
    content: content('content').notNull(),
    keptBy: reference('kept_by').references(() => users.id, { onDelete: 'set null' }),
    keptAt: createdAt(),
  },
  (table) => [
    unique('uploads_revision').on(table.teamId, table.revisionId, table.sha256),
    // What a team's originals take in all is summed up from the index alone.
    index('uploads_bytes').on(table.teamId, table.bytes),
    foreignKey({
      name: 'uploads_revision_fk',
      columns: [table.teamId, table.revisionId],
      foreignColumns: [revisions.teamId, revisions.id],
    }).onDelete('cascade'),
  ],
);
