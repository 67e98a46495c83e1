/**
 * Factor on the stress range of a thick part: (thickness / reference)^exponent above the reference thickness, 1 below
 * it (thin parts earn no bonus).
 *
 * @param thicknessMm thickness through which a crack would grow
 * @param rule for DNV-RP-C203: exponent of the class, reference 25 mm
 * @returns 1 or more
 * Source: DNV-RP-C203 (2016) section 2.4 (secondary).
 */
export function thicknessFactor(
  thicknessMm: number,
  rule: { exponent: number; referenceMm: number },
): number {
  return thicknessMm > rule.referenceMm ? (thicknessMm / rule.referenceMm) ** rule.exponent : 1;
}
