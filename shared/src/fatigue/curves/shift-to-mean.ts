import type { CurveSegment, ReferenceCurve } from './curve.js';

/** Scatter of log10 N taken where a curve publishes none (engineering estimate, no source). */
export const UNPUBLISHED_SD_LOG10_N = 0.25;

/**
 * The mean curve behind a design curve: every log10a raised by k standard deviations of that curve. Doubt about whether
 * a curve fits its detail must not enter here: it widens a spread and never lengthens a life.
 *
 * @returns segments of the mean curve; unchanged where the level is the mean or is not known
 * Source of k: 2 in DNV-RP-C203 and BS 7608 (from memory); 1.645 for the 95 % fractile of EN 1993 (from memory).
 */
export function shiftToMean(
  curve: Pick<ReferenceCurve, 'segments' | 'level' | 'k' | 'sdLog10N'>,
): CurveSegment[] {
  const known = curve.level === 'mean-minus-k-sd' || curve.level === 'fractile-95-75';
  const shift = known ? curve.k * (curve.sdLog10N ?? UNPUBLISHED_SD_LOG10_N) : 0;
  return curve.segments.map((segment) => ({ ...segment, log10a: segment.log10a + shift }));
}
