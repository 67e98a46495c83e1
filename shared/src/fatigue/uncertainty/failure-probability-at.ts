import { failedBy } from './failed-by.js';
import type { PartLife } from './part-life.js';

/**
 * Probability that a part has failed so many years from today: the mean over all draws.
 *
 * @param years from today, zero or more
 */
export function failureProbabilityAt(life: PartLife, years: number): number {
  const failed = failedBy(life, years);
  let sum = 0;
  for (const probability of failed) sum += probability;
  return sum / failed.length;
}
