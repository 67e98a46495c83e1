import type { Curve, CurveMeanLoad } from '../curves/curve.js';
import { cyclesToFailure } from '../curves/cycles-to-failure.js';
import type { DetailModel } from './detail-model.js';
import { endBendingRangeMpa } from './end-bending-range.js';
import { rangeAtReference } from './mean-load.js';
import { workingCurve } from './working-curve.js';

/** Damage of single cycles on one detail, with everything that does not change from cycle to cycle worked out once. */
export class CycleEvaluator {
  private readonly curve: Curve;
  private readonly meanLoad: CurveMeanLoad | null;
  private readonly axialFactor: number;
  private readonly referenceR: number;

  constructor(private readonly detail: DetailModel) {
    this.curve = workingCurve(detail);
    this.meanLoad = 'meanLoad' in detail.curve ? detail.curve.meanLoad : null;
    this.referenceR = this.meanLoad?.kind === 'rule-allowed' ? this.meanLoad.referenceR : -1;
    this.axialFactor = detail.factor * detail.stressConcentration;
  }

  /** True when the damage of a cycle follows from its load range alone. */
  get dependsOnRangeOnly(): boolean {
    return (
      this.detail.mean.kind === 'none' &&
      this.detail.endBending === null &&
      this.meanLoad?.kind !== 'load-ratio-exponent'
    );
  }

  /** Range per kN of load range; meaningful where {@link dependsOnRangeOnly}. */
  get rangePerKn(): number {
    return this.axialFactor * this.detail.sizeFactor;
  }

  /**
   * Range taken to the curve by a cycle between two loads (kN): axial range with its stress concentration, plus
   * bending at a fixed end, times the size factor, moved to the stress ratio of the curve's tests where the
   * detail has a mean rule.
   */
  rangeOf(lowKn: number, highKn: number): number {
    const { factor, endBending, sizeFactor, mean } = this.detail;
    const bending = endBending === null ? 0 : endBendingRangeMpa(factor * lowKn, factor * highKn, endBending);
    const range = ((highKn - lowKn) * this.axialFactor + bending) * sizeFactor;
    if (mean.kind === 'none') return range;
    return rangeAtReference(range, (this.axialFactor * (lowKn + highKn)) / 2, mean, this.referenceR);
  }

  /** Damage of one cycle of this range (see {@link rangeOf}); the loads matter only for curves with a mean-load term. */
  damageOf(range: number, lowKn: number, highKn: number): number {
    const damage = 1 / cyclesToFailure(this.curve, range);
    return this.meanLoad?.kind === 'load-ratio-exponent'
      ? damage * lifeDivisorAtMean(this.meanLoad, (this.detail.factor * (lowKn + highKn)) / 2)
      : damage;
  }
}

function lifeDivisorAtMean(
  term: Extract<CurveMeanLoad, { kind: 'load-ratio-exponent' }>,
  meanRatio: number,
): number {
  return 10 ** (term.perMeanRatio * Math.min(Math.max(meanRatio, term.minRatio), term.maxRatio));
}
