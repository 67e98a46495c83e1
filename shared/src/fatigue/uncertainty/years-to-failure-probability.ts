import { HORIZON_YEARS } from '../life/rule-date.js';
import { failureProbabilityAt } from './failure-probability-at.js';
import type { PartLife } from './part-life.js';
import { yearsToLevel } from './years-to-level.js';

/**
 * Years from today at which the probability of having failed reaches a level.
 *
 * @param probability between 0 and 1
 * @param mostYears give up beyond; {@link HORIZON_YEARS} unless given
 * @returns 0 when it has already been reached, Infinity when not within the horizon
 * @throws RangeError for a probability that is not between 0 and 1
 */
export function yearsToFailureProbability(
  life: PartLife,
  probability: number,
  mostYears: number = HORIZON_YEARS,
): number {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`A probability must lie between 0 and 1, not ${probability}.`);
  }
  return yearsToLevel((years) => failureProbabilityAt(life, years), probability, mostYears);
}
