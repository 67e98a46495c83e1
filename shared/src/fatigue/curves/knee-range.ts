import type { CurveSegment } from './curve.js';

/**
 * Range at which two segments of different slope meet: 10^((log10a2 - log10a1) / (m2 - m1)). Computed from the
 * constants, so that a curve is continuous there whatever a table rounded.
 *
 * @throws RangeError for parallel segments
 */
export function kneeRange(
  upper: Pick<CurveSegment, 'm' | 'log10a'>,
  lower: Pick<CurveSegment, 'm' | 'log10a'>,
): number {
  if (upper.m === lower.m) throw new RangeError('Segments of the same slope have no knee.');
  return 10 ** ((lower.log10a - upper.log10a) / (lower.m - upper.m));
}
