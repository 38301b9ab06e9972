/** Error numbers of MariaDB that the code reacts to (MariaDB Knowledge Base, "MariaDB Error Codes"). */
export const errno = {
  duplicate: 1062,
  lockWaitTimeout: 1205,
  deadlock: 1213,
  tooLong: 1406,
  noSuchParent: 1452,
  checkFailed: 4025,
} as const;

/** Looks through what Drizzle wraps around the driver's error. */
function* chainOf(error: unknown): Generator<object> {
  for (
    let here = error;
    typeof here === 'object' && here !== null;
    here = 'cause' in here ? here.cause : undefined
  ) {
    yield here;
  }
}

/** MariaDB's error number, or undefined where the error is not the database's. */
export function errnoOf(error: unknown): number | undefined {
  for (const here of chainOf(error)) if ('errno' in here && 'sqlState' in here) return Number(here.errno);
  return undefined;
}

const connectionCodes = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ENOENT',
  'EPIPE',
  'ETIMEDOUT',
  'PROTOCOL_CONNECTION_LOST',
  'ER_CON_COUNT_ERROR',
  'ER_SERVER_SHUTDOWN',
  'ER_TOO_MANY_USER_CONNECTIONS',
]);

/** Whether the database could not be reached; the request may succeed later. */
export function databaseIsAway(error: unknown): boolean {
  for (const here of chainOf(error)) {
    const connecting =
      'syscall' in here
        ? here.syscall === 'connect' || 'fatal' in here
        : 'fatal' in here || 'sqlState' in here;
    if ('code' in here && connectionCodes.has(String(here.code)) && connecting) return true;
  }
  return false;
}
