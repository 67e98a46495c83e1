import { CycleEvaluator } from '../damage/cycle-evaluator.js';
import type { DetailModel } from '../damage/detail-model.js';
import { damagePerCycle } from '../curves/damage-per-cycle.js';
import { workingCurve } from '../damage/working-curve.js';
import { GRID_SIZE, lnNode } from '../uncertainty/damage-on-grid.js';
import type { CompareHistory } from './compare-history.js';

/** Damage of a pressed history on a detail at nine factors on the range. */
export interface HistoryDamage {
  lnStep: number;
  /** Of the whole history at each factor. */
  total: Float64Array;
  /** By how many per cent ranges grow when loads grow by one: 1 where only the range matters. */
  rangePerGain: number;
}

/**
 * Damage of a pressed history on a detail, at nine factors on the range; a small brother of damageGrid for use while
 * somebody watches.
 *
 * @param loadFactor multiplies the load ranges (a stiffer part draws more), their means stay; 1 for none
 * @param lnSd spread of what will act as a factor on the range
 * @throws MeanAboveUltimateError when a mean reaches the ultimate of the detail's mean rule
 */
export function historyDamage(
  history: CompareHistory,
  detail: DetailModel,
  loadFactor: number,
  lnSd: number,
): HistoryDamage {
  const lnStep = Math.max((3.5 * lnSd) / ((GRID_SIZE - 1) / 2), 0.01);
  const factors = Array.from({ length: GRID_SIZE }, (_, node) => Math.exp(lnNode(node, lnStep)));
  const evaluator = new CycleEvaluator(detail);
  if (evaluator.dependsOnRangeOnly) {
    const perKn = evaluator.rangePerKn * loadFactor;
    const ofRange = damagePerCycle(workingCurve(detail));
    const total = Float64Array.from(factors, (factor) => {
      let sum = 0;
      for (let i = 0; i < history.rangesOnlyKn.length; i++) {
        sum += history.rangesOnlyCount[i] * ofRange(history.rangesOnlyKn[i] * perKn * factor);
      }
      return sum;
    });
    return { lnStep, total, rangePerGain: 1 };
  }
  const at = (rangeFactor: number, gain: number): number => {
    const scaled = new CycleEvaluator({
      ...detail,
      sizeFactor: detail.sizeFactor * rangeFactor,
      factor: detail.factor * gain,
    });
    let sum = 0;
    for (let i = 0; i < history.rangeKn.length; i++) {
      const half = (history.rangeKn[i] * loadFactor) / 2;
      const low = history.meanKn[i] - half;
      const high = history.meanKn[i] + half;
      sum += history.count[i] * scaled.damageOf(scaled.rangeOf(low, high), low, high);
    }
    return sum;
  };
  const total = Float64Array.from(factors, (factor) => at(factor, 1));
  const middle = (GRID_SIZE - 1) / 2;
  const byRange = Math.log(total[middle + 1] / total[middle - 1]);
  const byGain = Math.log(at(1, factors[middle + 1]) / at(1, factors[middle - 1]));
  return { lnStep, total, rangePerGain: byRange > 0 ? byGain / byRange : 1 };
}
