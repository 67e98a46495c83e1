import type { Curve, CurveSegment } from './curve.js';

/**
 * Cycles to failure at a constant range: N = 10^log10a * range^-m in the first segment (from high to low) whose
 * `above` is not greater than the range.
 *
 * @param curve any curve
 * @param range full range in the curve's measure
 * @returns cycles; Infinity for a range of zero or below the lowest segment, 0 for an infinite range
 * @throws RangeError for a negative range or NaN
 * @example cyclesToFailure({ segments: [{ above: 0, m: 3, log10a: 12 }] }, 100) // 1e6
 */
export function cyclesToFailure(curve: Curve, range: number): number {
  if (!(range >= 0)) throw new RangeError(`A range must be zero or more, not ${range}.`);
  if (range === 0) return Infinity;
  for (const segment of curve.segments) {
    if (segment.above <= range) return cyclesOnSegment(segment, range);
  }
  return Infinity;
}

function cyclesOnSegment(segment: CurveSegment, range: number): number {
  const cycles = 10 ** segment.log10a * range ** -segment.m;
  // The product form is the accurate one; the sum of logarithms only rescues factors beyond the reach of a double.
  return cycles > 0 && cycles < Infinity ? cycles : 10 ** (segment.log10a - segment.m * Math.log10(range));
}
