import { randomBytes } from 'node:crypto';
import { chmod, writeFile } from 'node:fs/promises';
import { parseBoard, roles, teamDefaultsSchema, type Role } from '../../shared/contract/index.ts';
import { appendEvent } from '../audit/append-event.ts';
import { hashPassword } from '../auth/passwords.ts';
import type { Person } from '../auth/team-scope.ts';
import type { Executor } from '../db/client.ts';
import { errno, errnoOf } from '../db/errors.ts';
import { auditHeads, memberships, teams, users } from '../db/schema/index.ts';
import { withTransaction } from '../db/transaction.ts';
import type { ServerDeps } from '../feature.ts';
import type { BuiltRevision } from '../features/tables/build-revision.ts';
import { createLimitSet } from '../features/limit-sets/commands.ts';
import type { Command } from '../features/reviews/commands.ts';
import { createBoard, reviseBoard } from '../features/boards/commands.ts';
import { addRevision, createTable } from '../features/tables/commands.ts';
import { demoBoards, type DemoBoard } from './boards.ts';
import { demoTables, type DemoTable } from './library.ts';
import { demoLimits } from './limits.ts';
import { playReview } from './vetting.ts';

type Deps = Pick<ServerDeps, 'config' | 'database' | 'jobs'>;

const teamName = 'Ninth Fathom';
const teamSlug = 'ninth-fathom';

/** People of the demonstration are their roles. */
const names: Readonly<Record<Role, string>> = {
  viewer: 'Workshop, viewer',
  author: 'Firmware, author',
  reviewer: 'Sound, reviewer',
  admin: 'Office, admin',
};

interface DemoAccount {
  readonly role: Role;
  readonly email: string;
  readonly password: string;
}

/**
 * Fills a database that nobody has an account in with the made-up team Ninth Fathom: people by role, limits, boards, and tables
 * saved, submitted and judged by the same commands as everybody's. Passwords are random; they are kept in `file`, which only its owner can read,
 * and answered as text to show. Answers nothing where there are people already.
 */
export async function seedDemo(deps: Deps, file: string): Promise<string | undefined> {
  const { db } = deps.database;
  if ((await db.select({ id: users.id }).from(users).limit(1)).length > 0) return undefined;

  const accounts = roles.map((role): DemoAccount => ({
    role,
    email: `${role}@ninthfathom.example`,
    password: randomBytes(12).toString('base64url'),
  }));
  const hashes = await Promise.all(accounts.map(({ password }) => hashPassword(password)));
  const built = await Promise.all(demoTables.map((table) => buildAll(deps, table)));
  const text = describe(accounts);
  try {
    await withTransaction(db, async (transaction) => {
      const people = await insertPeople(transaction, accounts, hashes);
      // Whoever comes second has been stopped by the unique addresses, and leaves the first one's file alone.
      await keepSecret(file, text);
      const teamId = await insertTeam(deps, transaction, people);
      const commandBy = (by: Role) => ({
        transaction,
        auditKey: deps.config.auditKey,
        scope: { teamId, teamSlug, role: by, user: people[by] },
        // What happened before anybody was there is no news.
        tell: () => Promise.resolve(),
      });
      for (const limits of demoLimits) await createLimitSet(commandBy('admin'), limits);
      for (const board of demoBoards) await saveBoard(board, commandBy);
      for (const [index, table] of demoTables.entries()) await saveTable(table, built[index], commandBy);
    });
  } catch (error) {
    if (errnoOf(error) === errno.duplicate) return undefined;
    throw error;
  }
  return `${text}  They are kept in ${file}\n`;
}

const buildAll = ({ jobs }: Deps, { revisions }: DemoTable) =>
  Promise.all(revisions.map(({ definition }) => jobs.run('buildRevision', definition)));

const describe = (accounts: readonly DemoAccount[]) =>
  [
    `Demo accounts of the team ${teamName}, on this machine only:`,
    ...accounts.map(({ email, password }) => `  ${email.padEnd(32)} ${password}`),
  ]
    .map((line) => `${line}\n`)
    .join('');

async function keepSecret(file: string, text: string): Promise<void> {
  await writeFile(file, text, { mode: 0o600 });
  // The mode above is only for a file that is new.
  await chmod(file, 0o600);
}

type People = Readonly<Record<Role, Person>>;

async function insertPeople(
  transaction: Executor,
  accounts: readonly DemoAccount[],
  hashes: readonly string[],
): Promise<People> {
  const people: Partial<Record<Role, Person>> = {};
  for (const [index, { role, email }] of accounts.entries()) {
    const person = { name: names[role], email };
    const [{ id }] = await transaction
      .insert(users)
      .values({ ...person, passwordHash: hashes[index], emailVerifiedAt: new Date() })
      .$returningId();
    people[role] = { id, ...person };
  }
  return people as People;
}

async function insertTeam({ config }: Deps, transaction: Executor, people: People): Promise<number> {
  const defaults = teamDefaultsSchema.parse({
    arrayPrefix: 'nf_',
    licenceLine: 'SPDX-License-Identifier: CC0-1.0',
  });
  const [{ id: teamId }] = await transaction
    .insert(teams)
    .values({ slug: teamSlug, name: teamName, defaults })
    .$returningId();
  await transaction.insert(auditHeads).values({ teamId });
  await transaction
    .insert(memberships)
    .values(roles.map((role) => ({ teamId, userId: people[role].id, role })));
  await appendEvent(transaction, config.auditKey, {
    teamId,
    actor: people.admin,
    action: 'team.created',
    subject: `team:${teamSlug}`,
    details: { name: teamName },
  });
  return teamId;
}

/** Nobody else is there yet. */
const unhindered = { holds: () => true };

async function saveBoard(
  { revisions }: DemoBoard,
  commandBy: (role: Role) => Omit<Command, 'slug' | 'number'>,
): Promise<void> {
  let slug = '';
  for (const [index, { by, note, board }] of revisions.entries()) {
    const input = { board: parseBoard(board), note };
    const saved =
      index === 0
        ? await createBoard(commandBy(by), input)
        : await reviseBoard(commandBy(by), slug, unhindered, input);
    slug = saved.slug;
  }
}

async function saveTable(
  { title, tags, playback, revisions }: DemoTable,
  built: readonly BuiltRevision[],
  commandBy: (role: Role) => Omit<Command, 'slug' | 'number'>,
): Promise<void> {
  let slug = '';
  for (const [index, revision] of revisions.entries()) {
    const { by, note } = revision;
    const input = { playback, note };
    const table =
      index === 0
        ? await createTable(commandBy(by), { title, tags: [...tags], ...input }, built[index])
        : await addRevision(commandBy(by), slug, unhindered, input, built[index]);
    slug = table.slug;
    await playReview(revision, (role) => ({ ...commandBy(role), slug, number: table.latestRevision }));
  }
}
