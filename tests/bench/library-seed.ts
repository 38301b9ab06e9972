import { randomBytes } from 'node:crypto';
import mysql, { type Connection, type RowDataPacket } from 'mysql2/promise';
import { cookieName, sealClaims, type SessionClaims } from '../../server/auth/session-token.ts';
import { connectionOptions, openDatabase } from '../../server/db/client.ts';
import { createDatabase, migrate } from '../../server/db/migrate.ts';
import { auditHeads, memberships, sessions, teams, users } from '../../server/db/schema/index.ts';
import { buildRevision } from '../../server/features/tables/build-revision.ts';
import { signatureOf, termsOf } from '../../server/features/tables/search-terms.ts';
import { slugFrom } from '../../server/features/tables/slugs.ts';
import { packCodes } from '../../server/features/tables/stored-codes.ts';
import { pick, pickByRank, randomFrom, type Random } from './random.ts';

/** In half of all titles; the other words get rarer with their rank, the last ones stand in a handful. */
export const commonWord = 'signal';
export const vocabulary = Array.from({ length: 2000 }, (_, rank) => wordOf(rank));
export const tags = Array.from({ length: 60 }, (_, rank) => `t-${vocabulary[3 * rank]}`);
/** As many drafts as all others together; no table is withdrawn. */
export const states = [
  'draft',
  'draft',
  'draft',
  'draft',
  'draft',
  'vetted',
  'vetted',
  'vetted',
  'in-review',
  'returned',
];

const revisionsPerTable = 3;
const batch = 2000;

export interface SeededLibrary {
  readonly url: string;
  readonly teamSlug: string;
  /** One sign-in for each of several members: a person may only ask so often in a minute. */
  readonly cookies: readonly string[];
  /** What the first cookie claims. */
  readonly claims: SessionClaims;
  /** A table to export. */
  readonly exampleSlug: string;
}

/** A database with one team that has so many tables and three times as many revisions. */
export async function seedLibrary(url: string, tableCount: number, secret: string): Promise<SeededLibrary> {
  await createDatabase(url);
  await migrate(url);
  const { teamId, teamSlug, userIds, cookies, claims } = await seedTeam(url, secret);
  const connection = await mysql.createConnection({ ...connectionOptions(url), supportBigNumbers: true });
  try {
    await connection.query('SET SESSION unique_checks = 0, foreign_key_checks = 0');
    const random = randomFrom(`library of ${tableCount}`);
    for (let done = 0; done < tableCount; done += batch) {
      await insertTables(connection, random, teamId, userIds, done, Math.min(batch, tableCount - done));
    }
    await insertRevisions(connection);
    await connection.query('ANALYZE TABLE wave_tables, table_terms, revisions');
    const [[row]] = await connection.query<RowDataPacket[]>('SELECT slug FROM wave_tables WHERE id = ?', [
      tableCount >> 1,
    ]);
    return { url, teamSlug, cookies, claims: claims[0], exampleSlug: String(row.slug) };
  } finally {
    await connection.end();
  }
}

const memberCount = 60;

async function seedTeam(url: string, secret: string) {
  const { db, close } = openDatabase(url);
  const defaults = { arrayPrefix: '', licenceLine: '', bits: 8, length: 256, target: 'c99' };
  const teamSlug = 'speed';
  const [{ id: teamId }] = await db
    .insert(teams)
    .values({ slug: teamSlug, name: 'Speed', defaults })
    .$returningId();
  await db.insert(auditHeads).values({ teamId });
  const claims: SessionClaims[] = [];
  for (let member = 0; member < memberCount; member += 1) {
    const person = {
      name: `Member ${member}`,
      email: `member-${member}@ninthfathom.example`,
      emailVerifiedAt: new Date(),
    };
    const [{ id: userId }] = await db.insert(users).values(person).$returningId();
    await db.insert(memberships).values({ teamId, userId, role: 'author' });
    const claim = { userId, sessionId: randomBytes(16).toString('base64url'), sessionVersion: 1 };
    const expiresAt = new Date(Date.now() + 3_600_000);
    await db.insert(sessions).values({
      id: claim.sessionId,
      userId,
      sessionVersion: 1,
      client: 'speed',
      lastSeenAt: new Date(),
      expiresAt,
    });
    claims.push(claim);
  }
  await close();
  const sealed = await Promise.all(claims.map((claim) => sealClaims(claim, { secret, secure: false })));
  const cookies = sealed.map((value) => `${cookieName(false)}=${value}`);
  return { teamId, teamSlug, userIds: claims.map(({ userId }) => userId), cookies, claims };
}

