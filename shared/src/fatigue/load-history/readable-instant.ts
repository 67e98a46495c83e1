/** 1900-01-01 and 2200-01-01 in epoch milliseconds: no recorder's clock is honestly outside of them. */
export const EARLIEST_READABLE_MS = Date.UTC(1900, 0, 1);
export const LATEST_READABLE_MS = Date.UTC(2200, 0, 1);

/**
 * Whether an instant can be that of a recorded row. Epoch times read in the wrong format lie thousands of years away,
 * where neither calendars nor databases follow; such a time is unreadable, not a date.
 *
 * @param ms epoch milliseconds
 * @returns true from 1900 up to the end of 2199; false for NaN and infinities
 */
export function isReadableInstant(ms: number): boolean {
  return ms >= EARLIEST_READABLE_MS && ms < LATEST_READABLE_MS;
}
