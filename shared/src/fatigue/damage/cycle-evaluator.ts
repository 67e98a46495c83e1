import type { CurveMeanLoad } from '../curves/curve.js';
import { damagePerCycle } from '../curves/damage-per-cycle.js';
import type { DetailModel, EndBending } from './detail-model.js';
import { endBendingRangeMpa } from './end-bending-range.js';
import { type MeanLoadRule, rangeAtReference } from './mean-load.js';
import { workingCurve } from './working-curve.js';

/** Damage of single cycles on one detail, with everything that does not change from cycle to cycle worked out once. */
export class CycleEvaluator {
  /** True when the damage of a cycle follows from its load range alone. */
  readonly dependsOnRangeOnly: boolean;
  /** Range per kN of load range; meaningful where {@link dependsOnRangeOnly}. */
  readonly rangePerKn: number;

  private readonly damagePerCycle: (range: number) => number;
  private readonly meanTerm: Extract<CurveMeanLoad, { kind: 'load-ratio-exponent' }> | null;
  private readonly factor: number;
  private readonly axialFactor: number;
  private readonly sizeFactor: number;
  private readonly mean: MeanLoadRule;
  private readonly referenceR: number;
  private readonly endBending: EndBending | null;

  constructor(detail: DetailModel) {
    const meanLoad = 'meanLoad' in detail.curve ? detail.curve.meanLoad : null;
    this.damagePerCycle = damagePerCycle(workingCurve(detail));
    this.meanTerm = meanLoad?.kind === 'load-ratio-exponent' ? meanLoad : null;
    this.referenceR = meanLoad?.kind === 'rule-allowed' ? meanLoad.referenceR : -1;
    this.factor = detail.factor;
    this.axialFactor = detail.factor * detail.stressConcentration;
    this.sizeFactor = detail.sizeFactor;
    this.mean = detail.mean;
    this.endBending = detail.endBending;
    this.rangePerKn = this.axialFactor * this.sizeFactor;
    this.dependsOnRangeOnly = this.mean.kind === 'none' && this.endBending === null && this.meanTerm === null;
  }

  /**
   * Range taken to the curve by a cycle between two loads (kN): axial range with its stress concentration, plus
   * bending at a fixed end, times the size factor, moved to the stress ratio of the curve's tests where the detail has
   * a mean rule.
   */
  rangeOf(lowKn: number, highKn: number): number {
    const { factor, axialFactor, endBending } = this;
    const bending = endBending === null ? 0 : endBendingRangeMpa(factor * lowKn, factor * highKn, endBending);
    const range = ((highKn - lowKn) * axialFactor + bending) * this.sizeFactor;
    if (this.mean.kind === 'none') return range;
    return rangeAtReference(range, (axialFactor * (lowKn + highKn)) / 2, this.mean, this.referenceR);
  }

  /** Damage of one cycle of this range (see {@link rangeOf}); the loads matter only for curves with a mean-load term. */
  damageOf(range: number, lowKn: number, highKn: number): number {
    const damage = this.damagePerCycle(range);
    const term = this.meanTerm;
    if (term === null) return damage;
    const meanRatio = (this.factor * (lowKn + highKn)) / 2;
    return damage * 10 ** (term.perMeanRatio * Math.min(Math.max(meanRatio, term.minRatio), term.maxRatio));
  }
}
