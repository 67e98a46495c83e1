import { yearsBetween } from '../life/day-after-years.js';
import { failedBy } from './failed-by.js';
import type { PartLife } from './part-life.js';

/** Chance of having failed by a day. */
export interface DatedProbability {
  on: string;
  /** Since the part was fitted. */
  probability: number;
  /** Between today and that day, of a part that is sound today. */
  ifSoundToday: number;
}

/**
 * Probability of having failed against time, for the second chart of a part: rows by date.
 *
 * @param asOfOn today, 'YYYY-MM-DD'
 * @param days days from today on
 * @throws RangeError for a day before today
 */
export function failureProbabilityByDate(
  life: PartLife,
  asOfOn: string,
  days: readonly string[],
): DatedProbability[] {
  const now = mean(failedBy(life, 0));
  return days.map((on) => {
    const years = yearsBetween(asOfOn, on);
    if (years < 0) throw new RangeError(`${on} lies before ${asOfOn}.`);
    const probability = mean(failedBy(life, years));
    return { on, probability, ifSoundToday: now < 1 ? (probability - now) / (1 - now) : 1 };
  });
}

function mean(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value;
  return sum / values.length;
}
