/** What the four-point method makes of a list of turning points. */
export interface FourPointCount {
  /** Closed cycles in the order they close, as [from, to] in time order. */
  closed: [from: number, to: number][];
  /** The turning points left over: ranges grow, then shrink. */
  residue: number[];
}

/**
 * The four-point rainflow method on a list of turning points.
 *
 * Of four neighbours A, B, C, D the inner pair B-C is a closed cycle when it lies within the span of A-D, ties
 * included; it is taken out and the remaining points are looked at again.
 *
 * Source: McInnes and Meehan, Equivalence of four-point and three-point rainflow cycle counting algorithms,
 * Int. J. Fatigue 30 (2008) 547-559.
 *
 * @param points turning points in time order, any unit (see `turningPoints`)
 * @example fourPoint([1, 3, 2, 4]) // closed [[3, 2]], residue [1, 4]
 */
export function fourPoint(points: ArrayLike<number>): FourPointCount {
  const closed: [number, number][] = [];
  const stack: number[] = [];
  for (let i = 0; i < points.length; i++) {
    stack.push(points[i]);
    while (stack.length >= 4) {
      const [a, b, c, d] = stack.slice(-4);
      const within = Math.min(b, c) >= Math.min(a, d) && Math.max(b, c) <= Math.max(a, d);
      if (!within) break;
      closed.push([b, c]);
      stack.splice(-3, 2);
    }
  }
  return { closed, residue: stack };
}
