import { createHash } from 'node:crypto';
import { Router, type Request, type Response } from 'express';
import { renderRequestSchema } from '../../../shared/contract/index.ts';
import type { Feature } from '../../feature.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';

/** What the command line does, over HTTP: figures and files of a definition that nobody stores. No account is needed. */
export const rendering: Feature = ({ jobs }) => {
  const router = Router();

  router.post('/report', async (request, response) => {
    sendTagged(request, response, await jobs.run('reportDefinition', request.body));
  });

  router.post('/render', async (request, response) => {
    const wanted = parseInput(renderRequestSchema, request.body);
    sendTagged(request, response, await jobs.run('renderDefinition', wanted));
  });

  return router;
};

/**
 * Sends an answer with its strong entity tag. To a sender that names the tag in If-None-Match the answer is 412: a
 * POST has no 304 (RFC 9110 §13.1.2). Nothing on the way may pack the bytes that the tag stands for (§8.8.3).
 */
function sendTagged(request: Request, response: Response, answer: object): void {
  const bytes = Buffer.from(JSON.stringify(answer));
  const etag = `"${createHash('sha256').update(bytes).digest('base64url')}"`;
  if (namesTag(request.headers['if-none-match'], etag)) {
    throw new Problem('unchanged', { detail: 'The answer is the one that If-None-Match names.' });
  }
  response
    .set({ ETag: etag, 'Cache-Control': 'no-cache, no-transform' })
    .type('application/json')
    .send(bytes);
}

/** Whether a list of entity tags holds one, compared weakly as If-None-Match has it. */
const namesTag = (header: string | undefined, etag: string) =>
  header !== undefined && header.split(',').some((tag) => tag.trim().replace(/^W\//, '') === etag);
