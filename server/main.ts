import { createServer, type Server } from 'node:http';
import { join } from 'node:path';
import type { RequestHandler } from 'express';
import { buildApp } from './app.ts';
import { ConfigFaults, readConfig } from './config.ts';
import { openDatabase } from './db/client.ts';
import { createDatabase, migrate, requireExactSchema } from './db/migrate.ts';
import { SchemaFault } from './db/schema-state.ts';
import { clientFiles } from './http/client-files.ts';
import { createLogger } from './http/logger.ts';
import { createJobPool } from './jobs/pool.ts';
import { seedDemo } from './demo/seed.ts';
import { listen, originsOf } from './listen.ts';
import { startMail } from './mail/start-mail.ts';
import { projectFolder } from './project-folder.ts';
import { endInOrder } from './shutdown.ts';
import { cleanUp } from './upkeep/clean-up.ts';
import { repeat } from './upkeep/repeat.ts';

const cleanUpEvery = 10 * 60 * 1000;

const isDevelopment = process.argv.includes('--dev');

async function start(): Promise<void> {
  const config = readConfig(process.env);
  const logger = createLogger(config.logLevel);

  if (config.local) {
    await createDatabase(config.databaseUrl);
    await migrate(config.databaseUrl);
  } else {
    await requireExactSchema(config.databaseUrl);
  }

  const server = createServer();
  const client = isDevelopment ? await developmentClient(server) : builtClient();
  const database = openDatabase(config.databaseUrl);
  const jobs = createJobPool();
  const demo = config.demoFile && (await seedDemo({ config, database, jobs }, config.demoFile));
  if (demo) process.stdout.write(demo);
  const port = await listen(server, config);
  const origins = originsOf(config, port);
  const app = buildApp({
    config,
    origins,
    database,
    jobs,
    logger,
    client: client.handler,
    contentPolicy: !isDevelopment,
  });
  // In the same turn as `listen` answers: no request can have come in yet.
  server.on('request', app);

  const mail = await startMail(config, origins[0], database.db, logger);
  const upkeep = repeat(() => cleanUp(database.db), cleanUpEvery, logger);
  endInOrder(server, [client.close, upkeep.close, mail.close, jobs.close, database.close]);
  tellAddress(origins[0]);
}

interface Client {
  readonly handler: RequestHandler;
  close(): Promise<void>;
}

const builtClient = (): Client => ({
  handler: clientFiles(join(projectFolder, 'dist', 'client')),
  close: () => Promise.resolve(),
});

async function developmentClient(server: Server): Promise<Client> {
  const { createServer: createVite } = await import('vite');
  const vite = await createVite({
    root: projectFolder,
    appType: 'spa',
    server: { middlewareMode: true, hmr: { server } },
  });
  return { handler: vite.middlewares, close: () => vite.close() };
}

/** To the set-up that started this process; on a terminal of its own, to whoever reads it. */
function tellAddress(address: string): void {
  if (process.send && process.connected) process.send({ address });
  else process.stdout.write(`Stepwell is open at ${address}\n`);
}

try {
  await start();
} catch (error) {
  const isPlain = error instanceof ConfigFaults || error instanceof SchemaFault;
  const text =
    error instanceof Error ? (isPlain ? error.message : (error.stack ?? error.message)) : String(error);
  process.stderr.write(`${text}\n`);
  process.exit(1);
}
