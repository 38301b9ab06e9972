import { int, json, mysqlTable, unique } from 'drizzle-orm/mysql-core';
import type { VettingLimits } from '../../../shared/contract/index.ts';
import { createdAt, exactText, id, reference } from './columns.ts';
import { teams } from './teams.ts';

/** What tables of a team have to keep to be vetted: all of them, or those with a tag. */
export const teamLimits = mysqlTable(
  'team_limits',
  {
    id: id(),
    teamId: reference('team_id')
      .notNull()
      .references(() => teams.id, { onDelete: 'cascade' }),
    /** '' for all tables. */
    tag: exactText(32).notNull(),
    limits: json().$type<VettingLimits>().notNull(),
    /** Raised by each change; what If-Match is compared with. */
    version: int({ unsigned: true }).notNull().default(1),
    createdAt: createdAt(),
  },
  (table) => [unique('team_limits_tag').on(table.teamId, table.tag)],
);
