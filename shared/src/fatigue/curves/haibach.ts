import type { Curve } from './curve.js';

/**
 * A one-slope curve with Haibach's branch below its knee: slope 2m - 1 instead of an endless life, continuous at the
 * knee. m 3 becomes 5, 4 becomes 7, 5 becomes 9.
 *
 * @param m slope above the knee, above 1
 * @param log10a intercept above the knee
 * @param kneeRangeValue range at the knee, in the measure of the curve
 * @throws RangeError for a slope not above 1 or a knee not above zero
 * Source: Haibach 1970 (from memory).
 */
export function haibach(m: number, log10a: number, kneeRangeValue: number): Curve {
  if (!(m > 1)) throw new RangeError(`Haibach's branch needs a slope above 1, not ${m}.`);
  if (!(kneeRangeValue > 0)) throw new RangeError(`The knee must be above zero, not ${kneeRangeValue}.`);
  const lowerM = 2 * m - 1;
  return {
    segments: [
      { above: kneeRangeValue, m, log10a },
      { above: 0, m: lowerM, log10a: log10a + (lowerM - m) * Math.log10(kneeRangeValue) },
    ],
  };
}
