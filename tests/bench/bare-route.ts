// A process of its own: Express, Drizzle and the reads of the export route, and nothing else of the application.
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import express from 'express';
import { findMember } from '../../server/auth/session-queries.ts';
import { openDatabase } from '../../server/db/client.ts';
import { findExportable } from '../../server/features/tables/export-queries.ts';

const { url, claims, bytes } = JSON.parse(process.env.BARE_ROUTE ?? '') as {
  url: string;
  claims: { userId: number; sessionId: string; sessionVersion: number };
  bytes: number;
};
const { db } = openDatabase(url);
const body = Buffer.alloc(bytes, ' ');

const app = express();
app.get('/:team/:table/:number', async (request, response) => {
  const { team, table, number } = request.params;
  const member = await findMember(db, claims, team);
  const revision = await findExportable(db, {
    teamId: member?.teamId ?? 0,
    slug: table,
    number: Number(number),
  });
  if (revision) response.type('application/json').send(body);
  else response.sendStatus(404);
});
const server = createServer(app).listen(0, '127.0.0.1', () => {
  process.send?.({ address: `http://127.0.0.1:${(server.address() as AddressInfo).port}` });
});
process.on('disconnect', () => process.exit(0));
process.on('SIGTERM', () => process.exit(0));
