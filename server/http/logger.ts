import { pino, type DestinationStream, type Logger } from 'pino';
import { safeError } from './safe-error.ts';

/** What to black out in every log line; of an address that has tokens, only those. */
const secrets = [
  'req.headers.cookie',
  'req.headers.authorization',
  'req.headers["proxy-authorization"]',
  'res.headers["set-cookie"]',
  'req.query.token',
  'req.url',
  'res.headers.location',
];

const hidden = '[Redacted]';

const censor = (value: unknown, [, field, name]: readonly string[]): unknown =>
  field === 'url' || name === 'location'
    ? String(value)
        .replace(/([?&]token=)[^&#]*/g, `$1${hidden}`)
        .replace(/#.*$/, `#${hidden}`)
    : hidden;

/** The one logger of a process: nothing in its lines would let their reader act as somebody. */
export const createLogger = (level: string, destination: DestinationStream = pino.destination(2)): Logger =>
  pino({ level, redact: { paths: secrets, censor }, serializers: { err: safeError } }, destination);
