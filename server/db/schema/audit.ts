import { bigint, index, json, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core';
import { exactText, moment, reference } from './columns.ts';
import { teams } from './teams.ts';

const sequence = (name: string) => bigint(name, { mode: 'number', unsigned: true });

/** Where each team's chain of events ends. Locked last in every transaction that adds to it. */
export const auditHeads = mysqlTable('audit_heads', {
  teamId: reference('team_id')
    .primaryKey()
    .references(() => teams.id, { onDelete: 'cascade' }),
  lastSequence: sequence('last_sequence').notNull().default(0),
  lastMac: exactText(64, 'last_mac').notNull().default(''),
});

/** Who did what, when: each row's MAC covers the row and the MAC before it. */
export const auditEvents = mysqlTable(
  'audit_events',
  {
    /** By way of the head, which is locked already: a check on the team's row would have to wait for who changes that. */
    teamId: reference('team_id')
      .notNull()
      .references(() => auditHeads.teamId, { onDelete: 'cascade' }),
    sequence: sequence('sequence').notNull(),
    at: moment('at').notNull(),
    /** Stays when the account goes: the MAC covers it. */
    actorId: reference('actor_id').notNull(),
    /** As the person was called then. */
    actorName: varchar('actor_name', { length: 100 }).notNull(),
    /** `table.created`, `member.role-changed`, … */
    action: exactText(60).notNull(),
    /** What it was done to: `table:fog-signal`, `member:17`. */
    subject: exactText(160).notNull(),
    details: json().notNull(),
    /** HMAC-SHA-256 in hex, by a key outside the database. */
    mac: exactText(64).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.sequence] }),
    index('audit_events_subject').on(table.teamId, table.subject, table.sequence),
    // One for each other filter; what the filters beside it read comes along, so that rows left out are never fetched.
    index('audit_events_actor').on(table.teamId, table.actorId, table.sequence, table.action, table.at),
    index('audit_events_action').on(table.teamId, table.action, table.sequence, table.actorId, table.at),
    index('audit_events_moment').on(table.teamId, table.at, table.sequence, table.actorId, table.action),
  ],
);
