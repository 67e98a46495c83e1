/** Length of a year in the life calculations, days. */
export const DAYS_PER_YEAR = 365.25;

const MS_PER_DAY = 86_400_000;
const DAY_PATTERN = /^\d{4}-\d{2}-\d{2}$/;

/**
 * Number of a calendar day, counted from 1970-01-01 = 0.
 *
 * @param day 'YYYY-MM-DD'
 * @throws RangeError for anything else, including days the calendar does not have
 */
export function dayNumber(day: string): number {
  const ms = DAY_PATTERN.test(day) ? Date.parse(`${day}T00:00:00Z`) : NaN;
  if (Number.isNaN(ms) || new Date(ms).toISOString().slice(0, 10) !== day) {
    throw new RangeError(`"${day}" is not a calendar day; write it as YYYY-MM-DD.`);
  }
  return ms / MS_PER_DAY;
}

/**
 * The calendar day of a number, the inverse of {@link dayNumber}.
 *
 * @param number whole days since 1970-01-01, within the years 0 to 9999
 */
export function dayOfNumber(number: number): string {
  return new Date(number * MS_PER_DAY).toISOString().slice(0, 10);
}

/**
 * The same day of the calendar some whole months later; a day the later month does not have becomes its last day.
 *
 * @param day 'YYYY-MM-DD'
 * @param months whole months, 0 or more
 */
export function addMonths(day: string, months: number): string {
  dayNumber(day);
  const [year, month, date] = day.split('-').map(Number);
  const lastDate = new Date(Date.UTC(year, month + months, 0)).getUTCDate();
  return dayOfNumber(Date.UTC(year, month - 1 + months, Math.min(date, lastDate)) / MS_PER_DAY);
}
