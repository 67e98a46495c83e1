import { DAYS_PER_YEAR, dayNumber, dayOfNumber } from './days.js';
import { HORIZON_YEARS } from './rule-date.js';

/**
 * The day some years ahead, rounded down to a whole day.
 *
 * @param asOfOn day to count from, 'YYYY-MM-DD'
 * @param years zero or more
 * @returns null beyond {@link HORIZON_YEARS}, where no date is named
 */
export function dayAfterYears(asOfOn: string, years: number): string | null {
  const today = dayNumber(asOfOn);
  return years > HORIZON_YEARS ? null : dayOfNumber(today + Math.floor(years * DAYS_PER_YEAR));
}

/** Years from one day to a later one; negative for an earlier one. */
export function yearsBetween(fromOn: string, toOn: string): number {
  return (dayNumber(toOn) - dayNumber(fromOn)) / DAYS_PER_YEAR;
}