async function insertTables(
  connection: Connection,
  random: Random,
  teamId: number,
  userIds: readonly number[],
  done: number,
  count: number,
): Promise<void> {
  const tableRows: unknown[][] = [];
  const termRows: unknown[][] = [];
  for (let id = done + 1; id <= done + count; id += 1) {
    const named = { title: titleOf(random, id), tags: tagsOf(random) };
    const terms = termsOf(named);
    const { low, high } = signatureOf(terms);
    const isArchived = random() < 0.1;
    const bits = pick(random, [6, 8, 8, 8, 10, 12, 16]);
    const length = 2 ** (4 + Math.floor(9 * random()));
    const maker = pick(random, userIds);
    tableRows.push([
      id,
      teamId,
      slugFrom(named.title),
      named.title,
      JSON.stringify(named.tags),
      low.toString(),
      high.toString(),
      isArchived,
      revisionsPerTable,
      pick(random, states),
      bits,
      length,
      random() < 0.02 ? null : 6 * bits + 4 * random(),
      length * (bits > 8 ? 2 : 1),
      drawing,
      maker,
      earlier(random),
      maker,
      earlier(random),
    ]);
    for (const term of terms) termRows.push([teamId, id, isArchived, term]);
  }
  // In the order of its primary key a batch is stored in fewer places.
  termRows.sort((a, b) => (String(a[3]) < String(b[3]) ? -1 : 1));
  await connection.query(
    `INSERT INTO wave_tables (id, team_id, slug, title, tags, signature_low, signature_high, is_archived, latest_revision,
      state, bits, length, snr_db, table_bytes, drawing, created_by, created_at, changed_by, changed_at) VALUES ?`,
    [tableRows],
  );
  await connection.query('INSERT INTO table_terms (team_id, table_id, is_archived, term) VALUES ?', [
    termRows,
  ]);
}

const built = buildRevision({
  schema: 1,
  name: 'speed',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length: 128 },
});
const drawing = Buffer.from(built.drawing);

/** Every revision has the content of a real one; all are made by the server itself out of one row. */
async function insertRevisions(connection: Connection): Promise<void> {
  const { definition, report, warnings, codes, engineVersion, digest } = built;
  for (let number = 1; number <= revisionsPerTable; number += 1) {
    await connection.query(
      `INSERT INTO revisions (team_id, table_id, number, state, bits, length, snr_db, table_bytes, definition, report,
        warnings, codes, engine_version, digest, note, made_by, created_at)
       SELECT team_id, id, ?, state, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, '', created_by, created_at FROM wave_tables`,
      [
        number,
        definition.table.bits,
        definition.table.length,
        report.snrDb,
        report.tableBytes,
        JSON.stringify(definition),
        JSON.stringify(report),
        JSON.stringify(warnings),
        packCodes(codes),
        engineVersion,
        digest,
      ],
    );
  }
}

function titleOf(random: Random, id: number): string {
  const words = new Set<string>();
  for (let count = 2 + 4 * random(); count > 0; count -= 1) words.add(pickByRank(random, vocabulary));
  const list = [...words];
  if (random() < 0.5) list.splice(Math.floor(random() * (list.length + 1)), 0, commonWord);
  return `${list.join(' ').slice(0, 54)} ${id}`;
}

function tagsOf(random: Random): string[] {
  const chosen = new Set<string>();
  for (let count = 4 * random(); count > 0; count -= 1) chosen.add(pickByRank(random, tags));
  return [...chosen].sort();
}

const earlier = (random: Random) => new Date(Date.UTC(2026, 0, 1) - Math.floor(random() * 3e10));

/** Six or eight letters that can be spoken. */
function wordOf(rank: number): string {
  const consonants = 'bcdfghklmnprstvz';
  const vowels = 'aeiou';
  let word = '';
  for (let state = 7919 * rank + 13, syllable = 0; syllable < 3 + (rank % 2); syllable += 1) {
    word += consonants[state % 16] + vowels[Math.floor(state / 16) % 5];
    state = (31 * state + 17) % 1_000_003;
  }
  return word;
}
