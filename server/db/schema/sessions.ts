import { index, int, mysqlEnum, mysqlTable, varchar } from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, moment, reference } from './columns.ts';
import { mailOutbox } from './mail.ts';
import { roles, teams } from './teams.ts';
import { users } from './users.ts';

/** Sign-ins that can be listed and ended one by one. The cookie holds the id; the row says whether it still counts. */
export const sessions = mysqlTable(
  'sessions',
  {
    /** 128 random bits in base64url. */
    id: exactText(22).primaryKey(),
    userId: reference('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** The user's session version at sign-in; a raised one ends the session. */
    sessionVersion: int('session_version', { unsigned: true }).notNull(),
    /** The browser as it names itself, shortened. */
    client: varchar({ length: 200 }).notNull(),
    createdAt: createdAt(),
    lastSeenAt: moment('last_seen_at').notNull(),
    expiresAt: moment('expires_at').notNull(),
    revokedAt: moment('revoked_at'),
  },
  (table) => [index('sessions_user').on(table.userId), index('sessions_expiry').on(table.expiresAt)],
);

export const linkPurposes = ['verify-address', 'reset-password', 'change-address', 'invitation'] as const;

/** Links that are sent by mail: they work once, only by POST, and only their hash is kept. */
export const oneTimeLinks = mysqlTable(
  'one_time_links',
  {
    id: id(),
    /** SHA-256 of the token, in hex. */
    tokenHash: exactText(64, 'token_hash').notNull().unique(),
    purpose: mysqlEnum(linkPurposes).notNull(),
    /** The address it was sent to and is bound to. */
    email: exactText(254).notNull(),
    userId: reference('user_id').references(() => users.id, { onDelete: 'cascade' }),
    teamId: reference('team_id').references(() => teams.id, { onDelete: 'cascade' }),
    role: mysqlEnum(roles),
    /** The mail that carries it: shows whether it got there. */
    mailId: reference('mail_id').references(() => mailOutbox.id, { onDelete: 'set null' }),
    createdBy: reference('created_by').references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    expiresAt: moment('expires_at').notNull(),
    usedAt: moment('used_at'),
  },
  (table) => [
    index('one_time_links_user').on(table.userId, table.purpose),
    index('one_time_links_team').on(table.teamId, table.purpose),
    index('one_time_links_expiry').on(table.expiresAt),
  ],
);
