import {
  boolean,
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  varchar,
} from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, reference } from './columns.ts';
import { users } from './users.ts';

/** Teams own every row that is not a person's identity. */
export const teams = mysqlTable('teams', {
  id: id(),
  slug: exactText(60).notNull().unique(),
  name: varchar({ length: 100 }).notNull(),
  /** What new tables begin with, as the contract has it. */
  defaults: json().notNull(),
  /** Whether nobody judges a revision that is their own. */
  twoPersonRule: boolean('two_person_rule').notNull().default(true),
  /** Raised by each change; what If-Match is compared with. */
  version: int({ unsigned: true }).notNull().default(1),
  createdAt: createdAt(),
});

/** Each role includes the ones before it. */
export const roles = ['viewer', 'author', 'reviewer', 'admin'] as const;

/** Who belongs to which team, and as what. */
export const memberships = mysqlTable(
  'memberships',
  {
    teamId: reference('team_id')
      .notNull()
      .references(() => teams.id, { onDelete: 'cascade' }),
    userId: reference('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    role: mysqlEnum(roles).notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.userId] }),
    index('memberships_user').on(table.userId),
  ],
);
