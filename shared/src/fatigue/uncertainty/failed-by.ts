import { fastNormalCdf } from '../statistics/fast-normal-cdf.js';
import { damageAt } from './damage-at.js';
import type { PartLife } from './part-life.js';

/**
 * Probability that a part has failed so many years from today, in every draw: one less the product over its details of
 * the chance that the detail still holds. A part fails at its first detail. The scatter of each detail's curve, one
 * value for its whole life, is integrated in closed form instead of drawn, which makes small probabilities steady.
 *
 * @param years from today, zero or more
 * @returns one probability per draw
 */
export function failedBy(life: PartLife, years: number): Float64Array {
  const { draws, paths, curveLnSds, lnMinerSums } = life;
  const failed = new Float64Array(draws.draws);
  for (let i = 0; i < failed.length; i++) {
    let holds = 1;
    for (let d = 0; d < paths.length && holds > 0; d++) {
      const excess = Math.log(damageAt(paths[d], i, years, draws.use.yearProfile)) - lnMinerSums[i];
      holds *= curveLnSds[d] > 0 ? fastNormalCdf(-excess / curveLnSds[d]) : excess >= 0 ? 0 : 1;
    }
    failed[i] = 1 - holds;
  }
  return failed;
}
