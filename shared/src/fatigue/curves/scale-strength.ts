import type { Curve, CurveSegment } from './curve.js';

/**
 * The same curve moved along the range axis: every life now belongs to a range `factor` times as large. Used to draw a
 * curve's shape through another category, or to divide strengths by a partial factor (factor below 1).
 *
 * @param factor above zero
 * @throws RangeError for a factor that is not above zero
 */
export function scaleStrength(curve: Curve, factor: number): CurveSegment[] {
  if (!(factor > 0)) throw new RangeError(`A strength factor must be above zero, not ${factor}.`);
  return curve.segments.map(({ above, m, log10a }) => ({
    above: above * factor,
    m,
    log10a: log10a + m * Math.log10(factor),
  }));
}
