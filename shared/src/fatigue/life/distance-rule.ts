import { DAYS_PER_YEAR, dayNumber, dayOfNumber } from './days.js';
import { HORIZON_YEARS } from './rule-date.js';

/**
 * Day on which a part reaches the distance its material is replaced at, at the planned distance per year.
 *
 * @param asOfOn day the question is asked for, 'YYYY-MM-DD'
 * @param limitNm nautical miles of the rule
 * @param sailedNm nautical miles sailed with the part
 * @param plannedNmPerYear nautical miles planned per year
 * @returns the day, `asOfOn` once the distance is reached, null when it lies more than {@link HORIZON_YEARS} ahead
 * @throws RangeError for negative figures
 */
export function distanceRuleOn(
  asOfOn: string,
  limitNm: number,
  sailedNm: number,
  plannedNmPerYear: number,
): string | null {
  for (const [name, value] of Object.entries({ limitNm, sailedNm, plannedNmPerYear })) {
    if (!(value >= 0)) throw new RangeError(`${name} must be zero or more, not ${value}.`);
  }
  const today = dayNumber(asOfOn);
  if (sailedNm >= limitNm) return asOfOn;
  const years = plannedNmPerYear === 0 ? Infinity : (limitNm - sailedNm) / plannedNmPerYear;
  return years > HORIZON_YEARS ? null : dayOfNumber(today + Math.floor(years * DAYS_PER_YEAR));
}
