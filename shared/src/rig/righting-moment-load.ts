/**
 * Classic estimate of the largest load on the shrouds of one side: 1.5 * righting moment at 30 degrees / half beam.
 * The 1.5 carries the moment at 30 degrees to its maximum.
 *
 * @param rightingMomentKnm righting moment at 30 degrees of heel, kN m
 * @param halfBeamM from the centre line to the chainplate, m
 * @returns kN
 * @throws RangeError for a moment or beam that is not above zero
 * Source: Skene's method, Elements of Yacht Design (from memory).
 */
export function rightingMomentLoadKn(rightingMomentKnm: number, halfBeamM: number): number {
  if (!(rightingMomentKnm > 0 && halfBeamM > 0))
    throw new RangeError('Moment and half beam must be above zero.');
  return (1.5 * rightingMomentKnm) / halfBeamM;
}
