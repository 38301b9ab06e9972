/** An error in a form for the log. */
interface LoggedError {
  readonly type: string;
  readonly message: string;
  readonly stack?: string;
  readonly code?: unknown;
  readonly errno?: unknown;
  /** The statement with question marks where its values were. */
  readonly query?: string;
  readonly cause?: LoggedError;
}

const deepest = 5;

/**
 * Turns an error into what may be logged. Database errors carry the values of their statement in several places:
 * addresses, password hashes, links in mail. None of them comes along.
 */
export function safeError(error: unknown, depth = 0): LoggedError {
  if (!(error instanceof Error))
    return { type: typeof error, message: 'Something other than an error was thrown.' };
  const query = textOf(error, 'query');
  const isOfDatabase = query !== undefined || 'sqlState' in error;
  const message =
    query !== undefined ? 'The query failed.' : isOfDatabase ? withoutValues(error.message) : error.message;
  const frames = error.stack?.split('\n').filter((line) => /^\s+at /.test(line)) ?? [];
  const cause = causeOf(error);
  const type = error.name === 'Error' ? error.constructor.name : error.name;
  return {
    type,
    message,
    stack: [`${type}: ${message}`, ...frames].join('\n'),
    ...('code' in error ? { code: error.code } : {}),
    ...('errno' in error ? { errno: error.errno } : {}),
    ...(query !== undefined ? { query } : {}),
    ...(cause && depth < deepest ? { cause: safeError(cause, depth + 1) } : {}),
  };
}

/** Names of keys, columns and tables may stay: `Duplicate entry '…' for key 'users_email_unique'`. */
const withoutValues = (message: string) =>
  message.replace(
    /((?:key|column|table|constraint|database) )?'(?:[^'\\]|\\.|'')*'/gi,
    (quoted, named?: string) => (named ? quoted : "'…'"),
  );

/** Auth.js puts the error it met one step further down. */
function causeOf({ cause }: Error): Error | undefined {
  if (cause instanceof Error) return cause;
  const inner = typeof cause === 'object' && cause !== null && 'err' in cause ? cause.err : undefined;
  return inner instanceof Error ? inner : undefined;
}

function textOf(error: Error, key: string): string | undefined {
  const value = (error as unknown as Record<string, unknown>)[key];
  return typeof value === 'string' ? value : undefined;
}
