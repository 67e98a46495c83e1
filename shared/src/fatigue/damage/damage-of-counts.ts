import type { Curve } from '../curves/curve.js';
import { cyclesToFailure } from '../curves/cycles-to-failure.js';
import { CompensatedSum } from './compensated-sum.js';
import { type MeanLoadRule, rangeAtZeroMean } from './mean-load.js';

/** A load count in load units (kN): so many cycles of this range about this mean. */
export interface LoadCount {
  range: number;
  mean: number;
  count: number;
}

/**
 * Miner's sum of load counts: the sum of count / N(range), range and mean first multiplied by the detail's factor
 * and, where a mean rule is set, moved to zero mean.
 *
 * The terms are sorted before they are added, so the result is the same to the last bit whatever the order of the
 * counts.
 *
 * @param counts ranges and means in kN
 * @param detail factor: measure of the curve per kN; mean rule: none unless given
 * @returns damage, 1 at the failure the curve stands for
 * @throws MeanAboveUltimateError when a counted mean reaches the rule's ultimate
 * Source: Palmgren-Miner, e.g. EN 1993-1-9 annex A (from memory).
 */
export function damageOfCounts(
  counts: Iterable<LoadCount>,
  detail: { factor: number; curve: Curve; mean?: MeanLoadRule },
): number {
  const rule = detail.mean ?? { kind: 'none' };
  const terms: number[] = [];
  for (const { range, mean, count } of counts) {
    const equivalent = rangeAtZeroMean(detail.factor * range, detail.factor * mean, rule);
    terms.push(count / cyclesToFailure(detail.curve, equivalent));
  }
  const sum = new CompensatedSum();
  for (const term of Float64Array.from(terms).sort()) sum.add(term);
  return sum.value;
}
