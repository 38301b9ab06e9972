import { and, eq, gt, isNull, sql } from 'drizzle-orm';
import type { Database } from '../db/client.ts';
import { once } from '../db/once.ts';
import { memberships, sessions, teams, users } from '../db/schema/index.ts';
import type { SessionClaims } from './session-token.ts';

/** How stale "last seen" may be, in ms: not every request is worth a write. */
const seenEvery = 5 * 60 * 1000;

const person = {
  sessionId: sessions.id,
  lastSeenAt: sessions.lastSeenAt,
  userId: users.id,
  name: users.name,
  email: users.email,
};

const belongsToUser = and(eq(users.id, sessions.userId), eq(users.sessionVersion, sessions.sessionVersion));

const isAlive = and(
  eq(sessions.id, sql.placeholder('sessionId')),
  eq(sessions.userId, sql.placeholder('userId')),
  eq(sessions.sessionVersion, sql.placeholder('sessionVersion')),
  isNull(sessions.revokedAt),
  gt(sessions.expiresAt, sql.placeholder('now')),
);

const userQuery = (db: Database) =>
  db.select(person).from(sessions).innerJoin(users, belongsToUser).where(isAlive).prepare();

const memberQuery = (db: Database) =>
  db
    .select({ ...person, teamId: teams.id, role: memberships.role })
    .from(sessions)
    .innerJoin(users, belongsToUser)
    .leftJoin(teams, eq(teams.slug, sql.placeholder('teamSlug')))
    .leftJoin(memberships, and(eq(memberships.teamId, teams.id), eq(memberships.userId, users.id)))
    .where(isAlive)
    .prepare();

const preparedUser = once(userQuery);
const preparedMember = once(memberQuery);

export interface SessionRow {
  readonly sessionId: string;
  readonly lastSeenAt: Date;
  readonly userId: number;
  readonly name: string;
  readonly email: string;
}

/** The person of a session that is neither ended nor run out. */
export async function findUser(db: Database, claims: SessionClaims): Promise<SessionRow | undefined> {
  const [row] = await preparedUser(db).execute({ ...claims, now: new Date() });
  return row;
}

/** The same, with the person's place in a team, in one query. */
export async function findMember(db: Database, claims: SessionClaims, teamSlug: string) {
  const [row] = await preparedMember(db).execute({ ...claims, teamSlug, now: new Date() });
  return row as typeof row | undefined;
}

/** Notes that the session is in use, every few minutes. */
export async function noteSeen(db: Database, { sessionId, lastSeenAt }: SessionRow): Promise<void> {
  const now = new Date();
  if (now.getTime() - lastSeenAt.getTime() < seenEvery) return;
  await db.update(sessions).set({ lastSeenAt: now }).where(eq(sessions.id, sessionId));
}
