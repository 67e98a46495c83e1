import type { Curve, CurveSegment } from './curve.js';

/**
 * The same curve with its lowest segment continued to zero, so that every cycle counts. No fatigue limit is to be
 * trusted for stainless wire in salt water or under variable loads (common practice, no source).
 */
export function withoutCutOff(curve: Curve): CurveSegment[] {
  return curve.segments.map((segment, index) =>
    index === curve.segments.length - 1 ? { ...segment, above: 0 } : { ...segment },
  );
}
