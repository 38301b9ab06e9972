// stepwell audit-verify: goes through the chains of events, of one team or of all, and says a line for each.
import { parseArgs } from 'node:util';
import { asc, eq } from 'drizzle-orm';
import { verifyChain } from './audit/verify-chain.ts';
import { ConfigFaults, readAuditAccess } from './config.ts';
import { openDatabase, type Database } from './db/client.ts';
import { databaseIsAway } from './db/errors.ts';
import { teams } from './db/schema/index.ts';

/** Not whole; and: there is nothing that could be told. */
const broken = 1;
const cannotTell = 2;

const { values } = parseArgs({ options: { team: { type: 'string' }, json: { type: 'boolean' } } });

async function verifyAll(): Promise<number> {
  const { auditKey, databaseUrl } = readAuditAccess(process.env);
  const { db, close } = openDatabase(databaseUrl, { connectionLimit: 1 });
  try {
    const found = await findTeams(db, values.team);
    if (values.team !== undefined && found.length === 0) {
      throw new Error(`--team: ${values.team}; allowed: the address of a team that is there`);
    }
    const results = [];
    for (const { id, slug } of found) {
      const result = { team: slug, ...(await verifyChain(db, auditKey, id)) };
      if (!values.json) say(sayResult(result));
      results.push(result);
    }
    const whole = results.every((result) => 'events' in result);
    if (values.json) say(JSON.stringify({ whole, teams: results }));
    return whole ? 0 : broken;
  } finally {
    await close();
  }
}

const findTeams = (db: Database, slug: string | undefined) =>
  db
    .select({ id: teams.id, slug: teams.slug })
    .from(teams)
    .where(slug === undefined ? undefined : eq(teams.slug, slug))
    .orderBy(asc(teams.slug));

type Result = { readonly team: string } & Awaited<ReturnType<typeof verifyChain>>;

const sayResult = (result: Result): string =>
  'events' in result
    ? `${result.team}: whole, ${result.events} ${result.events === 1 ? 'event' : 'events'}`
    : `${result.team}: broken at event ${result.brokenAt}, ${result.kind}: ${result.says}`;

const say = (line: string) => process.stdout.write(`${line}\n`);

function reasonOf(error: unknown): string {
  if (!(error instanceof Error)) return String(error);
  if (error instanceof ConfigFaults) return error.faults.join('; ');
  if (databaseIsAway(error))
    return `DATABASE_URL: ${bottomOf(error)}; allowed: a MariaDB that can be reached`;
  return bottomOf(error);
}

/** The driver's words rather than the query it was busy with. */
function bottomOf(error: Error): string {
  if (error.cause instanceof Error) return bottomOf(error.cause);
  const code = 'code' in error ? String(error.code) : error.name;
  return (error.message || code).trim();
}

try {
  process.exitCode = await verifyAll();
} catch (error) {
  process.stderr.write(`${reasonOf(error)}\n`);
  process.exitCode = cannotTell;
}
