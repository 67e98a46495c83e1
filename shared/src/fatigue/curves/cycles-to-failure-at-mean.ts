import type { ReferenceCurve } from './curve.js';
import { cyclesToFailure } from './cycles-to-failure.js';

/**
 * Cycles to failure on a curve with a mean-load term: N of the range, divided by 10^(slope * mean ratio), the mean
 * ratio clipped to the bounds of the term. Curves without such a term answer as {@link cyclesToFailure}.
 *
 * @param range load range over breaking load
 * @param meanRatio mean load over breaking load
 * Source: API RP 2SK, 3rd edition (secondary); the clip to 0..0.6 is an engineering choice.
 */
export function cyclesToFailureAtMean(
  curve: Pick<ReferenceCurve, 'segments' | 'meanLoad'>,
  range: number,
  meanRatio: number,
): number {
  const cycles = cyclesToFailure(curve, range);
  const term = curve.meanLoad;
  if (term.kind !== 'load-ratio-exponent') return cycles;
  return cycles / 10 ** (term.perMeanRatio * Math.min(Math.max(meanRatio, term.minRatio), term.maxRatio));
}
