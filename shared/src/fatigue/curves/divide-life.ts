import type { Curve, CurveSegment } from './curve.js';

/**
 * The same curve with every life divided, for surroundings harsher than those of its tests.
 *
 * @param divisor 1 or more
 * @throws RangeError for a divisor below 1: surroundings never lengthen a life
 * Source of the divisors in use: 2 in class-society rules for a corrosive environment, 3 in DNV-RP-C203 between air
 * and free corrosion (both published, secondary).
 */
export function divideLife(curve: Curve, divisor: number): CurveSegment[] {
  if (!(divisor >= 1)) throw new RangeError(`A life divisor must be 1 or more, not ${divisor}.`);
  return curve.segments.map((segment) => ({ ...segment, log10a: segment.log10a - Math.log10(divisor) }));
}
