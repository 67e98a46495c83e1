import type { CurveDto } from '@stayledger/shared/contracts/curves';
import { cyclesToFailure } from '@stayledger/shared/fatigue/curves/cycles-to-failure';

export interface CurvePoint {
  range: number;
  cycles: number;
}

const FEWEST_CYCLES = 1e4;
const MOST_CYCLES = 1e9;

/**
 * Points of a curve for drawing: every knee, and points between them even on the logarithmic axis, from 10^4 to 10^9
 * cycles. Straight between points on two logarithmic axes, so few are enough.
 *
 * @param also ranges that get a point of their own where they lie within the drawing
 */
export function curvePoints(curve: Pick<CurveDto, 'segments'>, also: readonly number[] = []): CurvePoint[] {
  const [high] = curve.segments;
  const low = curve.segments[curve.segments.length - 1];
  const rangeAt = (cycles: number, segment: CurveDto['segments'][number]) =>
    10 ** ((segment.log10a - Math.log10(cycles)) / segment.m);
  const top = Math.max(rangeAt(FEWEST_CYCLES, high), high.above);
  const bottom = Math.max(rangeAt(MOST_CYCLES, low), low.above);
  const steps = 24;
  const between = Array.from(
    { length: steps - 1 },
    (_, index) => top * (bottom / top) ** ((index + 1) / steps),
  );
  const knees = [...curve.segments.map(({ above }) => above), ...also].filter(
    (above) => above > bottom && above < top,
  );
  // The ends stand as they are: one rounded below a cut-off would have no life and be lost.
  return [...new Set([top, ...between, bottom, ...knees])]
    .sort((a, b) => b - a)
    .map((range) => ({ range, cycles: cyclesToFailure(curve, range) }))
    .filter(({ cycles }) => Number.isFinite(cycles));
}
