import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import autocannon from 'autocannon';
import { projectFolder } from '../../server/project-folder.ts';
import { startApp, type AppProcess } from '../../server/setup/app-process.mjs';
import { holdDatabase } from '../../server/setup/database.mjs';
import { randomListQuery } from './library-queries.ts';
import { seedLibrary, type SeededLibrary } from './library-seed.ts';
import { judge, median, quantile } from './judge.ts';
import { sendPaced, type PacedRequest } from './open-loop.ts';
import { pick, randomFrom } from './random.ts';

const large = 100_000;
const small = 1_000;
const perSecond = 50;
/** Slices in which the small and the large library take turns, so that both meet the same machine. */
const slices = 4;
const sliceSeconds = 6;

/**
 * The team library's figures, on a MariaDB and processes of their own: list and search beside the same on a small
 * library, and the export of a saved table beside a bare route with the same reads. Answers whether all goals hold.
 */
export async function measureLibrary(): Promise<boolean> {
  const folder = mkdtempSync(join(tmpdir(), 'stepwell-speed-'));
  const server = await holdDatabase(join(folder, 'mariadb'));
  try {
    const secret = randomBytes(32).toString('base64url');
    const seed = async (tables: number) => {
      const library = await seedLibrary(server.urlOf(`stepwell_test_speed_${tables}`), tables, secret);
      return { library, environment: environmentOf(library, secret, folder) };
    };
    const few = await seed(small);
    const many = await timed(`seeded ${large} tables, ${3 * large} revisions`, () => seed(large));

    return await withApp(few.environment, (fewAddress) =>
      withApp(many.environment, async (manyAddress) => {
        const areFast = await measureLists(
          listsOf(fewAddress, few.library),
          listsOf(manyAddress, many.library),
        );
        return (await measureExport(manyAddress, many.library)) && areFast;
      }),
    );
  } finally {
    await server.release();
    rmSync(folder, { recursive: true, force: true });
  }
}

const environmentOf = ({ url }: SeededLibrary, secret: string, folder: string) => ({
  HOST: '127.0.0.1',
  PORT: '0',
  DATABASE_URL: '',
  PRIVATE_DATABASE_URL: url,
  AUTH_SECRET: secret,
  STEPWELL_DATA: folder,
  NODE_ENV: 'production',
});

async function withApp<Result>(
  environment: Readonly<Record<string, string>>,
  work: (address: string) => Promise<Result>,
): Promise<Result> {
  return withProcess(startApp([join(projectFolder, 'dist', 'server', 'main.js')], environment), work);
}

async function withProcess<Result>(
  started: AppProcess,
  work: (address: string) => Promise<Result>,
): Promise<Result> {
  try {
    return await work(await started.ready);
  } finally {
    await started.stop();
  }
}

/** Lists with filters drawn anew for each request; every library is asked the same. */
function listsOf(address: string, { teamSlug, cookies }: SeededLibrary) {
  const random = randomFrom('what members look for');
  return () => ({
    url: `${address}/api/v1/teams/${teamSlug}/tables?${randomListQuery(random)}`,
    cookie: pick(random, cookies),
  });
}

async function measureLists(few: () => PacedRequest, many: () => PacedRequest): Promise<boolean> {
  const latencies = { few: [] as number[], many: [] as number[] };
  await sendPaced(few, { perSecond, seconds: 3 });
  await sendPaced(many, { perSecond, seconds: 3 });
  for (let slice = 0; slice < slices; slice += 1) {
    latencies.few.push(...(await sendPaced(few, { perSecond, seconds: sliceSeconds })));
    latencies.many.push(...(await sendPaced(many, { perSecond, seconds: sliceSeconds })));
  }
  const figures = (all: number[]) => [0.5, 0.95, 0.99].map((share) => quantile(all, share));
  const told = (all: number[]) =>
    figures(all)
      .map((latency) => latency.toFixed(1))
      .join(' / ');
  console.log(`  lists of ${small} tables, ${perSecond}/s: p50 / p95 / p99 ${told(latencies.few)} ms`);
  console.log(`  lists of ${large} tables, ${perSecond}/s: p50 / p95 / p99 ${told(latencies.many)} ms`);
  const [p95Few, p95Many] = [figures(latencies.few)[1], figures(latencies.many)[1]];
  const isFast = judge(`list and search p95 at ${large} tables`, p95Many, 50, ' ms');
  return judge(`  as a multiple of that at ${small} tables`, p95Many / p95Few, 2) && isFast;
}

/** Requests a second of the export beside those of a bare route, turn and turn about. */
async function measureExport(address: string, library: SeededLibrary): Promise<boolean> {
  const { url, teamSlug, cookies, claims, exampleSlug } = library;
  const path = `/api/v1/teams/${teamSlug}/tables/${exampleSlug}/revisions/2/export?target=c99`;
  const answer = await fetch(address + path, { headers: { Cookie: cookies[0] } });
  const bytes = (await answer.arrayBuffer()).byteLength;
  if (answer.status !== 200) throw new Error(`${path} answered ${answer.status}`);

  const bareEnvironment = { BARE_ROUTE: JSON.stringify({ url, claims, bytes }), NODE_ENV: 'production' };
  const script = join(projectFolder, 'tests', 'bench', 'bare-route.ts');
  const bare = startApp(['--import', 'tsx', script], bareEnvironment);
  return withProcess(bare, async (bareAddress) => {
    const rate = (target: string) =>
      requestsPerSecond(
        target,
        cookies.map((cookie) => ({ headers: { cookie } })),
      );
    const ours: number[] = [];
    const theirs: number[] = [];
    for (let turn = 0; turn < 5; turn += 1) {
      ours.push(await rate(address + path));
      theirs.push(await rate(`${bareAddress}/${teamSlug}/${exampleSlug}/2`));
    }
    // The first turn warms both up.
    const [own, other] = [ours.slice(1), theirs.slice(1)];
    console.log(
      `  export of a saved table ${median(own).toFixed(0)}/s, bare route ${median(other).toFixed(0)}/s`,
    );
    const shares = own.map((rate, turn) => rate / other[turn]);
    return judge('  as a share of the bare route', median(shares), 0.6, '', 'at least');
  });
}

async function requestsPerSecond(url: string, requests: autocannon.Request[]): Promise<number> {
  const result = await autocannon({ url, requests, connections: 20, duration: 4 });
  if (result.non2xx > 0 || result.errors > 0)
    throw new Error(`${url}: ${result.non2xx} refused, ${result.errors} failed`);
  return result['2xx'] / result.duration;
}

async function timed<Result>(what: string, work: () => Promise<Result>): Promise<Result> {
  const start = performance.now();
  const result = await work();
  console.log(`  ${what} in ${((performance.now() - start) / 1000).toFixed(0)} s`);
  return result;
}
