/** Codes of mysql2, Node and MariaDB for a database that cannot be reached or does not answer in time. */
const awayCodes = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ENOENT',
  'EPIPE',
  'ETIMEDOUT',
  'PROTOCOL_CONNECTION_LOST',
  'PROTOCOL_SEQUENCE_TIMEOUT',
  'ER_CON_COUNT_ERROR',
  'ER_SERVER_SHUTDOWN',
  'ER_STATEMENT_TIMEOUT',
  'POOL_CLOSED',
]);

/** MariaDB's error number, also from inside the error that drizzle wraps around it; null when there is none. */
export function errnoOf(error: unknown): number | null {
  if (typeof error !== 'object' || error === null) return null;
  // Node's own errors have a negative number of another kind.
  if ('errno' in error && typeof error.errno === 'number' && error.errno > 0) return error.errno;
  return 'cause' in error ? errnoOf(error.cause) : null;
}

/** A second row with a value that has to be unique. */
export function isDuplicate(error: unknown): boolean {
  return errnoOf(error) === 1062;
}

/** Deadlock, snapshot conflict, lock wait: MariaDB rolled back the whole transaction; a second try may succeed. */
export function isContention(error: unknown): boolean {
  return [1213, 1020, 1205].includes(errnoOf(error) ?? 0);
}

export function isDatabaseAway(error: unknown): boolean {
  if (typeof error !== 'object' || error === null) return false;
  if ('code' in error && typeof error.code === 'string' && awayCodes.has(error.code)) return true;
  // mysql2 marks what ended the connection; a statement after that has no code of its own.
  if ('fatal' in error && error.fatal === true) return true;
  return 'cause' in error && isDatabaseAway(error.cause);
}

/**
 * An error for the log: everything but the parameters of a statement, which may be passwords' hashes, tokens or what
 * people wrote. Drizzle repeats them in its message, so that one is made anew.
 */
export function errorForLog(error: unknown): Record<string, unknown> {
  if (!(error instanceof Error)) return { message: String(error) };
  const isStatement = 'query' in error && 'params' in error;
  return {
    type: error.name,
    message: isStatement ? `A statement failed: ${String(error.query)}` : error.message,
    // The first lines of a stack repeat the message.
    stack: error.stack?.slice(error.stack.indexOf('\n    at ')),
    ...('code' in error ? { code: error.code } : {}),
    ...('errno' in error ? { errno: error.errno } : {}),
    ...(error.cause === undefined ? {} : { cause: errorForLog(error.cause) }),
  };
}
