import type { Router } from 'express';
import type { Logger } from 'pino';
import type { Config } from './config.ts';
import type { OpenDatabase } from './db/client.ts';
import type { JobPool } from './jobs/pool.ts';
import type { jobs } from './jobs/registry.ts';

/** What every feature is given; a feature takes from it what it needs and imports no other feature. */
export interface ServerDeps {
  readonly config: Config;
  /** The origins this server is open at; the first one goes into mailed links. */
  readonly origins: readonly string[];
  readonly database: OpenDatabase;
  readonly jobs: JobPool<typeof jobs>;
  readonly logger: Logger;
}

/** A feature's routes, with full paths below /api/v1 and no router nested in them. */
export type Feature = (deps: ServerDeps) => Router;
