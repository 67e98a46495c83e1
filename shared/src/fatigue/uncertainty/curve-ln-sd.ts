import type { ReferenceCurve } from '../curves/curve.js';
import { UNPUBLISHED_SD_LOG10_N } from '../curves/shift-to-mean.js';
import { lnSdOfLog10Sd } from '../statistics/lognormal.js';

/**
 * Spread of a detail's life about its mean curve, as standard deviation of ln N: the scatter of the tests and, where a
 * curve is borrowed, the doubt whether it fits, as root of the sum of squares.
 *
 * @param curve its published scatter of log10 N, 0.25 where none is published (estimate without a source)
 * @param modelSdLog10N doubt about the fit, standard deviation of log10 N, zero or more
 * @throws RangeError for a negative doubt
 */
export function curveLnSd(curve: Pick<ReferenceCurve, 'sdLog10N'>, modelSdLog10N: number): number {
  if (!(modelSdLog10N >= 0))
    throw new RangeError(`Doubt about a curve must be zero or more, not ${modelSdLog10N}.`);
  return lnSdOfLog10Sd(Math.hypot(curve.sdLog10N ?? UNPUBLISHED_SD_LOG10_N, modelSdLog10N));
}
