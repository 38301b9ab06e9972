import { randomUUID } from 'node:crypto';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { safeError } from './safe-error.ts';

/** Logs each request, without what would let a reader of the log act as the person. */
export const requestLog = (logger: Logger) =>
  pinoHttp({
    logger,
    genReqId: () => randomUUID(),
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'error' : 'info'),
    serializers: { err: ({ raw }: { readonly raw: unknown }) => safeError(raw) },
  });
