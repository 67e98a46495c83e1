import { DAYS_PER_YEAR, dayNumber, dayOfNumber } from '../life/days.js';

const MONTHS = 12;

/** Share of a year's use that has fallen by each twelfth of the year that begins on the day asked. */
export interface YearProfile {
  /** Thirteen numbers from 0 to 1, never falling. */
  cumulative: readonly number[];
}

/**
 * The profile of the year ahead from hours planned by calendar month: a season that starts in May uses nothing up in
 * winter.
 *
 * @param asOfOn day the year begins on, 'YYYY-MM-DD'
 * @param hoursByMonth twelve figures, January first, zero or more, not all zero
 * @throws RangeError for anything else
 */
export function yearProfile(asOfOn: string, hoursByMonth: readonly number[]): YearProfile {
  if (hoursByMonth.length !== MONTHS || !hoursByMonth.every((hours) => hours >= 0)) {
    throw new RangeError('A plan by month holds twelve figures of zero or more.');
  }
  const year = hoursByMonth.reduce((sum, hours) => sum + hours, 0);
  if (!(year > 0)) throw new RangeError('A plan by month needs at least one month with hours.');
  const today = dayNumber(asOfOn);
  const cumulative = [0];
  for (let twelfth = 1; twelfth <= MONTHS; twelfth++) {
    const from = today + Math.round(((twelfth - 1) * DAYS_PER_YEAR) / MONTHS);
    const to = today + Math.round((twelfth * DAYS_PER_YEAR) / MONTHS);
    let hours = 0;
    for (let day = from; day < to; day++) {
      const [calendarYear, month] = dayOfNumber(day).split('-').map(Number);
      const daysInMonth = new Date(Date.UTC(calendarYear, month, 0)).getUTCDate();
      hours += hoursByMonth[month - 1] / daysInMonth;
    }
    cumulative.push(cumulative[twelfth - 1] + hours);
  }
  const whole = cumulative[MONTHS];
  return { cumulative: cumulative.map((hours) => hours / whole) };
}

/**
 * Share of the year's use that has fallen after a share of the year has passed.
 *
 * @param profile left out: evenly
 * @param yearShare 0 to 1
 */
export function useByShare(profile: YearProfile | undefined, yearShare: number): number {
  if (profile === undefined) return yearShare;
  const at = Math.min(Math.max(yearShare, 0), 1) * MONTHS;
  const below = Math.min(Math.floor(at), MONTHS - 1);
  const { cumulative } = profile;
  return cumulative[below] + (cumulative[below + 1] - cumulative[below]) * (at - below);
}
