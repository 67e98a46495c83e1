import { gammaln } from 'simple-statistics';
import type { Curve } from '../curves/curve.js';
import { CompensatedSum } from '../damage/compensated-sum.js';
import { lowerRegularisedGamma, upperRegularisedGamma } from './regularised-gamma.js';

/** Load ranges that follow a Weibull distribution: the chance of a range above s is exp(-(s / scale)^shape). */
export interface WeibullRanges {
  cycles: number;
  /** In the measure of the curve. */
  scale: number;
  shape: number;
}

/**
 * Scale of Weibull ranges from the range exceeded once in so many cycles: largest / (ln cycles)^(1 / shape).
 *
 * @param largest range exceeded once, in the measure of the curve
 * @param cycles above 1
 * @param shape above zero
 */
export function weibullScale(largest: number, cycles: number, shape: number): number {
  return largest / Math.log(cycles) ** (1 / shape);
}

/**
 * Damage of Weibull-distributed ranges on a curve of any number of segments, in closed form: per segment
 * cycles * scale^m / a * (incomplete gamma of 1 + m / shape between the segment's bounds).
 *
 * @throws RangeError for a scale or shape that is not above zero
 * Source: closed form of DNV-RP-C203 (from memory), written for any number of segments.
 */
export function weibullDamage(ranges: WeibullRanges, curve: Curve): number {
  const { cycles, scale, shape } = ranges;
  if (!(scale > 0 && shape > 0))
    throw new RangeError('Scale and shape of Weibull ranges must be above zero.');
  const sum = new CompensatedSum();
  let upper = Infinity;
  for (const { above, m, log10a } of curve.segments) {
    const order = 1 + m / shape;
    const share = gammaBetween(order, (above / scale) ** shape, (upper / scale) ** shape);
    sum.add(cycles * Math.exp(m * Math.log(scale) - log10a * Math.LN10 + gammaln(order)) * share);
    upper = above;
  }
  return sum.value;
}

/** Share of the gamma distribution between two bounds, taken from the side that loses no digits. */
function gammaBetween(order: number, from: number, to: number): number {
  return from > order
    ? upperRegularisedGamma(order, from) - upperRegularisedGamma(order, to)
    : lowerRegularisedGamma(order, to) - lowerRegularisedGamma(order, from);
}
