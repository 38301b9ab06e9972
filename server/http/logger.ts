import { pino, type DestinationStream, type Logger } from 'pino';
import { safeError } from './safe-error.ts';

/** Header paths to black out in every log line. */
const secretHeaders = [
  'req.headers.cookie',
  'req.headers.authorization',
  'req.headers["proxy-authorization"]',
  'res.headers["set-cookie"]',
];

/** The one logger of a process: nothing in its lines would let their reader act as somebody. */
export const createLogger = (level: string, destination: DestinationStream = pino.destination(2)): Logger =>
  pino({ level, redact: secretHeaders, serializers: { err: safeError } }, destination);
