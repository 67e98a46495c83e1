/**
 * Lowest natural frequency of a stay as a string: 1 / (2 * length) * sqrt(tension / mass per metre).
 *
 * @param lengthM free length, m
 * @param tensionKn kN
 * @param massKgPerMetre kg/m
 * @returns Hz
 * @throws RangeError for a length or mass that is not above zero, or a negative tension
 */
export function stayFrequencyHz(lengthM: number, tensionKn: number, massKgPerMetre: number): number {
  if (!(lengthM > 0 && massKgPerMetre > 0 && tensionKn >= 0)) {
    throw new RangeError('Length and mass must be above zero and the tension zero or more.');
  }
  return Math.sqrt((tensionKn * 1000) / massKgPerMetre) / (2 * lengthM);
}
