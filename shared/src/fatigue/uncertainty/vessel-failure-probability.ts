import { yearsBetween } from '../life/day-after-years.js';
import { failedBy } from './failed-by.js';
import type { PartLife } from './part-life.js';

/**
 * The vessel line: the chance that any assessed part has failed by a day. Parts share loads, seasons and gains, which
 * were drawn once for all of them; scatter of curves and Miner sums is each part's own.
 *
 * @param lives the assessed parts, drawn from one and the same LifeDraws
 * @param asOfOn today, 'YYYY-MM-DD'
 * @throws RangeError without a part, with parts of different draws, or for a day before today
 */
export function vesselFailureProbability(
  lives: readonly PartLife[],
  asOfOn: string,
  days: readonly string[],
): { on: string; probability: number }[] {
  if (lives.length === 0) throw new RangeError('A vessel without an assessed part has no such line.');
  if (lives.some(({ draws }) => draws !== lives[0].draws)) {
    throw new RangeError('Parts of one vessel must be drawn together.');
  }
  return days.map((on) => {
    const years = yearsBetween(asOfOn, on);
    if (years < 0) throw new RangeError(`${on} lies before ${asOfOn}.`);
    const holds = new Float64Array(lives[0].draws.draws).fill(1);
    for (const life of lives) {
      const failed = failedBy(life, years);
      for (let i = 0; i < holds.length; i++) holds[i] *= 1 - failed[i];
    }
    let sum = 0;
    for (const chance of holds) sum += 1 - chance;
    return { on, probability: sum / holds.length };
  });
}
