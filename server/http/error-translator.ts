import type { ErrorRequestHandler, Response } from 'express';
import { ZodError } from 'zod';
import { problemsOf, Refusal } from '../../shared/contract/index.ts';
import { databaseIsAway } from '../db/errors.ts';
import { JobOverrun, JobQueueFull } from '../jobs/faults.ts';
import { plainProblem, Problem } from './problem.ts';

/** Answers every error as `application/problem+json` (RFC 9457). Comes last: it ends the chain. */
export const errorTranslator: ErrorRequestHandler = (error: unknown, request, response, next) => {
  const problem = toProblem(error);
  const status = problem?.status ?? 500;
  // The request log has `response.err` with its stack; what the client did wrong is no error of ours.
  if (status >= 500 && error instanceof Error) response.err = error;
  if (response.headersSent) {
    next(error);
    return;
  }
  if (problem instanceof Problem) response.set(problem.headers);
  const body = problem ?? new Problem('internal');
  sendProblem(
    response,
    status,
    status === 500 ? { ...toPlain(body), instance: `urn:uuid:${String(request.id)}` } : body,
  );
};

/** The headers of whatever was going to be sent describe that, not the problem. */
function sendProblem(response: Response, status: number, body: object) {
  for (const header of [
    'Content-Disposition',
    'Content-Encoding',
    'ETag',
    'Last-Modified',
    'Accept-Ranges',
  ]) {
    response.removeHeader(header);
  }
  response.set('Cache-Control', 'no-store');
  response.status(status).type('application/problem+json').send(JSON.stringify(body));
}

const toPlain = (body: Problem | ReturnType<typeof plainProblem>) =>
  body instanceof Problem ? body.toJSON() : body;

function toProblem(error: unknown): Problem | ReturnType<typeof plainProblem> | undefined {
  if (error instanceof Problem) return error;
  if (error instanceof Refusal) return new Problem('validation', { errors: error.problems });
  if (error instanceof ZodError) {
    return new Problem('validation', {
      errors: error.issues.flatMap((issue) => problemsOf(issue, undefined, 'body')),
    });
  }
  if (error instanceof JobOverrun) return new Problem('too-much-work', { detail: error.message });
  if (error instanceof JobQueueFull || databaseIsAway(error)) {
    return new Problem('unavailable', {
      detail: 'Try again in a few seconds.',
      headers: { 'Retry-After': '5' },
    });
  }
  return fromMiddleware(error);
}

/** Errors of Express, its body parsers and static files carry a status and, the parsers', a type. */
function fromMiddleware(error: unknown): Problem | ReturnType<typeof plainProblem> | undefined {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number') return undefined;
  const { status } = error;
  if (status < 400 || status > 499) return undefined;
  const detail = error.message;
  if (status === 400) return new Problem('malformed-request', { detail });
  if (status === 404) return new Problem('not-found');
  if (status === 413) {
    const limit = 'limit' in error ? `; at most ${String(error.limit)} bytes are taken` : '';
    return new Problem('too-large', { detail: `The body is too large${limit}.` });
  }
  if (status === 415) return new Problem('unsupported-media-type', { detail });
  return plainProblem(status);
}
