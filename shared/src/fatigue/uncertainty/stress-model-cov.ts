/**
 * Doubt about the stress that follows from a load, as coefficient of variation of the range: 0.10, and 0.20 where a
 * stress concentration stands in between.
 *
 * @param stressConcentration factor of the detail, 1 for none
 * Source: JCSS Probabilistic Model Code part 3 (published).
 */
export function stressModelCov(stressConcentration: number): number {
  return stressConcentration > 1 ? 0.2 : 0.1;
}
