import type { Curve } from './curve.js';

/** A place where a curve changes its slope or ends. */
export interface Knee {
  /** Range, in the curve's measure. */
  range: number;
  /** Cycles to failure just above it. */
  cyclesAbove: number;
  /** Cycles to failure just below it; Infinity at a cut-off. */
  cyclesBelow: number;
}

/** The knees of a curve from high to low ranges, and its cut-off last where it has one. */
export function knees(curve: Curve): Knee[] {
  return curve.segments
    .map(({ above, m, log10a }, index) => {
      const below = curve.segments.at(index + 1);
      return {
        range: above,
        cyclesAbove: 10 ** (log10a - m * Math.log10(above)),
        cyclesBelow: below === undefined ? Infinity : 10 ** (below.log10a - below.m * Math.log10(above)),
      };
    })
    .filter(({ range }) => range > 0);
}
