import { ConnectionException } from '@mikro-orm/core';

/** What the driver says without a code, when a connection was cut before or while a statement ran. */
const DRIVER_WORDS =
  /^(Connection terminated|Connection ended|timeout exceeded when trying to connect|Timeout acquiring a connection|Client has encountered a connection error|Client was closed)/;

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
  // The query builder puts the statement before the driver's own words.
  const words = exception.message.split(' - ').at(-1) ?? '';
  return exception.name === 'KnexTimeoutError' || DRIVER_WORDS.test(words);
}
