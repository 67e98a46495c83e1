/** Factors on the range at which damage is worked out; the middle one is 1. */
export const GRID_SIZE = 9;
const MIDDLE = (GRID_SIZE - 1) / 2;

/** The factor of a node of a grid, as a natural logarithm. */
export function lnNode(index: number, lnStep: number): number {
  return (index - MIDDLE) * lnStep;
}

/**
 * Damage at a factor between the nodes of a grid: a cubic through the four nearest nodes, in logarithms of factor and
 * damage. Beyond the grid the slope between its last two nodes is continued. Where a node has no damage (below a
 * cut-off) damage itself is interpolated in a straight line.
 *
 * @param values damages at the nine nodes, possibly inside a longer array
 * @param offset where the nine begin
 * @param lnStep distance of neighbouring nodes in natural logarithms
 * @param lnFactor natural logarithm of the factor
 */
export function damageOnGrid(
  values: ArrayLike<number>,
  offset: number,
  lnStep: number,
  lnFactor: number,
): number {
  // A local constant: this is the innermost loop of every forecast.
  const last = GRID_SIZE - 1;
  const at = lnFactor / lnStep + last / 2;
  if (at <= 0) return alongEnd(values, offset, 0, 1, at);
  if (at >= last) return alongEnd(values, offset, last, last - 1, at);
  const below = Math.min(Math.floor(at), last - 1);
  const first = Math.min(Math.max(below - 1, 0), last - 3);
  const a = values[offset + first];
  const b = values[offset + first + 1];
  const c = values[offset + first + 2];
  const d = values[offset + first + 3];
  if (!(a > 0 && b > 0 && c > 0 && d > 0)) {
    const share = at - below;
    return values[offset + below] * (1 - share) + values[offset + below + 1] * share;
  }
  const t = at - first;
  const t1 = t - 1;
  const t2 = t - 2;
  const t3 = t - 3;
  return Math.exp(
    (-t1 * t2 * t3 * Math.log(a)) / 6 +
      (t * t2 * t3 * Math.log(b)) / 2 -
      (t * t1 * t3 * Math.log(c)) / 2 +
      (t * t1 * t2 * Math.log(d)) / 6,
  );
}

function alongEnd(values: ArrayLike<number>, offset: number, end: number, next: number, at: number): number {
  const outer = values[offset + end];
  const inner = values[offset + next];
  if (!(outer > 0 && inner > 0)) return outer;
  return outer * Math.exp((Math.log(inner / outer) * (at - end)) / (next - end));
}
