import { boolean, mysqlEnum, mysqlTable, primaryKey } from 'drizzle-orm/mysql-core';
import { moment, reference } from './columns.ts';
import { users } from './users.ts';

export const noticeKinds = ['review-asked', 'verdict', 'comment', 'withdrawal'] as const;

/** What mail a person wants; where there is no row, they want it. */
export const noticeChoices = mysqlTable(
  'notice_choices',
  {
    userId: reference('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    kind: mysqlEnum(noticeKinds).notNull(),
    isWanted: boolean('is_wanted').notNull(),
    changedAt: moment('changed_at').notNull(),
  },
  (table) => [primaryKey({ columns: [table.userId, table.kind] })],
);
