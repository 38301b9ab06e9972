import { sql } from 'drizzle-orm';
import { Router } from 'express';
import type { Feature } from '../../feature.ts';

/** Whether this process can do its work, for whatever watches over it: 200, or 503 while the database is away. */
export const health: Feature = ({ database }) => {
  const router = Router();
  router.get('/health', async (_request, response) => {
    await database.db.execute(sql`SELECT 1`);
    response.json({ status: 'ok' });
  });
  return router;
};
