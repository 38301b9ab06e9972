import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import type { Database } from '../../db/client.ts';
import { csvHead, csvOf } from './event-csv.ts';
import { presentEvent } from './presenter.ts';
import { findEvents, type Question } from './queries.ts';

/** Events in memory at a time, however many there are. */
const batch = 1000;

type Asked = Pick<Question, 'teamId' | 'filters'>;

/** Sends all events of the filters as an attachment, no faster than they are taken. */
export async function sendCsv(
  request: Pick<Request, 'method'>,
  response: Response,
  db: Database,
  { fileName, ...asked }: Asked & { readonly fileName: string },
): Promise<void> {
  response.attachment(fileName).set('Content-Type', 'text/csv; charset=utf-8; header=present');
  if (request.method === 'HEAD') {
    response.end();
    return;
  }
  try {
    await pipeline(Readable.from(recordsOf(db, asked)), response);
  } catch (error) {
    if (!isBrokenOff(error)) throw error;
  }
}

/**
 * Newest first, in batches. Events never change and each batch begins where the one before ended: what is added
 * meanwhile is not in the file, and nothing is missing.
 */
async function* recordsOf(db: Database, asked: Asked): AsyncGenerator<string> {
  yield csvHead();
  let before: number | undefined;
  for (;;) {
    const rows = await findEvents(db, { ...asked, before, limit: batch });
    if (rows.length > 0) yield csvOf(rows.map(presentEvent));
    if (rows.length < batch) return;
    before = rows[rows.length - 1].sequence;
  }
}

/** Whoever asked has gone: nothing of ours is wrong. */
const isBrokenOff = (error: unknown) =>
  error instanceof Error && 'code' in error && error.code === 'ERR_STREAM_PREMATURE_CLOSE';
