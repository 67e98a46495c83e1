import type { Curve } from './curve.js';

/**
 * Largest constant range that a curve lets stand for so many cycles: the inverse of cyclesToFailure. Past the life at
 * the cut-off it is the cut-off itself.
 *
 * @param curve any curve with at least one segment
 * @param cycles above zero
 * @returns range in the curve's measure
 * @throws RangeError for cycles that are not above zero
 * @example rangeForCycles({ segments: [{ above: 0, m: 3, log10a: 12 }] }, 1e6) // 100
 */
export function rangeForCycles(curve: Curve, cycles: number): number {
  if (!(cycles > 0)) throw new RangeError(`Cycles must be above zero, not ${cycles}.`);
  let upper = Infinity;
  for (const { above, m, log10a } of curve.segments) {
    const range = 10 ** ((log10a - Math.log10(cycles)) / m);
    // Where segments do not quite meet, the life jumps at `upper` and the range there is the answer.
    if (range >= above) return Math.min(range, upper);
    upper = above;
  }
  return upper;
}
