import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import { stdSerializers, type Logger } from 'pino';

declare module 'node:http' {
  interface IncomingMessage {
    /** Names the request in the log and, where something went wrong here, in its answer. */
    id: string;
  }
  interface ServerResponse {
    /** What went wrong here, for the log. */
    err?: Error;
  }
}

/**
 * Logs each request at its end. By hand: the package for it prepares a line for every request, also where the level
 * says that none is written, and that took a tenth of the time of a short answer.
 */
export const requestLog =
  (logger: Logger): RequestHandler =>
  (request, response, next) => {
    request.id = randomUUID();
    const start = performance.now();
    response.once('close', () => {
      const level = response.statusCode >= 500 ? 'error' : 'info';
      if (!logger.isLevelEnabled(level)) return;
      logger[level](
        {
          req: stdSerializers.req(request),
          res: stdSerializers.res(response),
          err: response.err,
          milliseconds: Math.round(performance.now() - start),
        },
        response.writableFinished ? 'answered' : 'broken off',
      );
    });
    next();
  };
