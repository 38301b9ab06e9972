import { int, mysqlTable, varchar } from 'drizzle-orm/mysql-core';
import { createdAt, exactText, id, moment } from './columns.ts';

/** People. Identity belongs to a person, not to a team. */
export const users = mysqlTable('users', {
  id: id(),
  /** In lower case; 254 is the longest address that mail can carry (RFC 5321 §4.5.3.1.3, with erratum 1690 to RFC 3696). */
  email: exactText(254).notNull().unique(),
  name: varchar({ length: 100 }).notNull(),
  /** Argon2id in PHC string form; null for who signs in elsewhere only. */
  passwordHash: varchar('password_hash', { length: 255 }),
  emailVerifiedAt: moment('email_verified_at'),
  /** Raised to end every session at once. */
  sessionVersion: int('session_version', { unsigned: true }).notNull().default(1),
  createdAt: createdAt(),
});
