import type { CurveDto } from '@stayledger/shared/contracts/curves';
import type { CurvePoint } from './curve-points';

export interface CurveStretch {
  kind: 'supported' | 'beyond';
  points: CurvePoint[];
}

/**
 * The points of a curve cut at the bounds of its validity: where its source supports it, and where the line is only carried
 * on. The point at a bound belongs to both stretches, so that no gap is drawn.
 *
 * @param points from high to low ranges, holding the bounds themselves
 */
export function curveStretches(
  points: readonly CurvePoint[],
  validity: CurveDto['validity'],
): CurveStretch[] {
  const highest = validity.maxRange ?? Number.POSITIVE_INFINITY;
  const lowest = validity.minRange ?? 0;
  const parts: [CurveStretch['kind'], CurvePoint[]][] = [
    ['beyond', points.filter(({ range }) => range >= highest)],
    ['supported', points.filter(({ range }) => range <= highest && range >= lowest)],
    ['beyond', points.filter(({ range }) => range <= lowest)],
  ];
  return parts.filter(([, own]) => own.length > 1).map(([kind, own]) => ({ kind, points: own }));
}
