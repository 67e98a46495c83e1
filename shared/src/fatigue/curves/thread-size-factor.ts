/**
 * Factor on the stress range of a large thread: the inverse of (reference / diameter)^exponent above the reference
 * size, 1 below it.
 *
 * @param diameterMm nominal diameter of the thread
 * @param rule for EN 1993-1-9 detail 14: exponent 0.25, reference 30 mm
 * @returns 1 or more
 * Source: EN 1993-1-9 detail 14, k_s = (30 / diameter)^0.25 on strength (secondary).
 */
export function threadSizeFactor(
  diameterMm: number,
  rule: { exponent: number; referenceMm: number },
): number {
  return diameterMm > rule.referenceMm ? (diameterMm / rule.referenceMm) ** rule.exponent : 1;
}
