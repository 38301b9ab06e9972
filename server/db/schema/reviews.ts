import {
  foreignKey,
  index,
  json,
  mysqlEnum,
  mysqlTable,
  smallint,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core';
import type { LimitOutcome } from '../../../shared/contract/index.ts';
import { createdAt, exactText, id, moment, reference } from './columns.ts';
import { revisions } from './library.ts';
import { users } from './users.ts';

export const verdicts = ['vetted', 'returned'] as const;

const person = (name: string) => reference(name).references(() => users.id, { onDelete: 'set null' });

/** What came of a revision that was submitted: one row a revision, as each goes to review once. */
export const reviews = mysqlTable(
  'reviews',
  {
    id: id(),
    teamId: reference('team_id').notNull(),
    revisionId: reference('revision_id').notNull(),
    /** As the revision's, so that the list knows whose it is without opening that. */
    madeBy: person('made_by'),
    submittedBy: person('submitted_by'),
    submittedAt: moment('submitted_at').notNull(),
    message: varchar({ length: 2000 }).notNull(),
    /** Limits that failed when it was submitted; with a verdict, when that was given. */
    failedLimits: smallint('failed_limits', { unsigned: true }).notNull(),
    /** Null while it waits. */
    verdict: mysqlEnum(verdicts),
    decidedBy: person('decided_by'),
    decidedAt: moment('decided_at'),
    note: varchar({ length: 2000 }).notNull().default(''),
    /** How the revision stood against the team's limits when the verdict was given. */
    limits: json().$type<LimitOutcome[]>(),
    withdrawnBy: person('withdrawn_by'),
    withdrawnAt: moment('withdrawn_at'),
    reason: varchar({ length: 2000 }).notNull().default(''),
  },
  (table) => [
    unique('reviews_revision').on(table.teamId, table.revisionId),
    // The waiting ones, longest first; whose they are comes along, so that counting reads nothing but the index.
    index('reviews_waiting').on(
      table.teamId,
      table.verdict,
      table.submittedAt,
      table.id,
      table.submittedBy,
      table.madeBy,
    ),
    index('reviews_mine').on(table.teamId, table.submittedBy, table.submittedAt, table.id),
    index('reviews_decided').on(table.teamId, table.decidedAt, table.id),
    foreignKey({
      name: 'reviews_revision_fk',
      columns: [table.teamId, table.revisionId],
      foreignColumns: [revisions.teamId, revisions.id],
    }).onDelete('cascade'),
  ],
);

/** What is said about a revision, or about one setting of it. */
export const comments = mysqlTable(
  'comments',
  {
    id: id(),
    teamId: reference('team_id').notNull(),
    revisionId: reference('revision_id').notNull(),
    writtenBy: person('written_by'),
    text: varchar({ length: 2000 }).notNull(),
    /** The setting, as refusals name it: `table.bits`; null where the whole is meant. */
    path: exactText(200),
    createdAt: createdAt(),
  },
  (table) => [
    index('comments_of_revision').on(table.teamId, table.revisionId, table.id),
    foreignKey({
      name: 'comments_revision_fk',
      columns: [table.teamId, table.revisionId],
      foreignColumns: [revisions.teamId, revisions.id],
    }).onDelete('cascade'),
  ],
);
