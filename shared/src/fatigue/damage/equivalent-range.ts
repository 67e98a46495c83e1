/**
 * Constant range that does the damage of many on one slope in the same number of cycles:
 * (sum of count * range^m / sum of counts)^(1 / m).
 *
 * @param counts ranges in any measure with their cycles
 * @param m slope, above zero
 * @returns range in that measure, 0 without cycles
 * @throws RangeError for a slope that is not above zero
 */
export function equivalentRange(counts: Iterable<{ range: number; count: number }>, m: number): number {
  if (!(m > 0)) throw new RangeError(`The slope must be above zero, not ${m}.`);
  let weighted = 0;
  let cycles = 0;
  for (const { range, count } of counts) {
    weighted += count * range ** m;
    cycles += count;
  }
  return cycles === 0 ? 0 : (weighted / cycles) ** (1 / m);
}
