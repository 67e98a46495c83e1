import { ConnectionException } from '@mikro-orm/core';

/**
 * Whether an error means that the database cannot be reached for the moment: SQLSTATE classes 08 (connection),
 * 53 (resources), 57P (shutting down), and what the driver says itself.
 */
export function databaseIsAway(exception: unknown): boolean {
  if (exception instanceof ConnectionException) return true;
  if (!(exception instanceof Error)) return false;
  const { code } = exception as { code?: unknown };
  if (
    typeof code === 'string' &&
    /^(08...|53...|57P0.|ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT)$/.test(code)
  ) {
    return true;
  }
  return (
    exception.name === 'KnexTimeoutError' ||
    /^Connection terminated|timeout exceeded when trying to connect|Timeout acquiring a connection/.test(
      exception.message,
    )
  );
}
