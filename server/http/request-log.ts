import { randomUUID } from 'node:crypto';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Logs each request, without what would let a reader of the log act as the person. */
export const requestLog = (logger: Logger) =>
  pinoHttp({
    logger,
    genReqId: () => randomUUID(),
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'error' : 'info'),
  });

/** Header paths to black out in every log line. */
export const secretHeaders = [
  'req.headers.cookie',
  'req.headers.authorization',
  'req.headers["proxy-authorization"]',
  'res.headers["set-cookie"]',
];
